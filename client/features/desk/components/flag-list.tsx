import { Link } from 'react-router-dom';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { Notice } from '../../../components/ui/notice.tsx';
import { paths } from '../../../lib/paths.ts';

/** What must not be missed. A flag decides nothing. */
export function FlagList({ flags }: { flags: CaseAnswer['flags'] }) {
  if (flags.length === 0) {
    return (
      <Notice tone="good" title="No flags">
        Nothing was seen before, and the figures are possible.
      </Notice>
    );
  }
  const title = flags.length === 1 ? '1 flag' : `${flags.length} flags`;
  return (
    <Notice tone="attention" title={title}>
      <ul className="list-disc pl-5">
        {flags.map((flag, index) => (
          <li key={`${flag.code}:${index}`}>
            {flag.message}{' '}
            {flag.lotCode && (
              <Link to={paths.lot(flag.lotCode)} className="link">
                See lot <span className="fig">{flag.lotCode}</span>
              </Link>
            )}
          </li>
        ))}
      </ul>
    </Notice>
  );
}
