import { useSuspenseQuery } from '@tanstack/react-query';
import type { DealRow } from '#shared/schemas/deals.ts';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { paths } from '../../../lib/paths.ts';
import { dealsQuery } from '../../../lib/deals.ts';
import { DealList } from './deal-list.tsx';

type PartProps = { id: string; title: string; rows: DealRow[]; empty: string };

function Part({ id, title, rows, empty }: PartProps) {
  return (
    <section aria-labelledby={id} className="mt-10 first:mt-0">
      <h2 id={id} className="border-b border-ink pb-2">
        {title} <span className="fig text-body font-normal text-ink-2">{rows.length}</span>
      </h2>
      {rows.length === 0 ? <p className="py-4 text-ink-2">{empty}</p> : <DealList rows={rows} />}
    </section>
  );
}

/** Where I stand: what waits for me, what runs without me, what is over. */
export function DealsPage() {
  const { data } = useSuspenseQuery(dealsQuery);
  const isEmpty = data.toDo.length + data.running.length + data.closed.length === 0;
  return (
    <Page title="Where I stand" sub="Your deals as buyer and as seller, the latest change first.">
      <OfflineNotice />
      {isEmpty ? (
        <EmptyState
          title="No deal yet"
          drawing={<SpecimenDrawing form="bar" label={null} />}
          action={<LinkButton to={paths.register()}>Open the register of lots</LinkButton>}
        >
          A deal begins when you buy a lot, or somebody buys yours. From then on it stands here, with what is
          due next and what silence will mean.
        </EmptyState>
      ) : (
        <>
          <Part id="to-do" title="To do" rows={data.toDo} empty="Nothing waits for you." />
          <Part id="running" title="Running" rows={data.running} empty="Nothing runs without you." />
          <Part id="closed" title="Closed" rows={data.closed} empty="Nothing has come to its end yet." />
        </>
      )}
    </Page>
  );
}
