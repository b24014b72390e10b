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

const surfaceC = bounded(-100, 200, '°C', 'The temperature of the surface');

/** What the outside of a face meets. */
export const exposureSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('open') }),
  /** Held flat against something: `null` takes no heat, else a surface of this temperature behind a joint. */
  z.strictObject({
    kind: z.literal('against-wall'),
    surfaceC: surfaceC.nullable().default(null),
    jointKM2PerW: bounded(1e-6, 10, 'K m²/W', 'The joint').default(0.005),
  }),
  /** A closed gap of air before a surface; `null`: as warm as the surroundings. */
  z.strictObject({
    kind: z.literal('gap'),
    gapM: bounded(0.0005, 0.2, 'm', 'The gap'),
    surfaceC: surfaceC.nullable().default(null),
    emissivity: bounded(0, 1, '', 'The emissivity of the surface').default(0.9),
  }),
  /** Open to the air, but it sees a surface of another temperature than the surroundings (an oven, a cold window). */
  z.strictObject({ kind: z.literal('near'), surfaceC }),
  /** Under cloth or dust: a layer that the heat must cross before it meets the room. */
  z.strictObject({
    kind: z.literal('covered'),
    layerKM2PerW: bounded(0.001, 10, 'K m²/W', 'The resistance of the layer').default(0.1),
  }),
]);
export type Exposure = z.output<typeof exposureSchema>;

/** An opening. `heightM`: of its middle above the lower edge of its face as the document draws it (z); of no account in top and bottom. */
export const ventSchema = z.strictObject({
  freeAreaM2: bounded(1e-7, 1, 'm²', 'The free area'),
  heightM: bounded(0, 5, 'm', 'The height').default(0),
  dischargeCoefficient: bounded(0.05, 1, '', 'The discharge coefficient').default(0.6),
  /** Share of the opening that a screen or filter leaves free. */
  screenShare: bounded(0.01, 1, '', 'The free share').default(1),
});

/** A fan that draws air through the vents: a given flow, or a curve of pressure against flow, rising in flow. */
export const fanSchema = z
  .strictObject({
    flowM3PerS: bounded(0, 10, 'm³/s', 'The flow').optional(),
    curve: z
      .array(z.tuple([bounded(0, 10, 'm³/s', 'The flow'), bounded(0, 1e4, 'Pa', 'The pressure')]))
      .min(2, 'A fan curve needs at least two points')
      .max(50)
      .optional(),
  })
  .refine(({ flowM3PerS, curve }) => (flowM3PerS === undefined) !== (curve === undefined), {
    error: 'A fan has either a flow or a curve',
  });

export const poseSchema = z.strictObject({
  /** The face that looks up. */
  up: faceSchema,
  /** How far it leans from there. */
  tiltDeg: bounded(0, 90, '°', 'The tilt').default(0),
  /** The face that it leans towards; `null`: the first that is neither up nor down, in the order of the faces. */
  towards: faceSchema.nullable().default(null),
});
export type Pose = z.output<typeof poseSchema>;

export const fillSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('air') }),
  /** Poured in on a face and set there, up to a height above that face’s inside. */
  z.strictObject({
    kind: z.literal('potting'),
    material: materialRef,
    heightM: bounded(0.0005, 5, 'm', 'The height'),
    onFace: faceSchema.default('bottom'),
    /** Highest temperature of the potting. */
    maxC: bounded(-60, 400, '°C', 'The limit').nullable().default(null),
  }),
  /** Foam in all the room that is left. */
  z.strictObject({
    kind: z.literal('foam'),
    material: materialRef,
    maxC: bounded(-60, 400, '°C', 'The limit').nullable().default(null),
  }),
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
  vents: z.array(ventSchema).max(20).default([]),
});
export type Wall = z.infer<typeof wallSchema>;

