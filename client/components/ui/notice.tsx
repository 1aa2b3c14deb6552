import type { ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

export type NoticeTone = 'plain' | 'good' | 'attention';

const tones: Record<NoticeTone, string> = {
  plain: 'border-line',
  good: 'border-verdigris bg-wash',
  attention: 'border-litharge',
};

type NoticeProps = {
  tone?: NoticeTone;
  title?: ReactNode;
  children?: ReactNode;
  className?: string;
  role?: 'status' | 'alert';
};

/** A remark that belongs to what stands around it and stays until its cause is gone. */
export function Notice({ tone = 'plain', title, children, className, role }: NoticeProps) {
  return (
    <div
      role={role}
      className={cx('rounded-box border border-l-4 bg-sheet px-4 py-3', tones[tone], className)}
    >
      {title && <p className={cx('font-semibold', tone === 'attention' && 'text-litharge')}>{title}</p>}
      {children && <div className={cx('max-w-prose', title && 'mt-1')}>{children}</div>}
    </div>
  );
}
