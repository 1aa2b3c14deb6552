import { AuditPage } from '../features/desk/components/audit-page.tsx';
import { auditQuery } from '../features/desk/api/audit.ts';
import { queryClient } from '../lib/query-client.ts';

export async function loader() {
  await queryClient.fetchInfiniteQuery(auditQuery);
  return null;
}

export function Component() {
  return <AuditPage />;
}
