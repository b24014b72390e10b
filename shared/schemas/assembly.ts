import { z } from 'zod';
import { finishSchema, materialSchema } from './material.js';
import { partTypeSchema } from './part-type.js';
import { contactTimes, loadStateSchema } from './rule-set.js';
import { bounded, positive, valueRef } from './value.js';

/**
 * The open assembly document, `trimwick-assembly/1`. `null` in a field that allows it means “don’t know”: the
 * compiler takes a cautious default, and the estimate lists it as assumed with its effect in kelvin.
 */
export const assemblyFormat = 'trimwick-assembly/1';

export const faceNames = ['top', 'bottom', 'front', 'back', 'left', 'right'] as const;
export const faceSchema = z.enum(faceNames);
export type FaceName = z.infer<typeof faceSchema>;

/** Ids become parts of node ids, so no dots. */
export const localIdSchema = z
  .string()
  .regex(/^[a-z][a-z0-9-]*$/i, 'An id starts with a letter and has letters, digits and hyphens only')
  .max(40, 'An id must be at most 40 characters');

const nameSchema = z.string().trim().min(1, 'Give it a name').max(120, 'A name must be at most 120 characters');
const noteSchema = z.string().max(4000, 'A note must be at most 4000 characters');

const materialRef = valueRef(materialSchema);
const finishRef = valueRef(finishSchema);
const partTypeRef = valueRef(partTypeSchema);

/** How a wall was printed; every field may be unknown. `bedFace` is the face of the housing that lay on the print bed. */
export const printSchema = z.strictObject({
  perimeters: z.number().int('Perimeters are a whole number').min(1, 'At least 1 perimeter').max(50).nullable(),
  lineWidthM: bounded(0.0001, 0.003, 'm', 'The line width').nullable(),
  layerHeightM: bounded(0.00002, 0.002, 'm', 'The layer height').nullable(),
  closedLayers: z.number().int('Closed layers are a whole number').min(0).max(100).nullable(),
  infillShare: bounded(0, 1, '', 'The infill share').nullable(),
  pattern: z.enum(['cells', 'ribs']).nullable(),
  bedFace: faceSchema.nullable(),
});
export type PrintSettings = z.infer<typeof printSchema>;

/** One layer of an attachment: a material with a bond-line thickness, over a share of the contact area. */
export const stackLayerSchema = z.strictObject({
  material: materialRef,
  thicknessM: bounded(0, 0.05, 'm', 'The bond-line thickness').nullable(),
  contactShare: bounded(0.01, 1, '', 'The contact share').default(1),
});

export const exposureSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('open') }),
  /** Held flat against something that takes no heat. */
  z.strictObject({ kind: z.literal('against-wall') }),
]);

export const wallSchema = z.strictObject({
  wallM: bounded(0.0001, 0.1, 'm', 'The wall thickness').nullable(),
  material: materialRef.nullable(),
  finishOutside: finishRef.nullable(),
  finishInside: finishRef.nullable(),
  /** `null`: not printed, a solid wall. */
  print: printSchema.nullable().default(null),
  exposure: exposureSchema.default({ kind: 'open' }),
  loadState: loadStateSchema.nullable().default(null),
  vents: z.array(z.unknown()).max(0, 'Vents are not computed yet: remove them, the box is taken as sealed').default([]),
});
export type Wall = z.infer<typeof wallSchema>;

export const housingSchema = z.strictObject({
  /** Outer size along x (left to right), y (front to back) and z (bottom to top). */
  outerM: z.tuple([
    bounded(0.005, 5, 'm', 'The width'),
    bounded(0.005, 5, 'm', 'The depth'),
    bounded(0.005, 5, 'm', 'The height'),
  ]),
  pose: z
    .strictObject({
      /** The face that looks up. */
      up: faceSchema,
      tiltDeg: z.literal(0, 'A tilted housing is not computed yet: use 0').default(0),
    })
    .default({ up: 'top', tiltDeg: 0 }),
  fill: z.strictObject({ kind: z.literal('air', 'Only an air fill is computed yet') }).default({ kind: 'air' }),
  /** How long the outside may be touched; `no` for out of reach. */
  touched: z
    .enum(['no', ...contactTimes])
    .nullable()
    .default(null),
  faces: z.strictObject({
    top: wallSchema,
    bottom: wallSchema,
    front: wallSchema,
    back: wallSchema,
    left: wallSchema,
    right: wallSchema,
  }),
});
export type Housing = z.infer<typeof housingSchema>;

const size = z.tuple([positive(5, 'm', 'The length'), positive(5, 'm', 'The width')]);
const position = {
  xM: bounded(0, 5, 'm', 'The position').nullable().optional(),
  yM: bounded(0, 5, 'm', 'The position').nullable().optional(),
};

