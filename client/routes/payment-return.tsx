import { useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { dealQuery } from '../lib/deals.ts';
import { PaymentPage } from '../features/deal-acts/components/payment-page.tsx';
import { queryClient } from '../lib/query-client.ts';

export async function loader({ params }: LoaderFunctionArgs): Promise<null> {
  await queryClient.fetchQuery(dealQuery(params.code ?? ''));
  return null;
}

export function Component() {
  const { code = '' } = useParams();
  const [search] = useSearchParams();
  const arrival = search.get('said') === 'stopped' ? 'stopped' : 'returned';
  return <PaymentPage key={code} code={code} arrival={arrival} />;
}
