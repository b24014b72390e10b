import type { Request, Response, Router } from 'express';
import type { z } from 'zod';
import { may, roles, type Capability } from '../../shared/roles.js';
import type { Actor, AppContext } from '../context.js';
import { DomainError, forbidden, invalid } from '../errors.js';
import { requireSession } from '../middleware/session.js';
import { fieldErrors, unkeepableParts } from '../validation.js';

type Parsed<T> = T extends z.ZodType ? z.output<T> : undefined;

export interface RouteInput<P, Q, B> {
  params: Parsed<P>;
  query: Parsed<Q>;
  body: Parsed<B>;
}

/** One operation: who may, what goes in, what comes out, and the service that does it. The router and the OpenAPI document are both made of it. */
export interface Route<
  P extends z.ZodType | undefined = z.ZodType | undefined,
  Q extends z.ZodType | undefined = z.ZodType | undefined,
  B extends z.ZodType | undefined = z.ZodType | undefined,
> {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Under /api/v1, with `:name` for parameters. */
  path: string;
  tag: string;
  summary: string;
  /** `public`, or the capability that one of the person’s roles must grant. */
  access: 'public' | Capability;
  params?: P;
  query?: Q;
  body?: B;
  /** Status and schema of the answer; no schema for 204. */
  answers: { status: number; schema?: z.ZodType };
  /** Refusals of its own, beside those that follow from session, role and input. */
  refusals?: { status: number; when: string }[];
  handle: (call: {
    context: AppContext;
    actor: Actor;
    input: RouteInput<P, Q, B>;
    request: Request;
    response: Response;
  }) => Promise<unknown>;
}

/** Keeps the types of one route’s input together. */
export function defineRoute<
  P extends z.ZodType | undefined = undefined,
  Q extends z.ZodType | undefined = undefined,
  B extends z.ZodType | undefined = undefined,
>(route: Route<P, Q, B>): Route {
  return route;
}

function parse(schema: z.ZodType | undefined, value: unknown): unknown {
  if (!schema) return undefined;
  const unkeepable = unkeepableParts(value);
  if (unkeepable.length > 0) throw invalid(unkeepable);
  const parsed = schema.safeParse(value, { reportInput: true });
  if (!parsed.success) throw invalid(fieldErrors(parsed.error));
  return parsed.data;
}

/** A parameter that cannot be an id names nothing that is there. */
function parseParameters(schema: z.ZodType | undefined, value: unknown): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value);
  if (!parsed.success || unkeepableParts(value).length > 0)
    throw new DomainError(404, 'not-found', 'There is no such thing');
  return parsed.data;
}

function checkCapability(actor: Actor, access: Capability): void {
  if (may(actor.roles, access)) return;
  throw forbidden(
    `None of your roles (${roles.filter((role) => actor.roles.includes(role)).join(', ')}) may do this`,
    'role-missing',
  );
}

/** Adds every route to the router: session, role, input, service, answer – in this order. */
export function mountRoutes(router: Router, routes: readonly Route[], context: AppContext): void {
  const session = requireSession(context);
  for (const route of routes) {
    const guards = route.access === 'public' ? [] : [session];
    router[route.method](route.path, ...guards, async (request: Request, response: Response) => {
      const actor = response.locals.actor as Actor;
      if (route.access !== 'public') checkCapability(actor, route.access);
      const input = {
        params: parseParameters(route.params, request.params),
        query: parse(route.query, request.query),
        body: parse(route.body, request.body as unknown),
      };
      response.locals.input = input;
      const answer = await route.handle({ context, actor, input: input, request, response });
      if (response.headersSent) return;
      if (answer === undefined) response.status(route.answers.status).end();
      else response.status(route.answers.status).json(answer);
    });
  }
}
