import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'records',
    lazy: async () => ({ Component: (await import('./records-page.tsx')).RecordsPage }),
  },
  {
    path: 'records/:record',
    lazy: async () => ({ Component: (await import('./record-page.tsx')).RecordPage }),
  },
];