export const carrierSchema = z.discriminatedUnion('kind', [
  /** A plate joined flat to the inside of a face. */
  z.strictObject({
    id: localIdSchema,
    kind: z.literal('plate'),
    sizeM: size,
    thicknessM: bounded(0.0001, 0.1, 'm', 'The thickness'),
    material: materialRef,
    finish: finishRef.nullable(),
    on: z.strictObject({
      face: faceSchema,
      ...position,
      /** `null`: not known, taken as a dry joint. */
      stack: z.array(stackLayerSchema).max(10).nullable(),
    }),
  }),
  /** A board on stand-offs above the inside of a face; layers from the part side to the other. */
  z.strictObject({
    id: localIdSchema,
    kind: z.literal('board'),
    sizeM: size,
    layers: z
      .array(
        z.strictObject({
          material: materialRef,
          thicknessM: bounded(0.000001, 0.02, 'm', 'The layer thickness'),
          /** Share of the layer’s area that is filled. */
          coverage: bounded(0, 1, '', 'The coverage').default(1),
        }),
      )
      .min(1, 'A board needs at least one layer')
      .max(40),
    finish: finishRef.nullable(),
    standOffM: bounded(0.0002, 1, 'm', 'The stand-off').nullable(),
    on: z.strictObject({ face: faceSchema, ...position }),
  }),
]);
export type Carrier = z.infer<typeof carrierSchema>;

export const partSchema = z.strictObject({
  id: localIdSchema,
  name: nameSchema.optional(),
  type: partTypeRef,
  mount: z.strictObject({
    /** A carrier’s id, or `face.<name>` for the inside of a wall. */
    on: z.string().min(1, 'Say what the part stands on').max(60),
    ...position,
    /** `null`: not known, taken as a dry joint. */
    stack: z.array(stackLayerSchema).max(10).nullable(),
  }),
  supply: localIdSchema.nullable().default(null),
  /** Elements of a resistor bank; each has the type’s resistance. */
  count: z.number().int('The count must be a whole number').min(1, 'At least 1').max(1000).default(1),
  arrangement: z.enum(['parallel', 'series']).default('parallel'),
  /** Heat of a part whose type knows only heat. */
  heatW: bounded(0, 10000, 'W', 'The heat').nullable().default(null),
  /** Share of an array’s light that stays inside as heat; `null`: not known. */
  lightKeptShare: bounded(0, 1, '', 'The share').nullable().default(null),
});
export type Part = z.infer<typeof partSchema>;

export const scenarioSchema = z.strictObject({
  id: localIdSchema,
  name: nameSchema,
  airC: bounded(-60, 150, '°C', 'The air temperature').nullable(),
  /** `null`: as the air. */
  surroundingsC: bounded(-100, 200, '°C', 'The temperature of the surroundings').nullable().default(null),
  altitudeM: bounded(-430, 9000, 'm', 'The altitude').default(0),
  airSpeedMPerS: z.literal(0, 'Moving air is not computed yet: use 0, still air').default(0),
  sun: z
    .strictObject({
      irradianceWPerM2: bounded(0, 1400, 'W/m²', 'The irradiance'),
      /** The face that the sun meets squarely; `worst` takes the one that absorbs most. */
      onto: z.enum(['worst', ...faceNames]).default('worst'),
      glazingTransmittance: bounded(0, 1, '', 'The transmittance').default(1),
    })
    .nullable()
    .default(null),
  mustHold: z.boolean().default(true),
  fault: z.null('Faults are not computed yet').default(null),
});
export type Scenario = z.infer<typeof scenarioSchema>;

export const assemblyDocumentSchema = z
  .strictObject({
    format: z.literal(assemblyFormat, `The format must be "${assemblyFormat}"`),
    name: nameSchema,
    note: noteSchema.default(''),
    housing: housingSchema,
    carriers: z.array(carrierSchema).max(50).default([]),
    parts: z.array(partSchema).min(1, 'Add at least one part that makes heat').max(100),
    supplies: z
      .array(
        z.strictObject({
          id: localIdSchema,
          name: nameSchema.optional(),
          currentA: bounded(0, 10000, 'A', 'The current'),
          /** The supply’s own rating. */
          maxA: positive(10000, 'A', 'The rating').nullable().default(null),
        }),
      )
      .max(20)
      .default([]),
    /** What the drive ceiling varies; `null`: the first supply, or without supplies every part with a given heat. */
    drive: z
      .union([z.strictObject({ supply: localIdSchema }), z.strictObject({ parts: z.array(localIdSchema).min(1) })])
      .nullable()
      .default(null),
    leads: z.array(z.unknown()).max(0, 'Leads are not computed yet: remove them').default([]),
    cutOuts: z.array(z.unknown()).max(0, 'Cut-outs are not computed yet: remove them').default([]),
    scenarios: z.array(scenarioSchema).min(1, 'Add at least one scenario').max(50),
    /** Further temperature limits on nodes of the network. */
    limits: z
      .array(
        z.strictObject({
          id: localIdSchema,
          node: z.string().min(1).max(120),
          maxC: bounded(-200, 1500, '°C', 'The limit'),
          reason: z.string().trim().min(1, 'Say why this is a limit').max(500),
        }),
      )
      .max(200)
      .default([]),
  })
  .meta({ id: 'AssemblyDocument' });

/** As people write it. */
export type AssemblyDocumentInput = z.input<typeof assemblyDocumentSchema>;
/** With defaults filled. */
export type AssemblyDocument = z.output<typeof assemblyDocumentSchema>;
