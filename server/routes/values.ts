import { z } from 'zod';
import { listQuerySchema } from '../../shared/schemas/list.js';
import {
  finishListSchema,
  finishVersionSchema,
  materialListSchema,
  materialVersionSchema,
  partTypeListSchema,
  partTypeVersionSchema,
  ruleSetListSchema,
  ruleSetVersionSchema,
} from '../../shared/schemas/reference-lists.js';
import { getValue, listValues, type ValueKind } from '../services/values.js';
import { defineRoute, type Route } from './define.js';

/** An id or a slug. */
const keySchema = z.object({ key: z.string().min(1).max(80) });

function routesOf(path: string, kind: ValueKind, what: string, list: z.ZodType, item: z.ZodType): Route[] {
  return [
    defineRoute({
      method: 'get',
      path: `/${path}`,
      tag: 'Values',
      summary: `${what}, newest versions`,
      access: 'read',
      query: listQuerySchema,
      answers: { status: 200, schema: list },
      handle: ({ context, input }) => listValues(context, kind, input.query),
    }),
    defineRoute({
      method: 'get',
      path: `/${path}/:key`,
      tag: 'Values',
      summary: `One of the ${what.toLowerCase()}, by id or slug`,
      access: 'read',
      params: keySchema,
      answers: { status: 200, schema: item },
      handle: ({ context, input }) => getValue(context, kind, input.params.key),
    }),
  ];
}

export const valueRoutes = [
  ...routesOf('materials', 'material', 'Materials', materialListSchema, materialVersionSchema),
  ...routesOf('finishes', 'finish', 'Finishes', finishListSchema, finishVersionSchema),
  ...routesOf('parts', 'part-type', 'Part types', partTypeListSchema, partTypeVersionSchema),
  ...routesOf('rule-sets', 'rule-set', 'Rule sets', ruleSetListSchema, ruleSetVersionSchema),
];
