import { Money } from '../../../components/figures/money.tsx';
import { LinkButton } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { ApiProblem, OfflineError } from '../../../lib/api-client.ts';
import { paths } from '../../../lib/paths.ts';

type PurchaseRefusalProps = {
  error: unknown;
  code: string;
  totalBefore: string | null;
  totalNow: string | null;
};

/** Why the purchase was not made, where it was asked for, and what can be done. */
export function PurchaseRefusal({ error, code, totalBefore, totalNow }: PurchaseRefusalProps) {
  const problem = error instanceof ApiProblem ? error.code : null;
  const others = (
    <LinkButton look="second" to={paths.register()} className="mt-3">
      Look at the other open lots
    </LinkButton>
  );
  if (error instanceof OfflineError)
    return (
      <Notice tone="attention" role="alert" title="No answer came">
        It is not known whether the purchase arrived. Press the button again: it is the same purchase, and it
        is made once.
      </Notice>
    );
  if (problem === 'lot-taken')
    return (
      <Notice tone="attention" role="alert" title="Another buyer was first">
        This lot is agreed with somebody else. Nothing was bought and nothing is owed.
        <div>{others}</div>
      </Notice>
    );
  if (problem === 'lot-not-open')
    return (
      <Notice tone="attention" role="alert" title="The lot is no longer offered">
        Nothing was bought and nothing is owed.
        <div>{others}</div>
      </Notice>
    );
  if (problem === 'price-fix-ended' || problem === 'price-fix-required')
    return (
      <Notice tone="attention" role="alert" title="The price fix has ended">
        Nothing was bought and nothing is owed. The price follows the quote again.
        <div>
          <LinkButton look="second" to={paths.lot(code)} className="mt-3">
            Back to the lot
          </LinkButton>
        </div>
      </Notice>
    );
  if (problem === 'price-changed')
    return (
      <Notice tone="attention" role="alert" title="The total has changed">
        {totalBefore && totalNow && totalBefore !== totalNow ? (
          <>
            It was <Money value={totalBefore} /> and is now{' '}
            <Money value={totalNow} className="font-semibold" />. Nothing was bought. If you agree to the new
            total, press the button again.
          </>
        ) : (
          'Price or parcel charge changed while you were here. Nothing was bought; look at the total again.'
        )}
      </Notice>
    );
  if (problem === 'own-lot')
    return (
      <Notice tone="attention" role="alert" title="This lot is your own">
        It cannot be bought by its seller.
      </Notice>
    );
  if (problem === 'sign-in-required')
    return (
      <Notice tone="attention" role="alert" title="You have been signed out">
        What you typed is kept in this tab.
        <div>
          <LinkButton look="second" to={paths.signIn(paths.purchase(code))} className="mt-3">
            Sign in and come back
          </LinkButton>
        </div>
      </Notice>
    );
  return (
    <Notice tone="attention" role="alert" title="The purchase was not made">
      {error instanceof ApiProblem ? error.detail : 'Something went wrong on this page. Try again.'}
    </Notice>
  );
}
