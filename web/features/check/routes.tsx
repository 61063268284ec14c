import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'check',
    lazy: async () => ({ Component: (await import('./check-page.tsx')).CheckPage }),
  },
];
