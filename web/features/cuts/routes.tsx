import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'cuts',
    lazy: async () => ({ Component: (await import('./cuts-page.tsx')).CutsPage }),
  },
  {
    path: 'cuts/new',
    lazy: async () => ({ Component: (await import('./freeze-page.tsx')).FreezePage }),
  },
  {
    path: 'cuts/:cut',
    lazy: async () => ({ Component: (await import('./cut-page.tsx')).CutPage }),
  },
];
