import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'accounts',
    lazy: async () => ({ Component: (await import('./accounts-page.tsx')).AccountsPage }),
  },
];
