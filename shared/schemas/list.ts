import { z } from 'zod';

/** Query of every list route. `sort` is a field name, with a leading minus for descending. */
export const listQuerySchema = z.object({
  page: z.coerce.number().int().min(1).default(1),
  pageSize: z.coerce.number().int().min(1).max(500).default(50),
  sort: z.string().max(40).optional(),
  search: z.string().max(200).optional(),
});
export type ListQuery = z.infer<typeof listQuerySchema>;

export function listOf<T extends z.ZodType>(item: T) {
  return z.object({ items: z.array(item), total: z.number().int(), page: z.number().int() });
}
