import { useQuery } from '@tanstack/react-query';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { EmptyState } from '../../../components/ui/empty-state.tsx';
import { ErrorState } from '../../../components/ui/error-state.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { OfflineNotice } from '../../../components/ui/offline-notice.tsx';
import { Page } from '../../../components/ui/page.tsx';
import { Skeleton } from '../../../components/ui/skeleton.tsx';
import { myLotsQuery } from '../../../lib/lots.ts';
import { paths } from '../../../lib/paths.ts';
import { useMember } from '../../../lib/session.ts';
import { stateWords } from '../lot-state-words.ts';
import { MyLotRow, type MyLot } from './my-lot-row.tsx';
import { NewLotButton } from './new-lot-button.tsx';

const groups = [
  { key: 'todo', title: 'Waiting for you' },
  { key: 'running', title: 'Running' },
  { key: 'ended', title: 'Ended' },
] as const;

/** All lots of a member, in the order of what they ask for. */
export function MyLotsPage() {
  const member = useMember();
  const { data, error, refetch } = useQuery(myLotsQuery);
  const lots = data?.lots ?? [];
  return (
    <Page
      title="Lots you sell"
      sub="From the first draft to the deal"
      aside={lots.length > 0 && <NewLotButton />}
    >
      <OfflineNotice />
      {member && !member.can.sell && <PayoutsPanel suspended={member.suspendedAt !== null} />}
      {error && !data && <ErrorState error={error} what="Your lots" onRetry={() => void refetch()} />}
      {!data && !error && <Skeleton lines={5} label="Loading your lots" />}
      {data && lots.length === 0 && (
        <EmptyState
          title="You have no lots yet"
          drawing={<SpecimenDrawing form="button" label={null} />}
          action={<NewLotButton />}
        >
          Weigh the piece, have its certificate at hand, and describe it: what it is worth stands beside the
          form while you type.
        </EmptyState>
      )}
      {groups.map(({ key, title }) => (
        <Group key={key} title={title} lots={lots.filter((lot) => stateWords[lot.state].group === key)} />
      ))}
    </Page>
  );
}

function Group({ title, lots }: { title: string; lots: MyLot[] }) {
  if (lots.length === 0) return null;
  return (
    <section aria-label={title} className="mb-10">
      <h2 className="mb-2">
        {title} <span className="fig text-note font-normal text-ink-2">{lots.length}</span>
      </h2>
      <ul className="border-b border-rule">
        {lots.map((lot) => (
          <MyLotRow key={lot.code} lot={lot} />
        ))}
      </ul>
    </section>
  );
}

function PayoutsPanel({ suspended }: { suspended: boolean }) {
  if (suspended)
    return (
      <Notice tone="attention" title="This account is suspended" className="mb-6">
        Lots cannot be handed in or changed until the desk lifts it.
      </Notice>
    );
  return (
    <Notice title="Selling opens after payout onboarding" className="mb-6">
      <p>
        Payouts go to an account of yours at the payment provider. Drafts may be written before; handing a lot
        to the desk waits until the account is ready.
      </p>
      <LinkButton look="second" to={paths.account()} className="mt-3">
        Set up payouts on the account page
      </LinkButton>
    </Notice>
  );
}
