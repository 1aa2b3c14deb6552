import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { lotQuery } from '../lib/lot-query.ts';
import { LotPage } from '../features/market/components/lot-page.tsx';
import { queryClient } from '../lib/query-client.ts';
import { sessionQuery } from '../lib/session.ts';

export async function loader({ params }: LoaderFunctionArgs): Promise<null> {
  await Promise.all([queryClient.query(lotQuery(params.code ?? '')), queryClient.query(sessionQuery)]);
  return null;
}

export function Component() {
  const { code = '' } = useParams();
  return <LotPage code={code} />;
}
