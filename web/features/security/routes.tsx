import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'security-log',
    lazy: async () => ({ Component: (await import('./security-log-page.tsx')).SecurityLogPage }),
  },
];
