import './styles/index.css';
import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { createQueryClient } from './query-client.ts';
import { createRouter } from './router.tsx';

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
