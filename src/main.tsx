import './styles/index.css';
import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { config } from 'zod/v4/core';
import { createQueryClient } from './query-client.ts';
import { createRouter } from './router.tsx';

// With its first object schema Zod tries `new Function`, which the page's content policy would report. Which chunk makes
// the first one is the bundler's choice; none is loaded yet.
config({ jitless: true });

const root = document.getElementById('root');
if (!root) throw new Error('index.html has no element with the id "root"');

const queryClient = createQueryClient();

createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={createRouter(queryClient)} />
    </QueryClientProvider>
  </StrictMode>,
);
