import { useMutation, useQueryClient, useSuspenseQuery } from '@tanstack/react-query';
import type { DeadMailRow } from '#shared/schemas/admin.ts';
import { Button } from '../../../components/ui/button.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { VisuallyHidden } from '../../../components/ui/visually-hidden.tsx';
import { deadMailsQuery, sendMailAgain } from '../api/dead-mails.ts';
import { DeskPage } from './desk-page.tsx';

function mailWords(mail: string): string {
  return mail.replaceAll('-', ' ');
}

function SendAgain({ row }: { row: DeadMailRow }) {
  const client = useQueryClient();
  const again = useMutation({
    mutationFn: () => sendMailAgain(row.id),
    onSuccess: () => confirmDone(`The mail to ${row.recipient} is sent with the next round.`),
    // Refused or not: somebody else may have been faster, so the list is read anew.
    onSettled: () => client.invalidateQueries({ queryKey: deadMailsQuery.queryKey }),
  });
  return (
    <div>
      <Button look="second" busy={again.isPending} onClick={() => again.mutate()}>
        Send again
        <VisuallyHidden>
          : {mailWords(row.mail)}, to {row.recipient}
        </VisuallyHidden>
      </Button>
      {again.isError && (
        <p role="alert" className="mt-1 text-note font-medium text-litharge">
          Not ordered: {again.error.message}
        </p>
      )}
    </div>
  );
}

function Line({ row }: { row: DeadMailRow }) {
  return (
    <li className="grid gap-x-6 gap-y-1 border-b border-rule py-3 md:grid-cols-[minmax(0,4fr)_minmax(0,5fr)_minmax(0,5fr)_9rem]">
      <div>
        <span className="font-medium">{mailWords(row.mail)}</span>
        <div className="text-note text-ink-2">
          ordered <Time at={row.orderedAt} />
        </div>
      </div>
      <div className="min-w-0 break-words">
        {row.member?.displayName ?? 'no account known'}
        <div className="text-note text-ink-2">{row.recipient}</div>
      </div>
      <div className="min-w-0 break-words">
        given up <Time at={row.deadSince} />
        <div className="text-note text-ink-2">
          {row.tries === 1 ? 'after 1 try' : `after ${row.tries} tries`}; the last one said:{' '}
          {row.lastError ?? 'nothing'}
        </div>
      </div>
      <SendAgain row={row} />
    </li>
  );
}

/** The mails that nobody tries any more, for an admin to send again once their cause is mended. */
export function DeadMailsPage() {
  const { rows, total } = useSuspenseQuery(deadMailsQuery).data;
  return (
    <DeskPage
      title="Mails that were given up"
      sub="Not accepted after the last try, or refused for good. Mend the cause first, then send again."
    >
      <OfflineNotice />
      {rows.length === 0 ? (
        <EmptyState title="No mail was given up">
          What could not be sent after its last try stands here, with what the mail server said.
        </EmptyState>
      ) : (
        <ol className="border-t border-rule">
          {rows.map((row) => (
            <Line key={row.id} row={row} />
          ))}
        </ol>
      )}
      {total > rows.length && (
        <p className="mt-4 text-note text-ink-2">
          The newest {rows.length} of {total}. Others follow as these are sent.
        </p>
      )}
    </DeskPage>
  );
}
