/** One refusal: a stable kebab-case code, the JSON pointer of the field that caused it, and a sentence for a person. */
export type MeasureIssue = { readonly code: string; readonly field: string; readonly message: string };

/**
 * A value or a change that the domain refuses. `field` is a JSON pointer into the input ('' for the whole of it).
 * `issues` holds every refusal found at once; `code`, `field` and `message` repeat the first.
 */
export class MeasureError extends Error {
  readonly code: string;
  readonly field: string;
  readonly issues: readonly MeasureIssue[];

  constructor(code: string, field: string, message: string, issues?: readonly MeasureIssue[]) {
    super(message);
    this.name = 'MeasureError';
    this.code = code;
    this.field = field;
    this.issues = issues ?? [{ code, field, message }];
  }
}

/** Gathers the refusals of several independent steps, so that all of them are told at once. */
export class IssueCollector {
  readonly #issues: MeasureIssue[] = [];

  /** Runs one step; a MeasureError is kept and answered with undefined, any other error passes through. */
  attempt<T>(step: () => T): T | undefined {
    try {
      return step();
    } catch (error) {
      if (!(error instanceof MeasureError)) throw error;
      this.#issues.push(...error.issues);
      return undefined;
    }
  }

  /** Records one refusal. */
  add(code: string, field: string, message: string): void {
    this.#issues.push({ code, field, message });
  }

  /** Throws one MeasureError with everything gathered; does nothing when there is nothing. */
  finish(): void {
    const first = this.#issues[0];
    if (first) throw new MeasureError(first.code, first.field, first.message, [...this.#issues]);
  }
}

/** States something that cannot be otherwise; a breach is a fault of the program, never of its input. */
export function invariant(condition: unknown, message: string): asserts condition {
  if (!condition) throw new Error(`Invariant broken: ${message}`);
}
