import './lib/zod-setting.ts';
import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { reloadRestoredPages } from './app/restored-page.ts';
import { sessionQuery } from './app/session.tsx';
import { startI18n } from './lib/i18n.ts';
import { createQueryClient } from './lib/query-client.ts';
import { createRouter } from './router.tsx';
import './styles/app.css';

const root = document.getElementById('root');
if (!root) throw new Error('The page has no element #root.');

reloadRestoredPages();

const queryClient = createQueryClient();
// Who is signed in decides every screen, so it is asked for while the screen's code is on its way.
void queryClient.prefetchQuery(sessionQuery);

await startI18n();
createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={createRouter()} />
    </QueryClientProvider>
  </StrictMode>,
);
