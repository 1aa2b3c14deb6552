import { formatAge, formatClock, formatDeadline, formatMoment, formatShortMoment } from '../../lib/format.ts';
import { useReader } from '../../lib/reader-context.ts';
import { useNow } from '../../lib/use-now.ts';

type TimeProps = { at: string; show?: 'moment' | 'short' | 'clock' };

/** A moment in the reader's zone; the full moment with its zone is always at hand in the title. */
export function Time({ at, show = 'moment' }: TimeProps) {
  const { timeZone } = useReader();
  const full = formatMoment(at, timeZone);
  const text =
    show === 'moment' ? full : show === 'short' ? formatShortMoment(at, timeZone) : formatClock(at, timeZone);
  return (
    <time dateTime={at} title={show === 'moment' ? undefined : full} className="whitespace-nowrap">
      {text}
    </time>
  );
}

/** A moment by which something must be done, and what is left until then. */
export function Deadline({ at }: { at: string }) {
  const { timeZone } = useReader();
  const now = useNow(30_000);
  return <time dateTime={at}>{formatDeadline(at, timeZone, now)}</time>;
}

/** How long ago something was, kept current. */
export function Age({ at, everyMs = 10_000 }: { at: string; everyMs?: number }) {
  const now = useNow(everyMs);
  return <span className="whitespace-nowrap">{formatAge(at, now)}</span>;
}