export const housingSchema = z.strictObject({
  /** Outer size along x (left to right), y (front to back) and z (bottom to top). */
  outerM: z.tuple([
    bounded(0.005, 5, 'm', 'The width'),
    bounded(0.005, 5, 'm', 'The depth'),
    bounded(0.005, 5, 'm', 'The height'),
  ]),
  pose: poseSchema.default({ up: 'top', tiltDeg: 0, towards: null }),
  fill: fillSchema.default({ kind: 'air' }),
  fan: fanSchema.nullable().default(null),
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

/**
 * Where something lies on a face, in the face’s own plane: x to the right and y up the drawing, that is the box’s x and y on top and
 * bottom, x and z on front and back, y and z on left and right, from the outer edge of the box. `null`: not known, spread evenly.
 */
const corner = {
  /** Of the corner nearest to the face’s origin. */
  xM: bounded(0, 5, 'm', 'The position').nullable().optional(),
  yM: bounded(0, 5, 'm', 'The position').nullable().optional(),
};
/** Of a part’s middle, from the corner of the carrier that it stands on, or of the face. `null`: not known, spread evenly. */
const middle = {
  xM: bounded(0, 5, 'm', 'The position').nullable().optional(),
  yM: bounded(0, 5, 'm', 'The position').nullable().optional(),
};

/** Which way the side with the parts looks, for a carrier in the open; inside a housing the face that it lies on decides. */
export const facingSchema = z.enum(['up', 'down', 'sideways']);

const carrierBase = {
  id: localIdSchema,
  sizeM: size,
  finish: finishRef.nullable(),
  facing: facingSchema.optional(),
};

/** A rectangle of a board: where copper covers otherwise than elsewhere, or a field of plated vias. */
const boardZoneSchema = z.strictObject({
  xM: bounded(0, 5, 'm', 'The position'),
  yM: bounded(0, 5, 'm', 'The position'),
  sizeM: size,
  /** Coverage of each layer here, in the order of the layers; `null`: as elsewhere. */
  coverages: z
    .array(bounded(0, 1, '', 'The coverage').nullable())
    .max(40)
    .optional(),
  vias: z
    .strictObject({
      count: z.number().int('The number of vias is whole').min(1).max(100000),
      drillM: bounded(0.00005, 0.01, 'm', 'The drill'),
      platingM: bounded(0.000001, 0.001, 'm', 'The plating'),
    })
    .optional(),
});

export const carrierSchema = z.discriminatedUnion('kind', [
  /** A plate joined flat to the inside of a face, or in the open. */
  z.strictObject({
    ...carrierBase,
    kind: z.literal('plate'),
    thicknessM: bounded(0.0001, 0.1, 'm', 'The thickness'),
    material: materialRef,
    on: z
      .strictObject({
        face: faceSchema,
        ...corner,
        /** `null`: not known, taken as a dry joint. */
        stack: z.array(stackLayerSchema).max(10).nullable(),
      })
      .nullable()
      .default(null),
  }),
  /** A board on stand-offs above the inside of a face, or in the open; layers from the part side to the other. */
  z.strictObject({
    ...carrierBase,
    kind: z.literal('board'),
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
    zones: z.array(boardZoneSchema).max(40).default([]),
    standOffM: bounded(0.0002, 1, 'm', 'The stand-off').nullable().default(null),
    on: z
      .strictObject({ face: faceSchema, ...corner })
      .nullable()
      .default(null),
  }),
  /** A base plate with parallel fins on the side away from its parts: in the open, or on the outside of a face. */
  z.strictObject({
    ...carrierBase,
    kind: z.literal('fins'),
    thicknessM: bounded(0.0001, 0.1, 'm', 'The thickness of the base'),
    material: materialRef,
    fins: z.strictObject({
      heightM: bounded(0.001, 0.5, 'm', 'The fin height'),
      thicknessM: bounded(0.0001, 0.05, 'm', 'The fin thickness'),
      count: z.number().int('The number of fins is whole').min(2, 'At least 2 fins').max(500),
      /** The side of the base along which the fins run. */
      along: z.enum(['x', 'y']).default('y'),
    }),
    on: z
      .strictObject({ face: faceSchema, ...corner, stack: z.array(stackLayerSchema).max(10).nullable() })
      .nullable()
      .default(null),
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
    ...middle,
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

/** A cable from a part through the wall into the room. */
export const leadSchema = z.strictObject({
  id: localIdSchema,
  name: nameSchema.optional(),
  /** The part that it is joined to. */
  part: localIdSchema,
  /** The supply whose current it carries, else its own current. */
  supply: localIdSchema.nullable().default(null),
  currentA: bounded(0, 10000, 'A', 'The current').nullable().default(null),
  /** Wires alike side by side (there and back: 2). */
  count: z.number().int('The number of wires is whole').min(1).max(100).default(2),
  crossSectionM2: bounded(1e-9, 1e-3, 'm²', 'The cross-section'),
  insideM: bounded(0.001, 10, 'm', 'The length inside'),
  outsideM: bounded(0, 100, 'm', 'The length outside'),
  /** Diameter over the insulation; `null`: 1.9 × that of the conductor. */
  outerDiameterM: bounded(1e-5, 0.1, 'm', 'The outer diameter').nullable().default(null),
  insulationMaxC: bounded(0, 400, '°C', 'The limit of the insulation').nullable().default(null),
});
export type Lead = z.infer<typeof leadSchema>;

export const scenarioSchema = z.strictObject({
  id: localIdSchema,
  name: nameSchema,
  airC: bounded(-60, 150, '°C', 'The air temperature').nullable(),
  /** `null`: as the air. */
  surroundingsC: bounded(-100, 200, '°C', 'The temperature of the surroundings').nullable().default(null),
  altitudeM: bounded(-430, 9000, 'm', 'The altitude').default(0),
  /** Air that moves over the outside: 0 for still air. */
  airSpeedMPerS: bounded(0, 50, 'm/s', 'The air speed').default(0),
  /** Temperature of the sky that faces looking up see; `null`: as the surroundings. */
  skyC: bounded(-100, 100, '°C', 'The temperature of the sky').nullable().default(null),
  /** Another pose than the housing’s own. */
  pose: poseSchema.nullable().default(null),
  sun: z
    .strictObject({
      irradianceWPerM2: bounded(0, 1400, 'W/m²', 'The irradiance'),
      /** The face that the sun meets squarely; `worst` takes the one that absorbs most. */
      onto: z.enum(['worst', ...faceNames]).default('worst'),
      /** Where the sun stands, instead of `onto`: above the horizon, and round from straight before the front (to the right is 90°). */
      direction: z
        .strictObject({
          elevationDeg: bounded(0, 90, '°', 'The elevation'),
          azimuthDeg: bounded(-360, 360, '°', 'The azimuth'),
        })
        .nullable()
        .default(null),
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
    /** `null`: an open assembly, its carriers stand in the room. */
    housing: housingSchema.nullable(),
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
    leads: z.array(leadSchema).max(50).default([]),
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
