import { LinkButton } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { paths } from '../../../lib/paths.ts';

/** Why nothing can be handed in yet, and where to mend it. */
export function PayoutsFirst({ id }: { id: string }) {
  return (
    <div id={id} tabIndex={-1} className="mb-6">
      <Notice title="Selling opens after payout onboarding">
        <p>
          Payouts go to an account of yours at the payment provider. Until it is ready a lot can be described
          and kept as a draft, but not handed in.
        </p>
        <LinkButton look="second" to={paths.account()} className="mt-3">
          Set up payouts on the account page
        </LinkButton>
      </Notice>
    </div>
  );
}
