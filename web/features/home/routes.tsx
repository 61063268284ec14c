import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    index: true,
    lazy: async () => ({ Component: (await import('./home-page.tsx')).HomePage }),
  },
];

export const studyRoutes: RouteObject[] = [
  {
    index: true,
    lazy: async () => ({ Component: (await import('./study-home-page.tsx')).StudyHomePage }),
  },
];
