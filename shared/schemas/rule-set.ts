import { z } from 'zod';
import { partClassSchema } from './part-type.js';
import { bounded, slugSchema, sourced } from './value.js';

export const loadStates = ['free', 'self-weight', 'snap', 'screw-clamped', 'structural'] as const;
export const loadStateSchema = z.enum(loadStates);
export type LoadState = z.infer<typeof loadStateSchema>;

export const touchSurfaces = ['bare-metal', 'coated-metal', 'ceramic-glass', 'plastic', 'wood'] as const;
export const contactTimes = ['1 s', '10 s', '1 min', '10 min', '8 h'] as const;
export const contactTimeSchema = z.enum(contactTimes);
export type ContactTime = z.infer<typeof contactTimeSchema>;

const margin = bounded(0, 200, 'K', 'The margin');

/** The team’s policy: how much margin and how little stress is asked, per kind of limit. */
export const ruleSetSchema = z
  .strictObject({
    slug: slugSchema,
    name: z.string().trim().min(1).max(120),
    description: z.string().max(1000),
    perClass: z.array(
      z.strictObject({
        class: partClassSchema,
        smallestMarginK: sourced(margin),
        /** Largest share of a rating, or of what a derating curve allows. */
        largestStressRatio: sourced(bounded(0.01, 1, '', 'The stress ratio')),
      }),
    ),
    /** Off a polymer’s softening temperature, by how the region is loaded. */
    polymerMarginK: z.record(loadStateSchema, sourced(margin)),
    /** Smallest margin to a wall’s softening limit, which already stands `polymerMarginK` below the softening value. */
    wallMarginK: sourced(margin),
    /** Smallest margin to a touch limit. */
    touchMarginK: sourced(margin),
    /** Largest surface temperature by surface and contact time. */
    touchLimits: z.array(
      z.strictObject({
        surface: z.enum(touchSurfaces),
        contactTime: contactTimeSchema,
        maxC: sourced(bounded(30, 120, '°C', 'The touch limit')),
      }),
    ),
  })
  .meta({ id: 'RuleSet' });

export type RuleSet = z.infer<typeof ruleSetSchema>;
