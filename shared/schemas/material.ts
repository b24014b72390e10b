import { z } from 'zod';
import { bounded, numberOrTable, positive, slugSchema, sourced } from './value.js';

export const materialGroups = [
  'print-polymer',
  'moulding-polymer',
  'metal',
  'laminate',
  'interface',
  'adhesive',
  'potting',
  'ceramic',
  'wood',
] as const;

export const materialGroupSchema = z.enum(materialGroups);
export type MaterialGroup = z.infer<typeof materialGroupSchema>;

export const morphologies = ['amorphous', 'semi-crystalline', 'elastomer'] as const;

const conductivity = numberOrTable(positive(5000, 'W/(m K)', 'The conductivity'));
const temperature = bounded(-200, 1500, '°C', 'The temperature');

/**
 * A material’s thermal properties. For print polymers `conductivityWPerMK` is that of the solid polymer along the
 * extruded lines; `conductivityThroughLayersWPerMK` is across the layers. Reference temperature 23 °C unless a table.
 */
export const materialSchema = z
  .strictObject({
    slug: slugSchema,
    name: z.string().trim().min(1).max(120),
    group: materialGroupSchema,
    morphology: z.enum(morphologies).optional(),
    conductivityWPerMK: sourced(conductivity),
    conductivityThroughLayersWPerMK: sourced(conductivity).optional(),
    densityKgPerM3: sourced(positive(25000, 'kg/m³', 'The density')),
    specificHeatJPerKgK: sourced(positive(10000, 'J/(kg K)', 'The specific heat')),
    glassTransitionC: sourced(temperature).optional(),
    /** Deflection temperature under load, ISO 75 / ASTM D648, at 0.45 MPa. */
    heatDeflection045C: sourced(temperature).optional(),
    /** The same at 1.8 MPa. */
    heatDeflection180C: sourced(temperature).optional(),
    longTermServiceC: sourced(temperature).optional(),
    /** Interface materials: specific contact resistance with the joint, K m²/W, where the maker gives it. */
    contactResistanceKM2PerW: sourced(positive(0.1, 'K m²/W', 'The contact resistance')).optional(),
    note: z.string().max(1000).optional(),
  })
  .meta({ id: 'Material' });

export type Material = z.infer<typeof materialSchema>;

/** Surface finish: infrared emissivity and solar absorptance are separate properties. */
export const finishSchema = z
  .strictObject({
    slug: slugSchema,
    name: z.string().trim().min(1).max(120),
    emissivity: sourced(bounded(0, 1, '', 'The emissivity')),
    solarAbsorptance: sourced(bounded(0, 1, '', 'The solar absorptance')),
    note: z.string().max(1000).optional(),
  })
  .meta({ id: 'Finish' });

export type Finish = z.infer<typeof finishSchema>;
