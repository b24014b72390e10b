import { z } from 'zod';

/** Where a value comes from. A standing never claims more than it has. */
export const standings = ['published', 'data-sheet', 'measured', 'common-practice', 'from-memory'] as const;

export const standingSchema = z.enum(standings).meta({
  id: 'Standing',
  description:
    'published: title, edition and table; data-sheet: a maker’s sheet; measured: by the team; common-practice: a habit of the trade, no source; from-memory: to be verified',
});

export type Standing = z.infer<typeof standingSchema>;

/** A value together with where it comes from. */
export function sourced<T extends z.ZodType>(value: T) {
  return z.strictObject({
    value,
    standing: standingSchema,
    source: z.string().trim().min(3, 'Say where the value comes from').max(500),
    note: z.string().trim().max(1000).optional(),
  });
}

/** A finite number with plausible bounds; messages are in the user’s words. */
export function bounded(min: number, max: number, unit: string, what = 'The value') {
  const suffix = unit === '' ? '' : ` ${unit}`;
  return z
    .number(`${what} must be a number`)
    .min(min, `${what} must be at least ${String(min)}${suffix}`)
    .max(max, `${what} must be at most ${String(max)}${suffix}`);
}

/** As `bounded`, but the lower bound itself is refused too. */
export function positive(max: number, unit: string, what = 'The value') {
  const suffix = unit === '' ? '' : ` ${unit}`;
  return z
    .number(`${what} must be a number`)
    .gt(0, `${what} must be greater than 0${suffix}`)
    .max(max, `${what} must be at most ${String(max)}${suffix}`);
}

/** Short stable name of a row, unique in its kind. */
export const slugSchema = z
  .string()
  .regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Use lower-case letters, digits and single hyphens')
  .max(80);

/**
 * A reference to a value: an immutable version row, or the whole content in place,
 * so that a document can stand alone.
 */
export function valueRef<T extends z.ZodType>(content: T) {
  return z.union([z.strictObject({ version: z.uuid() }), z.strictObject({ inline: content })], {
    error: 'Name a value version, or give the value in place',
  });
}

/** A property given as one number or as a table of [°C, value] points, linear between points, flat outside. */
export function numberOrTable(value: z.ZodNumber) {
  return z.union([
    value,
    z
      .array(z.tuple([bounded(-273.15, 1500, '°C', 'The temperature'), value]))
      .min(2, 'A table needs at least two points')
      .max(200)
      .refine((points) => points.every((point, i) => i === 0 || point[0] > (points[i - 1]?.[0] ?? -Infinity)), {
        error: 'Temperatures in a table must rise from point to point',
      }),
  ]);
}

export type NumberOrTable = number | [number, number][];
