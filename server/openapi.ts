import { createDocument, type ZodOpenApiOperationObject, type ZodOpenApiPathsObject } from 'zod-openapi';
import { roles } from '../shared/roles.js';
import { capabilities } from '../shared/roles.js';
import { problemSchema } from '../shared/schemas/problem.js';
import type { Route } from './routes/define.js';
import { version } from './services/health.js';

const problem = (description: string) => ({
  description,
  content: { 'application/problem+json': { schema: problemSchema } },
});

function operation(route: Route): ZodOpenApiOperationObject {
  const isPublic = route.access === 'public';
  const granted = route.access === 'public' ? [] : capabilities[route.access];
  const who = granted.length === roles.length ? 'Every member of the team.' : `Roles: ${granted.join(', ')}.`;
  const { status, schema } = route.answers;
  return {
    operationId: `${route.method}${route.path.replace(/[/:-]+(\w)/g, (_, letter: string) => letter.toUpperCase())}`,
    summary: route.summary,
    description: isPublic ? 'Needs no session.' : who,
    tags: [route.tag],
    security: isPublic ? [] : [{ session: [] }],
    'x-capability': route.access,
    ...(route.params || route.query
      ? {
          requestParams: {
            ...(route.params ? { path: route.params as never } : {}),
            ...(route.query ? { query: route.query as never } : {}),
          },
        }
      : {}),
    ...(route.body ? { requestBody: { required: true, content: { 'application/json': { schema: route.body } } } } : {}),
    responses: {
      [String(status)]: schema
        ? { description: 'Done', content: { 'application/json': { schema } } }
        : { description: 'Done, nothing to say' },
      ...Object.fromEntries((route.refusals ?? []).map(({ status: code, when }) => [String(code), problem(when)])),
      ...(isPublic ? {} : { '401': problem('Not signed in'), '403': problem('None of your roles may do this') }),
      ...(route.params ? { '404': problem('Not there, or another team’s') } : {}),
      ...(route.body
        ? {
            '400': problem('Not readable'),
            '409': problem('Somebody was faster'),
            '422': problem('Not valid, by field'),
          }
        : {}),
      '503': problem('A part is down'),
    },
  };
}

/** The OpenAPI 3.1 document, made of the same routes that the router mounts. */
export function openApiDocument(routes: readonly Route[]): unknown {
  const paths: ZodOpenApiPathsObject = {};
  for (const route of routes) {
    const path = `/api/v1${route.path.replace(/:(\w+)/g, '{$1}')}`;
    paths[path] = { ...paths[path], [route.method]: operation(route) };
  }
  return createDocument({
    openapi: '3.1.0',
    info: {
      title: 'Trimwick',
      version,
      description: 'Thermal derating and enclosure heat workbench. Estimates are for design, not a certification.',
    },
    components: { securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'trimwick_access' } } },
    paths,
  });
}
