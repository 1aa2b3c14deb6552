import { LaboratoriesPage } from '../features/desk/components/laboratories-page.tsx';
import { laboratoriesQuery } from '../features/desk/api/laboratories.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader() {
  await queryClient.fetchQuery(laboratoriesQuery);
  return null;
}

export function Component() {
  return <LaboratoriesPage />;
}
