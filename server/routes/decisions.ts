import { z } from 'zod';
import { decisionStateSchema } from '../../shared/schemas/assembly-records.js';
import {
  askDecisionSchema,
  decideSchema,
  decisionListSchema,
  decisionSchema,
  selfCheckSchema,
  withdrawSchema,
} from '../../shared/schemas/decision.js';
import { listQuerySchema } from '../../shared/schemas/list.js';
import { askForDecision, selfCheck } from '../services/askDecision.js';
import { decide, withdraw } from '../services/decide.js';
import { getDecision, listDecisions } from '../services/decisionReading.js';
import { defineRoute } from './define.js';

const tag = 'Decisions';
const idSchema = z.object({ id: z.uuid() });

export const decisionRoutes = [
  defineRoute({
    method: 'get',
    path: '/decisions',
    tag,
    summary: 'The register',
    access: 'read',
    query: listQuerySchema.extend({ state: decisionStateSchema.optional() }),
    answers: { status: 200, schema: decisionListSchema },
    handle: ({ context, actor, input }) => listDecisions(context, actor, input.query),
  }),
  defineRoute({
    method: 'post',
    path: '/decisions',
    tag,
    summary: 'Ask for a decision on the draft, or again on a returned one',
    access: 'askForDecision',
    body: askDecisionSchema,
    answers: { status: 201, schema: decisionSchema },
    handle: ({ context, actor, input }) => askForDecision(context, actor, input.body),
  }),
  defineRoute({
    method: 'post',
    path: '/decisions/self-check',
    tag,
    summary: 'A team of one records that it checked for itself, not reviewed',
    access: 'askForDecision',
    body: selfCheckSchema,
    answers: { status: 201, schema: decisionSchema },
    handle: ({ context, actor, input }) => selfCheck(context, actor, input.body),
  }),
  defineRoute({
    method: 'get',
    path: '/decisions/:id',
    tag,
    summary: 'One decision with snapshot and history',
    access: 'read',
    params: idSchema,
    answers: { status: 200, schema: decisionSchema },
    handle: ({ context, actor, input }) => getDecision(context, actor, input.params.id),
  }),
  defineRoute({
    method: 'post',
    path: '/decisions/:id/outcome',
    tag,
    summary: 'Accept, accept with conditions, return or decline',
    access: 'decide',
    params: idSchema,
    body: decideSchema,
    answers: { status: 200, schema: decisionSchema },
    refusals: [{ status: 429, when: 'Too many wrong passwords; Retry-After says how long' }],
    handle: ({ context, actor, input }) => decide(context, actor, input.params.id, input.body),
  }),
  defineRoute({
    method: 'post',
    path: '/decisions/:id/withdraw',
    tag,
    summary: 'Take a request back: its asker or an administrator',
    access: 'read',
    params: idSchema,
    body: withdrawSchema,
    answers: { status: 200, schema: decisionSchema },
    handle: ({ context, actor, input }) => withdraw(context, actor, input.params.id, input.body),
  }),
];
