import { z } from 'zod';
import { bounded, positive } from './value.js';

/**
 * Plates, boards and walls that carry sources: in the network document one element each, which the solver divides into a locally
 * refined grid of cells. Lengths in m from the corner of the grid where x = y = 0; a rectangle is given by its corner nearest to that.
 */
const idSchema = z.string().min(1, 'An id must not be empty').max(120, 'An id must be at most 120 characters');
const area = z.tuple([positive(10, 'm', 'The length'), positive(10, 'm', 'The width')]);
const corner = { xM: bounded(0, 10, 'm', 'The position'), yM: bounded(0, 10, 'm', 'The position') };
const side = z.enum(['near', 'far']);
const edge = z.enum(['x0', 'x1', 'y0', 'y1']);

export const gridLayerSchema = z.strictObject({
  thicknessM: positive(1, 'm', 'The layer thickness'),
  inPlaneWPerMK: positive(1e5, 'W/(m K)', 'The conductivity'),
  throughWPerMK: positive(1e5, 'W/(m K)', 'The conductivity'),
  /** For warm-up. */
  heatCapacityJPerM3K: bounded(0, 1e8, 'J/(m³ K)', 'The heat capacity').optional(),
});

const surface = { id: idSchema, side, to: idSchema };

export const gridSurfaceSchema = z.discriminatedUnion('kind', [
  /** Natural, forced or mixed convection of the free area of a side; `lengthM` as in a convection link of the same shape. */
  z.strictObject({
    ...surface,
    kind: z.literal('convection'),
    shape: z.string().max(40),
    lengthM: positive(1e4, 'm', 'The length'),
    widthM: positive(1e4, 'm', 'The width').optional(),
    tiltDeg: bounded(0, 180, '°', 'The tilt').optional(),
    airSpeedMPerS: bounded(0, 100, 'm/s', 'The air speed').optional(),
    flowLengthM: positive(1e4, 'm', 'The flow length').optional(),
    flow: z.enum(['assisting', 'transverse', 'opposing']).optional(),
    correlation: z.string().max(60).optional(),
    scale: bounded(0, 1000, '', 'The scale').default(1),
  }),
  /** Grey radiation of the free area to surroundings or to a mean radiant node, over `areaFactor` times the area. */
  z.strictObject({
    ...surface,
    kind: z.literal('radiation'),
    emissivity: bounded(0, 1, '', 'The emissivity'),
    areaFactor: bounded(0, 100, '', 'The factor').default(1),
  }),
  /** A closed gap of air before a surface of one temperature, as in an air-gap link. */
  z.strictObject({
    ...surface,
    kind: z.literal('air-gap'),
    gapM: positive(10, 'm', 'The gap'),
    heightM: positive(100, 'm', 'The height'),
    tiltDeg: bounded(0, 180, '°', 'The tilt'),
  }),
  /** Parallel fins all over the side, as in a fin-array link. */
  z.strictObject({
    ...surface,
    kind: z.literal('fin-array'),
    baseWidthM: positive(10, 'm', 'The width'),
    baseHeightM: positive(10, 'm', 'The height'),
    finHeightM: positive(10, 'm', 'The fin height'),
    finThicknessM: positive(1, 'm', 'The fin thickness'),
    finCount: z.number().int().min(2).max(10000),
    conductivityWPerMK: positive(1e5, 'W/(m K)', 'The conductivity'),
    tiltDeg: bounded(0, 90, '°', 'The tilt').default(0),
  }),
  z.strictObject({ ...surface, kind: z.literal('film'), coefficientWPerM2K: bounded(0, 1e7, 'W/(m² K)', 'The film') }),
]);
export type GridSurface = z.output<typeof gridSurfaceSchema>;

export const gridSchema = z.strictObject({
  id: idSchema,
  sizeM: area,
  /** From the near side, where parts sit, to the far side. */
  layers: z.array(gridLayerSchema).min(1, 'A grid needs at least one layer').max(60),
  /** Rectangles with other conductivities (copper areas, fields of vias): factors on every layer’s own. */
  zones: z
    .array(
      z.strictObject({
        ...corner,
        sizeM: area,
        layers: z.array(gridLayerSchema).min(1).max(60),
      }),
    )
    .max(100)
    .default([]),
  /** Film coefficient that the cell size is chosen by; it enters no heat flow. */
  filmForCellsWPerM2K: positive(1e5, 'W/(m² K)', 'The film').default(15),
  /** Cell size beside sources, in place of a third of √(k t/h): so that like grids have like cells. */
  finestCellM: positive(10, 'm', 'The cell size').optional(),
  /** Divides all cells by this number in both directions: a check of the grid itself. */
  refine: z.number().int().min(1).max(8).default(1),
  /** Where a node of the document is joined: its heat enters evenly over the rectangle, its temperature is the mean there. */
  patches: z
    .array(z.strictObject({ node: idSchema, side, ...corner, sizeM: area }))
    .max(1000)
    .default([]),
  /** A node that stands for the mean of a side’s free area: heat put into it falls evenly on that area. */
  free: z.strictObject({ near: idSchema.optional(), far: idSchema.optional() }).default({}),
  /** The near side is bare only within this frame [x0, y0, x1, y1] (the inside of a housing is smaller than its wall). */
  nearWithinM: z.tuple([z.number(), z.number(), z.number(), z.number()]).optional(),
  surfaces: z.array(gridSurfaceSchema).max(40).default([]),
  /** Cell to cell with another grid, whose corner x = y = 0 lies at (xM, yM) of this one: a joint, or a gap with radiation. */
  joins: z
    .array(
      z.strictObject({
        id: idSchema,
        side,
        grid: idSchema,
        gridSide: side,
        xM: bounded(-10, 10, 'm', 'The position'),
        yM: bounded(-10, 10, 'm', 'The position'),
        resistanceKM2PerW: positive(1e6, 'K m²/W', 'The resistance'),
        /** Effective emissivity between both, 0 for a joint. */
        emissivity: bounded(0, 1, '', 'The emissivity').default(0),
      }),
    )
    .max(50)
    .default([]),
  /** Conduction over an edge to two nodes (for the near and the far half), beyond this grid’s own half cell; per length of edge. */
  edges: z
    .array(z.strictObject({ edge, near: idSchema, far: idSchema, resistanceKMPerW: bounded(0, 1e9, 'K m/W') }))
    .max(40)
    .default([]),
  /** Conduction over an edge into the edge of another grid that runs the same way. */
  edgeJoins: z
    .array(z.strictObject({ edge, grid: idSchema, gridEdge: edge }))
    .max(40)
    .default([]),
  /** Named temperatures: the mean or the highest of a side, or of a rectangle on it. */
  readings: z
    .array(
      z.strictObject({
        id: idSchema,
        side,
        what: z.enum(['mean', 'peak']),
        over: z.strictObject({ ...corner, sizeM: area }).optional(),
      }),
    )
    .max(2000)
    .default([]),
});
/** As it is written. */
export type NetworkGridInput = z.input<typeof gridSchema>;
/** With defaults filled. */
export type NetworkGrid = z.output<typeof gridSchema>;
export type GridLayer = NetworkGrid['layers'][number];
export type GridEdge = z.output<typeof edge>;
