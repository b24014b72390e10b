import { z } from 'zod';
import { gridSchema } from './network-grid.js';
import { bounded, numberOrTable, positive } from './value.js';

/** The open network document, `trimwick-network/1` (see the guide and /api/docs). */
export const networkFormat = 'trimwick-network/1';

const idSchema = z.string().min(1, 'An id must not be empty').max(120, 'An id must be at most 120 characters');
const temperatureC = bounded(-273.15, 1226.85, '°C', 'The temperature');
const area = z.number('The area must be a number').min(0, 'The area must not be negative').max(1e6);
const length = positive(1e4, 'm', 'The length');
const share = bounded(0, 1, '', 'The emissivity');

export const ledSourceSchema = z.strictObject({
  kind: z.literal('led'),
  supply: idSchema.optional(),
  currentA: bounded(0, 1e5, 'A', 'The current').optional(),
  voltageV: positive(1e5, 'V', 'The forward voltage'),
  atCurrentA: positive(1e5, 'A', 'The reference current'),
  atC: temperatureC,
  differentialOhm: bounded(0, 1e6, 'Ω').default(0),
  voltagePerK: bounded(-10, 10, 'V/K').default(0),
  efficiency: bounded(0, 0.95, '', 'The efficiency'),
  efficiencyPerK: bounded(-1, 1, '1/K').default(0),
  efficiencyPerA: bounded(-1e3, 1e3, '1/A').default(0),
  wiringOhm: bounded(0, 1e6, 'Ω').default(0),
  /** Shares of the light absorbed at other nodes; what is not listed leaves. */
  light: z.array(z.strictObject({ node: idSchema, share: bounded(0, 1, '', 'The share') })).default([]),
});

export const resistorSourceSchema = z.strictObject({
  kind: z.literal('resistor'),
  supply: idSchema.optional(),
  currentA: bounded(0, 1e5, 'A', 'The current').optional(),
  /** Each element’s resistance. */
  resistanceOhm: positive(1e12, 'Ω', 'The resistance'),
  perK: bounded(-1, 1, '1/K').default(0),
  atC: temperatureC.default(25),
  count: z.number().int('The count must be a whole number').min(1, 'At least one').max(10000).default(1),
  arrangement: z.enum(['parallel', 'series']).default('series'),
});

export const converterSourceSchema = z.strictObject({
  kind: z.literal('converter'),
  /** Fixed output power; or `outputV` with a supply, whose current then sets the output power. */
  outputW: bounded(0, 1e7, 'W', 'The output power').optional(),
  outputV: positive(1e5, 'V', 'The output voltage').optional(),
  supply: idSchema.optional(),
  efficiency: z.union([
    bounded(0.01, 1, '', 'The efficiency'),
    z.array(z.tuple([bounded(0, 1e7, 'W'), bounded(0.01, 1, '')])).min(2),
  ]),
  quiescentW: bounded(0, 1e6, 'W').default(0),
});

export const sourceSchema = z.discriminatedUnion('kind', [
  ledSourceSchema,
  resistorSourceSchema,
  converterSourceSchema,
]);

export const nodeSchema = z.strictObject({
  id: idSchema,
  fixedC: temperatureC.optional(),
  heatW: z.number('The heat must be a number').min(-1e7).max(1e7, 'The heat must be at most 1e7 W').optional(),
  capacityJPerK: bounded(0, 1e9, 'J/K', 'The heat capacity').optional(),
  source: sourceSchema.optional(),
});

const link = { id: idSchema.optional(), from: idSchema, to: idSchema };

export const convectionShapes = [
  'vertical-plate',
  'plate-facing-up',
  'plate-facing-down',
  'inclined-plate',
  'horizontal-cylinder',
  'vertical-cylinder',
  'sphere',
] as const;

/** How moving air meets the air that rises by itself. */
export const convectionFlows = ['assisting', 'transverse', 'opposing'] as const;

const tilt = bounded(0, 180, '°', 'The tilt');
const openingArea = bounded(0, 1e4, 'm²', 'The area of the opening');

/** Air exchange between inside and outside air: a given flow, openings at two heights, or a fan before openings. */
const ventilationFields = {
  /** At the temperature of the air that it removes, that of `from`. */
  flowM3PerS: bounded(0, 1e4, 'm³/s', 'The flow').optional(),
  inletAreaM2: openingArea.optional(),
  outletAreaM2: openingArea.optional(),
  /** Between the mid-heights of the openings. */
  heightM: bounded(0, 1e3, 'm', 'The height').optional(),
  dischargeCoefficient: bounded(0, 1, '', 'The discharge coefficient').default(0.6),
  /** Pressure of a fan against its flow, [[m³/s, Pa], …], rising in flow. */
  fanCurve: z
    .array(z.tuple([bounded(0, 1e4, 'm³/s', 'The flow'), bounded(0, 1e6, 'Pa', 'The pressure')]))
    .min(2, 'A fan curve needs at least two points')
    .max(200)
    .optional(),
};

