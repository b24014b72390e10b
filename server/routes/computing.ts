import { z } from 'zod';
import { assemblyDocumentSchema } from '../../shared/schemas/assembly.js';
import { compileAnswerSchema, estimateRequestSchema, estimateSchema } from '../../shared/schemas/estimate.js';
import { correlationListSchema } from '../../shared/schemas/correlation.js';
import { networkDocumentSchema } from '../../shared/schemas/network.js';
import { ceilingAnswerSchema, ceilingRequestSchema, solveAnswerSchema } from '../../shared/schemas/network-answers.js';
import { compileDocument, estimateDocument, listCorrelations, networkCeiling } from '../services/computing.js';
import { defineRoute } from './define.js';

const tag = 'Computing';

export const computingRoutes = [
  defineRoute({
    method: 'get',
    path: '/correlations',
    tag,
    summary: 'Every published correlation that the engine computes with: formula, range, source',
    access: 'read',
    answers: { status: 200, schema: correlationListSchema },
    handle: () => Promise.resolve(listCorrelations()),
  }),
  defineRoute({
    method: 'post',
    path: '/networks/solve',
    tag,
    summary: 'Steady state of a network document',
    access: 'read',
    query: z.object({ compare: z.enum(['true', 'false']).default('false') }),
    body: networkDocumentSchema,
    answers: { status: 200, schema: solveAnswerSchema },
    handle: ({ context, input }) =>
      context.workers.run('solve', { document: input.body, compare: input.query.compare === 'true' }),
  }),
  defineRoute({
    method: 'post',
    path: '/networks/ceiling',
    tag,
    summary: 'Largest drive at which every limit of a network holds',
    access: 'read',
    body: ceilingRequestSchema,
    answers: { status: 200, schema: ceilingAnswerSchema },
    handle: ({ context, input }) => networkCeiling(context, input.body),
  }),
  defineRoute({
    method: 'post',
    path: '/estimates',
    tag,
    summary: 'Temperatures, margins and ceilings of an assembly document; saves nothing',
    access: 'read',
    body: estimateRequestSchema,
    answers: { status: 200, schema: estimateSchema },
    handle: ({ context, input }) => estimateDocument(context, input.body),
  }),
  defineRoute({
    method: 'post',
    path: '/assemblies/compile',
    tag,
    summary: 'The network document of an assembly, per scenario',
    access: 'read',
    body: assemblyDocumentSchema,
    answers: { status: 200, schema: compileAnswerSchema },
    handle: ({ context, input }) => compileDocument(context, input.body),
  }),
];
