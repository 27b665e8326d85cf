import './zod-without-eval.ts';
import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { queryClient } from './api/query-client.ts';
import { router } from './app/router.tsx';
import './index.css';

const root = document.getElementById('root');
if (!root) throw new Error('index.html has no element with the id root.');
createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  </StrictMode>,
);
