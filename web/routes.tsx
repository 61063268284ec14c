/** The only place where features meet. Each page is a chunk of its own, loaded when it is opened. */
import { createBrowserRouter, type RouteObject } from 'react-router-dom';
import { RouteFailed } from './app/layout/route-failed.tsx';
import { routes as account } from './features/account/routes.tsx';
import { routes as accounts } from './features/accounts/routes.tsx';
import { routes as check } from './features/check/routes.tsx';
import { routes as cuts } from './features/cuts/routes.tsx';
import { routes as fit } from './features/fit/routes.tsx';
import { routes as home, studyRoutes as studyHome } from './features/home/routes.tsx';
import { routes as importing } from './features/import/routes.tsx';
import { routes as members } from './features/members/routes.tsx';
import { routes as records } from './features/records/routes.tsx';
import { routes as security } from './features/security/routes.tsx';
import { routes as setup } from './features/setup/routes.tsx';
import { routes as signIn } from './features/sign-in/routes.tsx';
import { routes as subjects } from './features/subjects/routes.tsx';
import { routes as help } from './help/routes.tsx';

/** Pages under /studies/:study; paths are relative to it. */
const inStudy: RouteObject[] = [
  ...studyHome,
  ...members,
  ...setup,
  ...subjects,
  ...importing,
  ...cuts,
  ...check,
  ...fit,
  ...records,
];

/** Pages outside a study. */
const outside: RouteObject[] = [...home, ...account, ...accounts, ...security, ...help];

export const router = createBrowserRouter([
  {
    errorElement: <RouteFailed />,
    HydrateFallback: () => null,
    children: [
      ...signIn,
      {
        lazy: async () => ({
          Component: (await import('./app/layout/session-gate.tsx')).SessionGate,
        }),
        children: [
          {
            errorElement: <RouteFailed />,
            children: [
              ...outside,
              {
                path: 'studies/:study',
                lazy: async () => {
                  const gate = await import('./app/layout/study-gate.tsx');
                  return { Component: gate.StudyGate, loader: gate.studyLoader };
                },
                children: inStudy,
              },
              {
                path: '*',
                lazy: async () => ({
                  Component: (await import('./app/layout/study-gate.tsx')).NotFound,
                }),
              },
            ],
          },
        ],
      },
    ],
  },
]);
