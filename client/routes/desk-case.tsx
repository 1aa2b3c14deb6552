import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { CasePage } from '../features/desk/components/case-page.tsx';
import { caseQuery } from '../features/desk/api/certificates.ts';
import { laboratoriesQuery } from '../features/desk/api/laboratories.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader({ params }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.fetchQuery(caseQuery(params['id'] ?? '')),
    queryClient.fetchQuery(laboratoriesQuery),
  ]);
  return null;
}

export function Component() {
  const { id = '' } = useParams();
  return <CasePage key={id} id={id} />;
}
