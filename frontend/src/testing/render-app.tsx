import type { QueryClient } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ReactNode } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import type { SessionDto } from '@stayledger/shared/contracts/auth';
import { Providers } from '../app/providers';
import { routes } from '../app/router';
import { createQueryClient } from '../lib/query-client';
import { SessionProvider } from '../lib/session';
import { sampleSession } from './samples';

/** The whole application at an address, with the routes it really has. */
export function renderApp(path: string) {
  const router = createMemoryRouter(routes, { initialEntries: [path] });
  const view = render(
    <Providers queryClient={quietClient()}>
      <RouterProvider router={router} />
    </Providers>,
  );
  return { ...view, router, user: userEvent.setup() };
}

/** One component below the providers it may ask for. */
export function renderWithin(element: ReactNode, session: SessionDto = sampleSession('rigger')) {
  const router = createMemoryRouter([{ path: '*', element }], { initialEntries: ['/'] });
  const view = render(
    <Providers queryClient={quietClient()}>
      <SessionProvider session={session}>
        <RouterProvider router={router} />
      </SessionProvider>
    </Providers>,
  );
  return { ...view, router, user: userEvent.setup() };
}

/** The real client, without waiting between retries. */
function quietClient(): QueryClient {
  const client = createQueryClient();
  client.setDefaultOptions({ queries: { retry: false }, mutations: { retry: false } });
  return client;
}
