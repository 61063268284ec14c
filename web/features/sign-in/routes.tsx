import type { RouteObject } from 'react-router-dom';
import { SignInPage } from './sign-in-page.tsx';

/** The first page anyone loads, so it is no chunk of its own. */
export const routes: RouteObject[] = [{ path: 'sign-in', element: <SignInPage /> }];
