import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { RoleGate } from './role-gate';
import { LoadingPage } from './routes/loading-page';
import { PageFailure, RouteFailure } from './routes/route-failure';
import { EntryGate, SessionGate } from './session-gate';

// Each route is a module of app/routes that exports `Component` (and `loader` where it has one).
const entryRoutes: RouteObject[] = [
  { path: 'sign-in', lazy: () => import('./routes/sign-in-route') },
  { path: 'set-up', lazy: () => import('./routes/set-up-route') },
  { path: 'invitation', lazy: () => import('./routes/invitation-route') },
  { path: 'lost-password', lazy: () => import('./routes/lost-password-route') },
  { path: 'reset', lazy: () => import('./routes/reset-route') },
];

const archiveRoutes: RouteObject[] = [
  { path: 'archive', lazy: () => import('./routes/archive-route') },
  { path: 'captures/:captureId', lazy: () => import('./routes/capture-route') },
  { path: 'records/:recordId', lazy: () => import('./routes/record-route') },
  { path: 'units', lazy: () => import('./routes/units-route') },
  { path: 'units/:unitId', lazy: () => import('./routes/unit-route') },
  { path: 'live', lazy: () => import('./routes/live-route') },
  { path: 'rigs', lazy: () => import('./routes/rigs-route') },
  { path: 'rigs/:rigId', lazy: () => import('./routes/rig-route') },
  { path: 'stimuli', lazy: () => import('./routes/stimuli-route') },
];

const administratorRoutes: RouteObject[] = [
  { path: 'people', lazy: () => import('./routes/people-route') },
  { path: 'people/audit', lazy: () => import('./routes/audit-route') },
  { path: 'people/jobs', lazy: () => import('./routes/jobs-route') },
  { path: 'people/mail', lazy: () => import('./routes/mail-route') },
];

/** A page that breaks is said so in its own place: the rail and the uploads go on. */
const pages: RouteObject = {
  errorElement: <PageFailure />,
  children: [
    { index: true, lazy: () => import('./routes/today-route') },
    { path: 'account', lazy: () => import('./routes/account-route') },
    { element: <RoleGate roles={['technician', 'reviewer', 'administrator']} />, children: archiveRoutes },
    { element: <RoleGate roles={['administrator']} />, children: administratorRoutes },
    { path: '*', lazy: () => import('./routes/not-found-route') },
  ],
};

const routes: RouteObject[] = [
  {
    errorElement: <RouteFailure />,
    hydrateFallbackElement: <LoadingPage />,
    children: [
      { element: <EntryGate />, children: entryRoutes },
      {
        element: <SessionGate />,
        children: [{ lazy: () => import('./routes/shell-route'), children: [pages] }],
      },
    ],
  },
];

export function createRouter() {
  return createBrowserRouter(routes);
}
