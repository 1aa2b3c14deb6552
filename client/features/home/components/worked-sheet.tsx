import { useQuery } from '@tanstack/react-query';
import { lazy, Suspense } from 'react';
import { Link } from 'react-router-dom';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { SettlementSheetView } from '../../../components/figures/settlement-sheet-view.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { paths } from '../../../lib/paths.ts';
import { shownLotQuery } from '../api/shown-lot-query.ts';

/** Fetched only where no lot can be shown: it brings the arithmetic along. */
const WorkedExample = lazy(() =>
  import('./worked-example.tsx').then((module) => ({ default: module.WorkedExample })),
);

const asItStands: Readonly<Record<LotAnswer['quoteState'], string>> = {
  fresh: ', as it stands now.',
  partly: ', partly at quotes that are not fresh; its figures may have moved since.',
  stale: ', at the last accepted quotes, which are not fresh; its figures may have moved since.',
  closed: ', at the last quotes before the market closed.',
  none: ', at the quotes that the sheet names; there is none now.',
};

function Example() {
  return (
    <Suspense fallback={<Skeleton lines={7} label="Working out an example" />}>
      <WorkedExample />
    </Suspense>
  );
}

function SheetOfLot({ code }: { code: string }) {
  const { data, isPending } = useQuery(shownLotQuery(code));
  if (isPending) return <Skeleton lines={7} label="Loading the sheet" />;
  if (!data?.sheet) return <Example />;
  return (
    <>
      <SettlementSheetView sheet={data.sheet} />
      <p className="mt-2 text-note text-ink-2">
        The sheet of{' '}
        <Link to={paths.lot(code)} className="link">
          {data.title}
        </Link>
        {asItStands[data.quoteState]}
      </p>
    </>
  );
}

/** A real sheet: of the newest lot, or where there is none of an invented one. */
export function WorkedSheet({ code }: { code: string | null }) {
  return code === null ? <Example /> : <SheetOfLot code={code} />;
}
