import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import '../styles/index.css';
import { createQueryClient } from './query-client';
import { createRouter } from './router';
import { startTheme } from './theme';

startTheme();
const place = document.getElementById('root');
if (!place) throw new Error('index.html has lost its element #root.');
createRoot(place).render(
  <StrictMode>
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={createRouter()} />
    </QueryClientProvider>
  </StrictMode>,
);
