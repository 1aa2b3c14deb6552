import { cx } from '../../lib/cx.ts';

type SkeletonProps = { lines?: number; label?: string; className?: string };

const widths = ['w-full', 'w-11/12', 'w-4/5', 'w-2/3'];

/** Blank rules where the text will stand; shown only when waiting lasts longer than 300 ms. */
export function Skeleton({ lines = 3, label = 'Loading', className }: SkeletonProps) {
  return (
    <div role="status" className={cx('late flex flex-col gap-3', className)}>
      <span className="sr-only">{label}</span>
      {Array.from({ length: lines }, (_, index) => (
        <div
          key={index}
          aria-hidden="true"
          className={cx('h-4 rounded-box bg-band', widths[index % widths.length])}
        />
      ))}
    </div>
  );
}
