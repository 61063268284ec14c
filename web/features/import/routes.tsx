import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'import',
    lazy: async () => ({ Component: (await import('./imports-page.tsx')).ImportsPage }),
  },
  {
    path: 'import/:import',
    lazy: async () => ({ Component: (await import('./import-page.tsx')).ImportPage }),
  },
];
