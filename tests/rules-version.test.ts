import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { BUYER_CONFIRMATIONS, CAUTIONS, RULES_VERSION, SELLER_CONFIRMATIONS } from '#shared/rules.ts';

/** A version's texts never change: a new wording is a new line here, under a new version. */
const TEXTS_OF_VERSION: Readonly<Record<string, string>> = {
  '2026-12.2': 'b29ac951a37c976c8dc5242f582950f13e76948df353030e76d83b66f6cb41d8',
};

describe('what buyer and seller confirm', () => {
  it('is word for word what its version stands for', () => {
    const texts = JSON.stringify([BUYER_CONFIRMATIONS, SELLER_CONFIRMATIONS, CAUTIONS]);
    const hash = createHash('sha256').update(texts).digest('hex');
    expect({ [RULES_VERSION]: hash }).toEqual({ [RULES_VERSION]: TEXTS_OF_VERSION[RULES_VERSION] });
  });

  it('has a version that fits beside a lot and a deal', () => {
    expect(RULES_VERSION).toMatch(/^\d{4}-\d{2}(\.\d+)?$/);
    expect(RULES_VERSION.length).toBeLessThanOrEqual(16);
  });
});
