import type { RouteObject } from 'react-router-dom';

export const routes: RouteObject[] = [
  {
    path: 'account',
    lazy: async () => ({ Component: (await import('./account-page.tsx')).AccountPage }),
  },
  {
    path: 'new-password',
    lazy: async () => ({
      Component: (await import('./first-password-page.tsx')).FirstPasswordPage,
    }),
  },
];
