/** Every route of the application, by noun. A feature is served once its line stands here. */
import type { RouteDefinition } from '../http/route.ts';
import { routes as accountRoutes } from './accounts/routes.ts';
import { routes as analysisRoutes } from './analysis/routes.ts';
import { routes as cutRoutes } from './cuts/routes.ts';
import { docsRoutes } from './docs/routes.ts';
import { routes as healthRoutes } from './health/routes.ts';
import { routes as importRoutes } from './imports/routes.ts';
import { routes as jobRoutes } from './jobs/routes.ts';
import { routes as memberRoutes } from './members/routes.ts';
import { routes as metricsRoutes } from './metrics/routes.ts';
import { routes as recordRoutes } from './records/routes.ts';
import { routes as securityLogRoutes } from './security-log/routes.ts';
import { routes as sessionRoutes } from './session/routes.ts';
import { routes as setupRoutes } from './setup/routes.ts';
import { routes as studyRoutes } from './studies/routes.ts';
import { routes as subjectRoutes } from './subjects/routes.ts';

export const featureRoutes: readonly RouteDefinition[] = [
  ...healthRoutes,
  ...metricsRoutes,
  ...docsRoutes(() => featureRoutes),
  ...sessionRoutes,
  ...accountRoutes,
  ...securityLogRoutes,
  ...studyRoutes,
  ...memberRoutes,
  ...setupRoutes,
  ...subjectRoutes,
  ...jobRoutes,
  ...importRoutes,
  ...cutRoutes,
  ...analysisRoutes,
  ...recordRoutes,
];
