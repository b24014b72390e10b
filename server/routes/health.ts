import { z } from 'zod';
import { health } from '../services/health.js';
import { defineRoute } from './define.js';

export const healthRoutes = [
  defineRoute({
    method: 'get',
    path: '/health',
    tag: 'Service',
    summary: 'Whether all parts are well; 503 with the one that is not',
    access: 'public',
    answers: {
      status: 200,
      schema: z.object({ status: z.literal('ok'), database: z.literal('ok'), version: z.string() }),
    },
    handle: ({ context }) => health(context),
  }),
];
