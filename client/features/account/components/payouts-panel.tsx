import type { MemberAnswer } from '#shared/schemas/session.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { usePayouts, type PayoutsArrival } from '../hooks/use-payouts.ts';
import { requirementWords } from '../requirement-words.ts';

type Payouts = MemberAnswer['payouts'];

const stateWords: Record<Payouts['state'], { stamp: string; text: string }> = {
  none: {
    stamp: 'not opened',
    text: 'Sellers are paid through an account at our payment provider. Who you are and where your bank is, you tell the provider on its own page; Scruple never sees it. Until payouts are open you can write drafts, but not submit a lot.',
  },
  started: {
    stamp: 'not finished',
    text: 'The account at the payment provider exists, but it cannot receive payouts yet.',
  },
  ready: {
    stamp: 'open',
    text: 'Payouts are open: you can sell. Each deal is paid out by itself, after the final sheet.',
  },
};

type PayoutsPanelProps = { payouts: Payouts; arrival: PayoutsArrival };

/** Where payout onboarding stands, in words, and the way to the provider's page. */
export function PayoutsPanel({ payouts, arrival }: PayoutsPanelProps) {
  const { open, refresh } = usePayouts(arrival);
  const { stamp, text } = stateWords[payouts.state];
  const asked = requirementWords(payouts.requirements);
  return (
    <div className="flex max-w-lg flex-col gap-4">
      <p>
        <Stamp tone={payouts.state === 'ready' ? 'good' : 'plain'}>{stamp}</Stamp>
      </p>
      <p>{text}</p>
      {asked.length > 0 && (
        <div>
          <p>The provider still asks for:</p>
          <ul className="mt-1 list-disc pl-5">
            {asked.map((item) => (
              <li key={item}>{item}</li>
            ))}
          </ul>
        </div>
      )}
      <Arrived arrival={arrival} payouts={payouts} refresh={refresh} />
      {arrival === 'again' && open.isPending && (
        <Notice role="status" title="The provider’s link had run out">
          Making a new one; you are on your way back to its page.
        </Notice>
      )}
      {open.isError && (
        <Notice tone="attention" role="alert" title="The provider’s page did not open">
          {open.error.message}
        </Notice>
      )}
      <div className="flex flex-wrap gap-3">
        <Button
          look={payouts.state === 'ready' ? 'second' : 'main'}
          busy={open.isPending || open.isSuccess}
          busyText="Opening the provider’s page"
          onClick={() => open.mutate()}
        >
          Open payouts at the provider
        </Button>
        {payouts.state !== 'none' && (
          <Button
            look="quiet"
            busy={refresh.isPending}
            busyText="Asking the provider"
            onClick={() => refresh.mutate()}
          >
            Ask the provider again
          </Button>
        )}
      </div>
    </div>
  );
}

type ArrivedProps = {
  arrival: PayoutsArrival;
  payouts: Payouts;
  refresh: ReturnType<typeof usePayouts>['refresh'];
};

/** The truth after a return: what the provider answered, not that somebody came back. */
function Arrived({ arrival, payouts, refresh }: ArrivedProps) {
  if (refresh.isError)
    return (
      <Notice tone="attention" role="alert" title="The provider could not be asked">
        {refresh.error.message} What stands above is what was last known.
      </Notice>
    );
  if (arrival !== 'returned') return null;
  if (refresh.isPending)
    return (
      <Notice role="status" title="Back from the provider">
        The page you come from proves nothing: we ask the provider how your account stands.
      </Notice>
    );
  if (!refresh.isSuccess) return null;
  if (payouts.state === 'ready')
    return (
      <Notice tone="good" role="status" title="The provider says: payouts are open">
        You can submit your lots now.
      </Notice>
    );
  return (
    <Notice tone="attention" role="status" title="The provider says: not finished yet">
      {payouts.requirements.length > 0
        ? 'Go back to its page and complete what is named above.'
        : 'It is still checking what you entered. That can take a while; nothing is asked of you now.'}
    </Notice>
  );
}
