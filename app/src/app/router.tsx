import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { LoadingPage } from './routes/loading-page';
import { RouteFailure } from './routes/route-failure';

// Each route is a module of app/routes that exports `Component` (and `loader` where it has one).
const routes: RouteObject[] = [
  {
    errorElement: <RouteFailure />,
    hydrateFallbackElement: <LoadingPage />,
    children: [{ path: '*', lazy: () => import('./routes/not-found-route') }],
  },
];

export function createRouter() {
  return createBrowserRouter(routes);
}
