import { QueryClientProvider } from '@tanstack/react-query';
import { StrictMode } from 'react';
import { I18nProvider } from 'react-aria-components';
import { createRoot } from 'react-dom/client';
import { RouterProvider } from 'react-router-dom';
import './app/zod-words.ts';
import { queryClient } from './app/query-client.ts';
import { startTheme } from './app/theme.ts';
import { router } from './routes.tsx';
import './styles/index.css';

startTheme();

const root = document.getElementById('root');
if (!root) throw new Error('The page has no root element');
createRoot(root).render(
  <StrictMode>
    <I18nProvider locale="en-GB">
      <QueryClientProvider client={queryClient}>
        <RouterProvider router={router} />
      </QueryClientProvider>
    </I18nProvider>
  </StrictMode>,
);
