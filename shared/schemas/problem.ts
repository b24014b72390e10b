import { z } from 'zod';

/** RFC 9457 problem details, with one entry per offending field. */
export const problemSchema = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    code: z.string(),
    errors: z.array(
      z.object({
        /** JSON pointer (RFC 6901) into what was sent. */
        path: z.string(),
        message: z.string(),
        node: z.string().optional(),
        link: z.string().optional(),
      }),
    ),
  })
  .meta({ id: 'Problem' });
export type Problem = z.infer<typeof problemSchema>;
