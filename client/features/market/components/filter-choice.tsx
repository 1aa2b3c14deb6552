import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { cx } from '../../../lib/cx.ts';

export type Choice = { key: string; text: ReactNode; isOn: boolean; to: string };

type FilterChoiceProps = { label: string; choices: Choice[] };

/** Choices that are addresses: each leads to the register with it put on, or taken off again. */
export function FilterChoice({ label, choices }: FilterChoiceProps) {
  return (
    <div role="group" aria-label={label} className="flex flex-wrap items-baseline gap-x-1.5 gap-y-1.5">
      <span className="mr-1 text-note text-ink-2">{label}</span>
      {choices.map((choice) => (
        <Link
          key={choice.key}
          to={choice.to}
          preventScrollReset
          aria-current={choice.isOn ? 'true' : undefined}
          className={cx(
            'inline-flex min-h-8 items-center rounded-box border px-2.5 text-note',
            choice.isOn ? 'border-ink bg-ink font-medium text-paper' : 'border-line hover:bg-wash',
          )}
        >
          {choice.text}
          {choice.isOn && <span className="sr-only">, chosen; leads to the list without it</span>}
        </Link>
      ))}
    </div>
  );
}
