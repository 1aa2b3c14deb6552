import { useSuspenseQuery } from '@tanstack/react-query';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { queueQuery } from '../api/certificates.ts';
import { DeskPage } from './desk-page.tsx';
import { QueueList } from './queue-list.tsx';

/** What waits for the desk, oldest first, and what it decided last. */
export function QueuePage() {
  const { data } = useSuspenseQuery({ ...queueQuery, refetchInterval: 30_000 });
  return (
    <DeskPage title="Certificates" sub="Oldest first. Claim a case before you decide on it.">
      <section aria-labelledby="waiting-heading">
        <h2 id="waiting-heading" className="mb-3">
          Waiting
        </h2>
        {data.waiting.length === 0 ? (
          <EmptyState title="Nothing waits">New certificates appear here as sellers hand them in.</EmptyState>
        ) : (
          <QueueList rows={data.waiting} isWaiting />
        )}
      </section>
      {data.decided.length > 0 && (
        <section aria-labelledby="decided-heading" className="mt-10">
          <h2 id="decided-heading" className="mb-3">
            Decided last
          </h2>
          <QueueList rows={data.decided} isWaiting={false} />
        </section>
      )}
    </DeskPage>
  );
}