export const linkSchema = z.discriminatedUnion('kind', [
  z.strictObject({ ...link, kind: z.literal('resistance'), resistanceKPerW: positive(1e12, 'K/W', 'The resistance') }),
  z.strictObject({
    ...link,
    kind: z.literal('conduction'),
    conductivityWPerMK: numberOrTable(positive(1e5, 'W/(m K)', 'The conductivity')),
    areaM2: area,
    lengthM: length,
  }),
  z.strictObject({
    ...link,
    kind: z.literal('film'),
    coefficientWPerM2K: bounded(0, 1e7, 'W/(m² K)', 'The film coefficient'),
    areaM2: area,
  }),
  z.strictObject({
    ...link,
    kind: z.literal('convection'),
    shape: z.enum(convectionShapes),
    areaM2: area,
    /** The characteristic length of the shape. */
    lengthM: length,
    /** Of an inclined plate: 0 looks up, 90 is upright, 180 looks down. */
    tiltDeg: tilt.optional(),
    /** Of a vertical cylinder. */
    diameterM: positive(1e4, 'm', 'The diameter').optional(),
    /** 0 for still air. */
    airSpeedMPerS: bounded(0, 1000, 'm/s', 'The air speed').optional(),
    /** Along the flow, of plates; without it `lengthM`. */
    flowLengthM: positive(1e4, 'm', 'The flow length').optional(),
    flow: z.enum(convectionFlows).optional(),
    correlation: z.string().max(60).optional(),
    scale: bounded(0, 1000, '', 'The scale').default(1),
  }),
  z.strictObject({
    ...link,
    kind: z.literal('radiation'),
    areaM2: area,
    emissivity: share,
    emissivityTo: share.optional(),
    areaToM2: area.optional(),
    viewFactor: bounded(0, 1, '', 'The view factor').optional(),
  }),
  z.strictObject({ ...link, kind: z.literal('ventilation'), ...ventilationFields }),
  z.strictObject({
    ...link,
    kind: z.literal('air-gap'),
    areaM2: area,
    gapM: length,
    heightM: length,
    /** 0 level with `from` below, 90 upright, 180 level with `from` above. */
    tiltDeg: tilt,
  }),
  z.strictObject({
    ...link,
    kind: z.literal('fin-array'),
    baseWidthM: length,
    /** Along the channels. */
    baseHeightM: length,
    finHeightM: length,
    finThicknessM: length,
    finCount: z.number().int('The number of fins must be a whole number').min(2, 'At least two fins').max(10000),
    conductivityWPerMK: positive(1e5, 'W/(m K)', 'The conductivity'),
    /** Of the channels: 0 upright. */
    tiltDeg: bounded(0, 90, '°', 'The tilt').default(0),
  }),
  z.strictObject({
    ...link,
    kind: z.literal('channel'),
    /** Both faces. */
    areaM2: area,
    spacingM: length,
    heightM: length,
    correlation: z.string().max(60).optional(),
  }),
]);

export const supplySchema = z.strictObject({ id: idSchema, currentA: bounded(0, 1e5, 'A', 'The current') });

const limit = { id: idSchema, reason: z.string().max(500).optional() };

/** A number not to be passed. A node’s temperature, a supply’s current, a device’s power, or power against a derating curve. */
export const limitSchema = z.union(
  [
    z.strictObject({ ...limit, node: idSchema, maxC: temperatureC }),
    z.strictObject({ ...limit, supply: idSchema, maxA: positive(1e5, 'A', 'The current') }),
    /** Rated current of the device at this node (an array’s own share of a supply). */
    z.strictObject({ ...limit, node: idSchema, maxA: positive(1e5, 'A', 'The current') }),
    z.strictObject({
      ...limit,
      node: idSchema,
      /** Rated electrical power of the device at this node. */
      maxW: positive(1e7, 'W', 'The power'),
      /** Largest share of the allowed power; 1 uses all of it. */
      maxShare: bounded(0.001, 1, '', 'The share').default(1),
      /** Allowed share of `maxW` against the temperature of `referenceNode`. */
      derating: z
        .strictObject({ referenceNode: idSchema, points: z.array(z.tuple([temperatureC, bounded(0, 1, '')])).min(2) })
        .optional(),
    }),
  ],
  { error: 'A limit is {node, maxC}, {node, maxA}, {node, maxW} or {supply, maxA}' },
);

export const networkDocumentSchema = z
  .strictObject({
    format: z.literal(networkFormat, `The format must be "${networkFormat}"`),
    pressurePa: bounded(1000, 2e6, 'Pa', 'The pressure').default(101325),
    nodes: z.array(nodeSchema).min(1, 'A network needs at least one node').max(20000),
    links: z.array(linkSchema).max(200000).default([]),
    /** Plates, boards and walls that carry sources. */
    grids: z.array(gridSchema).max(200).default([]),
    supplies: z.array(supplySchema).max(1000).default([]),
    limits: z.array(limitSchema).max(10000).default([]),
    cutOuts: z.array(z.unknown()).max(0, 'Cut-outs are not computed yet: remove them').optional(),
  })
  .meta({ id: 'NetworkDocument' });

/** As people write it. */
export type NetworkDocumentInput = z.input<typeof networkDocumentSchema>;
/** With defaults filled. */
export type NetworkDocument = z.output<typeof networkDocumentSchema>;
export type NetworkNode = NetworkDocument['nodes'][number];
export type NetworkLink = NetworkDocument['links'][number];
export type NetworkSource = z.output<typeof sourceSchema>;
export type NetworkLimit = NetworkDocument['limits'][number];
