import { redirect, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { lotQuery } from '../lib/lot-query.ts';
import { PurchasePage } from '../features/purchase/components/purchase-page.tsx';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { sessionQuery } from '../lib/session.ts';

/** Only a member buys; whoever is not signed in comes back here afterwards. */
export async function loader({ params }: LoaderFunctionArgs): Promise<Response | null> {
  const code = params.code ?? '';
  const { member } = await queryClient.query(sessionQuery);
  if (member === null) return redirect(paths.signIn(paths.purchase(code)));
  await queryClient.query({ ...lotQuery(code), staleTime: 0 });
  return null;
}

export function Component() {
  const { code = '' } = useParams();
  return <PurchasePage code={code} />;
}
