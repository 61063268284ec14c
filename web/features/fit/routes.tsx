import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'fit',
    lazy: async () => ({ Component: (await import('./fit-page.tsx')).FitPage }),
  },
];
