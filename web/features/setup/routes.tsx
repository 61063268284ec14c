import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'setup',
    lazy: async () => ({ Component: (await import('./setup-page.tsx')).SetupPage }),
  },
];
