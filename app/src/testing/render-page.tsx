import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import type { Person, Session } from '@/lib/api-schema';
import { sessionQueries } from '@/lib/queries/session';

const SESSION: Session = {
  person: null,
  csrfToken: 'token',
  firstRun: false,
  benchName: 'Lantern Yard',
  demo: null,
  hasMailPage: false,
  limits: {
    maxUploadBytes: 1_000_000_000,
    acceptedSampleFormats: ['integer', 'float'],
    minSampleRateHz: 8_000,
    maxSampleRateHz: 768_000,
    maxChannels: 8,
  },
};

interface PageOptions {
  path?: string;
  address?: string;
  /** Who is signed in, for pages that ask. */
  person?: Person;
}

/** Draws a page as the product does, with a query cache of its own. */
export function renderPage(page: ReactNode, { path = '/', address = path, person }: PageOptions = {}) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  if (person) queryClient.setQueryData(sessionQueries.current().queryKey, { ...SESSION, person });
  const router = createMemoryRouter(
    [
      { path, element: page },
      { path: '*', element: <p>elsewhere</p> },
    ],
    { initialEntries: [address] },
  );
  const view = render(
    <QueryClientProvider client={queryClient}>
      <Theme>
        <RouterProvider router={router} />
      </Theme>
    </QueryClientProvider>,
  );
  return { ...view, router, queryClient };
}
