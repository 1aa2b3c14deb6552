import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Providers } from './app/providers.tsx';
import { createAppRouter } from './app/router.tsx';

const container = document.getElementById('root');
if (!container) throw new Error('index.html has no element with the id "root"');

createRoot(container).render(
  <StrictMode>
    <Providers router={createAppRouter()} />
  </StrictMode>,
);
