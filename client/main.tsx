import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { Providers } from './app/providers.tsx';
import { reloadOnLostChunk } from './app/reload-on-lost-chunk.ts';
import { createAppRouter } from './app/router.tsx';

const container = document.getElementById('root');
if (!container) throw new Error('index.html has no element with the id "root"');

const router = createAppRouter();
reloadOnLostChunk({ goingTo: () => router.state.navigation.location ?? null });

createRoot(container).render(
  <StrictMode>
    <Providers router={router} />
  </StrictMode>,
);
