import { assemblyRoutes } from './assemblies.js';
import { computingRoutes } from './computing.js';
import { decisionRoutes } from './decisions.js';
import type { Route } from './define.js';
import { healthRoutes } from './health.js';
import { memberRoutes } from './members.js';
import { sessionRoutes } from './session.js';
import { valueRoutes } from './values.js';

/** Every route under /api/v1. Fixed paths come before those with a parameter in their place. */
export const allRoutes: readonly Route[] = [
  ...healthRoutes,
  ...sessionRoutes,
  ...memberRoutes,
  ...computingRoutes,
  ...valueRoutes,
  ...assemblyRoutes,
  ...decisionRoutes,
];
