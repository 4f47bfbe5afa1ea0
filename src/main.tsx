import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import { keepPagesOffline } from './lib/offline.js';
import { startPreferences } from './lib/preferences.js';
import { queryClient } from './lib/query-client.js';
import { router } from './router.js';
import './styles.css';

startPreferences();
keepPagesOffline();
const root = document.getElementById('root');
if (!root) throw new Error('index.html has no #root');
createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  </StrictMode>,
);
