/** Every route of the application, by noun. A feature is served once its line stands here. */
import type { RouteDefinition } from '../http/route.ts';

export const featureRoutes: readonly RouteDefinition[] = [];
