import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  { path: 'help', lazy: async () => ({ Component: (await import('./help-page.tsx')).HelpPage }) },
];
