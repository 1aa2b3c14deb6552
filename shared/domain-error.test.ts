import { describe, expect, it } from 'vitest';
import { IssueCollector, MeasureError, invariant } from './domain-error.ts';

describe('MeasureError', () => {
  it('is its own only issue unless more are given', () => {
    const error = new MeasureError('too-small', '/mass/value', 'The number must be above 0.');
    expect(error).toBeInstanceOf(Error);
    expect(error.name).toBe('MeasureError');
    expect(error.issues).toEqual([
      { code: 'too-small', field: '/mass/value', message: 'The number must be above 0.' },
    ]);
  });
});

describe('IssueCollector', () => {
  it('tells every refusal at once, in the order found', () => {
    const issues = new IssueCollector();
    expect(issues.attempt(() => 7)).toBe(7);
    expect(
      issues.attempt(() => {
        throw new MeasureError('a', '/a', 'First.');
      }),
    ).toBeUndefined();
    issues.add('b', '/b', 'Second.');
    expect(() => issues.finish()).toThrowError(
      expect.objectContaining({
        code: 'a',
        field: '/a',
        issues: [
          { code: 'a', field: '/a', message: 'First.' },
          { code: 'b', field: '/b', message: 'Second.' },
        ],
      }),
    );
  });

  it('unfolds an error that gathered several', () => {
    const outer = new IssueCollector();
    outer.attempt(() => {
      const inner = new IssueCollector();
      inner.add('x', '/x', 'X.');
      inner.add('y', '/y', 'Y.');
      inner.finish();
    });
    expect(() => outer.finish()).toThrowError(
      expect.objectContaining({
        issues: [expect.objectContaining({ code: 'x' }), expect.objectContaining({ code: 'y' })],
      }),
    );
  });

  it('lets a fault of the program through', () => {
    const issues = new IssueCollector();
    expect(() =>
      issues.attempt(() => {
        throw new TypeError('fault');
      }),
    ).toThrow(TypeError);
  });

  it('finishes quietly when nothing was refused', () => {
    expect(() => new IssueCollector().finish()).not.toThrow();
  });
});

describe('invariant', () => {
  it('throws a plain error, not a refusal', () => {
    expect(() => invariant(false, 'sums to zero')).toThrow('Invariant broken: sums to zero');
    expect(() => invariant(false, 'sums to zero')).not.toThrow(MeasureError);
    expect(() => invariant(true, 'sums to zero')).not.toThrow();
  });
});
