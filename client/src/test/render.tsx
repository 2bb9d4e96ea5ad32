import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { Announcer } from '../components/announcer.tsx';

/** Renders as inside the app: theme, server state, announcements, a router at `/`. */
export function renderInApp(content: ReactNode, options: { path?: string; client?: QueryClient } = {}) {
  const client = options.client ?? new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createMemoryRouter([{ path: '*', element: content }], {
    initialEntries: [options.path ?? '/'],
  });
  const view = render(
    <Theme>
      <QueryClientProvider client={client}>
        <Announcer>
          <RouterProvider router={router} />
        </Announcer>
      </QueryClientProvider>
    </Theme>,
  );
  return { ...view, client, router };
}
