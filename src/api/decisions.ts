import type { z } from 'zod';
import type { Decision, decideSchema, DecisionSummary, withdrawSchema } from '../../shared/schemas/decision.js';
import { queryOf, request } from './client.js';
import type { Page } from './values.js';

export interface DecisionQuery {
  search?: string;
  state?: string;
  sort?: string;
  page?: number;
  pageSize?: number;
}

export const fetchDecisions = (query: DecisionQuery, signal?: AbortSignal) =>
  request<Page<DecisionSummary>>('GET', `/decisions${queryOf({ ...query })}`, { signal });
export const fetchDecision = (id: string) => request<Decision>('GET', `/decisions/${id}`);
export const sendOutcome = (id: string, body: z.input<typeof decideSchema>) =>
  request<Decision>('POST', `/decisions/${id}/outcome`, { body });
export const withdrawDecision = (id: string, body: z.input<typeof withdrawSchema>) =>
  request<Decision>('POST', `/decisions/${id}/withdraw`, { body });
