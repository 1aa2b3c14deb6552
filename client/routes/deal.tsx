import { redirect, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { dealQuery } from '../lib/deals.ts';
import { DealRegister } from '../features/deal-acts/components/deal-register.tsx';
import { DealPage } from '../features/deals/components/deal-page.tsx';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

/** The payment provider sends the buyer to the deal's own address, marked; its answer has a page of its own. */
export async function loader({ params, request }: LoaderFunctionArgs) {
  const code = params.code ?? '';
  const payment = new URL(request.url).searchParams.get('payment');
  if (payment === 'returned' || payment === 'stopped') return redirect(paths.dealPayment(code, payment));
  await queryClient.fetchQuery(dealQuery(code));
  return null;
}

export function Component() {
  const { code = '' } = useParams();
  return <DealPage key={code} code={code} Register={DealRegister} />;
}
