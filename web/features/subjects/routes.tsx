import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'subjects',
    lazy: async () => ({ Component: (await import('./subjects-page.tsx')).SubjectsPage }),
  },
  {
    path: 'subjects/:subject',
    lazy: async () => ({ Component: (await import('./subject-page.tsx')).SubjectPage }),
  },
];
