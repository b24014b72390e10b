import { z } from 'zod';
import { bounded, positive, slugSchema, sourced } from './value.js';

export const partClasses = [
  'led-array',
  'resistor',
  'shunt',
  'converter',
  'regulator',
  'semiconductor',
  'other',
] as const;
export const partClassSchema = z.enum(partClasses);
export type PartClass = z.infer<typeof partClassSchema>;

const temperature = bounded(-273.15, 1500, '°C', 'The temperature');

/** LED array: forward voltage and optical efficiency about a reference point (physics.md §6). */
const ledSchema = z.strictObject({
  kind: z.literal('led'),
  voltageV: sourced(positive(1000, 'V', 'The forward voltage')),
  atCurrentA: sourced(positive(1000, 'A', 'The reference current')),
  atC: sourced(temperature),
  differentialOhm: sourced(bounded(0, 1e4, 'Ω', 'The differential resistance')),
  voltagePerK: sourced(bounded(-1, 1, 'V/K', 'The voltage coefficient')),
  efficiency: sourced(bounded(0, 0.95, '', 'The optical efficiency')),
  efficiencyPerK: sourced(bounded(-0.05, 0.05, '1/K', 'The efficiency coefficient')),
  efficiencyPerA: sourced(bounded(-10, 10, '1/A', 'The efficiency coefficient')),
});

/** One resistor element: P = I² R (1 + α (T − T_ref)). */
const resistorSchema = z.strictObject({
  kind: z.literal('resistor'),
  resistanceOhm: sourced(positive(1e9, 'Ω', 'The resistance')),
  perK: sourced(bounded(-0.01, 0.02, '1/K', 'The temperature coefficient')),
  atC: sourced(temperature),
});

/** Converter with a constant output voltage: loss = P_out (1/η − 1) + quiescent. */
const converterSchema = z.strictObject({
  kind: z.literal('converter'),
  outputV: sourced(positive(2000, 'V', 'The output voltage')),
  /** A number, or [[output W, efficiency], …]. */
  efficiency: sourced(
    z.union([
      bounded(0.05, 1, '', 'The efficiency'),
      z.array(z.tuple([bounded(0, 1e5, 'W'), bounded(0.05, 1, '')])).min(2),
    ]),
  ),
  quiescentW: sourced(bounded(0, 1000, 'W', 'The quiescent power')),
});

/** A part known only by the heat it makes; the assembly says how much. */
const heatSchema = z.strictObject({ kind: z.literal('heat') });

export const electricalSchema = z.discriminatedUnion('kind', [ledSchema, resistorSchema, converterSchema, heatSchema]);

export const ratingQuantities = ['currentA', 'powerW', 'voltageV', 'outputW'] as const;
export const temperatureSpots = ['junction', 'case'] as const;

/** A derating curve: allowed share of the rated quantity against a reference temperature, straight lines between points. */
export const deratingCurveSchema = z.strictObject({
  quantity: z.enum(['powerW', 'currentA', 'voltageV']),
  /** `ambient` is the air the part stands in (inside air in a box), not the room. */
  reference: z.enum(['ambient', 'case', 'board', 'terminal', 'body']),
  /** [[°C, share of the rating], …] */
  points: sourced(
    z
      .array(z.tuple([temperature, bounded(0, 1, '', 'The share')]))
      .min(2, 'A derating curve needs at least two points')
      .refine((points) => points.every((point, i) => i === 0 || point[0] > (points[i - 1]?.[0] ?? -Infinity)), {
        error: 'Temperatures along a derating curve must rise',
      }),
  ),
});
export type DeratingCurve = z.infer<typeof deratingCurveSchema>;

export const partTypeSchema = z
  .strictObject({
    slug: slugSchema,
    name: z.string().trim().min(1).max(120),
    class: partClassSchema,
    /** Body on its mounting face, and height above it. */
    footprintM: sourced(z.tuple([positive(2, 'm', 'The length'), positive(2, 'm', 'The width')])),
    heightM: sourced(positive(1, 'm', 'The height')),
    thermal: z.strictObject({
      /** From the heat-making spot (junction, resistance element) to the mounting face. */
      internalKPerW: sourced(bounded(0, 1000, 'K/W', 'The internal resistance')),
      basis: z.enum([
        'junction-to-case-bottom',
        'junction-to-case-top',
        'junction-to-board',
        'element-to-mounting-face',
        'body',
      ]),
      /** Whether the sheet’s resistance refers to the heat or to the electrical power. */
      refersTo: z.enum(['heat', 'electrical-power']),
      capacityJPerK: sourced(bounded(0, 1e6, 'J/K', 'The heat capacity')),
    }),
    electrical: electricalSchema,
    ratings: z.array(
      z.strictObject({ quantity: z.enum(ratingQuantities), max: sourced(positive(1e6, '', 'The rating')) }),
    ),
    temperatureLimits: z.array(z.strictObject({ spot: z.enum(temperatureSpots), maxC: sourced(temperature) })),
    deratingCurve: deratingCurveSchema.optional(),
    note: z.string().max(1000).optional(),
  })
  .meta({ id: 'PartType' });

export type PartType = z.infer<typeof partTypeSchema>;
export type ElectricalModel = z.infer<typeof electricalSchema>;
