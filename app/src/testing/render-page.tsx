import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import type { ReactNode } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';

/** Draws a page as the product does, with a query cache of its own. */
export function renderPage(
  page: ReactNode,
  { path = '/', address = path }: { path?: string; address?: string } = {},
) {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
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
