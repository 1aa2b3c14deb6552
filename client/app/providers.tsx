import { QueryClientProvider } from '@tanstack/react-query';
import { RouterProvider } from 'react-router-dom';
import { queryClient } from '../lib/query-client.ts';
import type { createAppRouter } from './router.tsx';

type ProvidersProps = { router: ReturnType<typeof createAppRouter> };

export function Providers({ router }: ProvidersProps) {
  return (
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  );
}
