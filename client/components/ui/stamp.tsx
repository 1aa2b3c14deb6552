import type { ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

type StampProps = { tone?: 'good' | 'plain' | 'attention'; children: ReactNode; className?: string };

const tones = { good: 'text-verdigris', plain: 'text-ink-2', attention: 'text-litharge' };

/** A word that somebody answers for. */
export function Stamp({ tone = 'plain', children, className }: StampProps) {
  return (
    <span
      className={cx(
        'inline-block rounded-[12px_3px] border-[1.5px] border-current px-2.5 py-px text-note font-semibold',
        tones[tone],
        className,
      )}
    >
      {children}
    </span>
  );
}
