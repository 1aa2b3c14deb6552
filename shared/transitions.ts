import { MeasureError } from './domain-error.ts';

/** Which states may follow which. A state with none has ended. */
export type TransitionTable<State extends string> = Readonly<Record<State, readonly State[]>>;

/** True when the table allows the change. */
export function canChange<State extends string>(
  table: TransitionTable<State>,
  from: State,
  to: State,
): boolean {
  return table[from].includes(to);
}

/** Refuses a change that the table does not allow. Throws MeasureError `illegal-transition`, to be answered with 409. */
export function assertChange<State extends string>(
  table: TransitionTable<State>,
  labels: Readonly<Record<State, string>>,
  from: State,
  to: State,
): void {
  if (canChange(table, from, to)) return;
  throw new MeasureError(
    'illegal-transition',
    '/state',
    `What is “${labels[from]}” cannot become “${labels[to]}”.`,
  );
}
