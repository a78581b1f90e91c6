import { QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import { RouterProvider } from 'react-router-dom';
import { createQueryClient } from '../lib/query-client';
import { createRouter } from './router';
import { useThemeOnPage } from './theme';

/** One query client and one router for the page's life. */
export function App() {
  const [{ queryClient, router }] = useState(() => {
    const client = createQueryClient();
    return { queryClient: client, router: createRouter(client) };
  });
  useThemeOnPage();
  return (
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  );
}
