import { faceNames, assemblyDocumentSchema, type AssemblyDocumentInput } from '../../../shared/schemas/assembly.js';
import type { NetworkDocumentInput } from '../../../shared/schemas/network.js';
import { bySlug, readFinishes, readMaterials } from '../../data/files.js';

type LinkInput = NonNullable<NetworkDocumentInput['links']>[number];

export const copperWPerMK = 390;

/** A plane surface in the open room: natural convection (`ribs`: convecting ÷ radiating area) and radiation to the node `room`. */
export function openSurface(options: {
  node: string;
  name: string;
  shape: 'vertical-plate' | 'plate-facing-up' | 'plate-facing-down';
  areaM2: number;
  lengthM: number;
  emissivity: number;
  ribs?: number;
}): LinkInput[] {
  const { node, name, shape, areaM2, lengthM, emissivity, ribs = 1 } = options;
  return [
    { id: `${name}.convection`, kind: 'convection', from: node, to: 'room', shape, areaM2: areaM2 * ribs, lengthM },
    { id: `${name}.radiation`, kind: 'radiation', from: node, to: 'room', areaM2, emissivity },
  ];
}

/**
 * Resistance of a fin with an insulated tip, 1/(√(h p k A) tanh(m l)), m = √(h p/(k A)) [K/W]; for an endless one give `Infinity`.
 * Any heat-transfer textbook.
 */
export function finResistance(fin: {
  conductivity: number;
  sectionM2: number;
  perimeterM: number;
  lengthM: number;
  film: number;
}): number {
  const { conductivity, sectionM2, perimeterM, lengthM, film } = fin;
  const m = Math.sqrt((film * perimeterM) / (conductivity * sectionM2));
  return 1 / (Math.sqrt(film * perimeterM * conductivity * sectionM2) * Math.tanh(m * lengthM));
}

const materials = readMaterials();
const finishes = readFinishes();

/** A closed box of one unprinted material and finish, out of reach, in one room. */
export function plainBox(
  box: { outerM: [number, number, number]; wallM: number; material: string; finish: string; airC: number },
  rest: Pick<AssemblyDocumentInput, 'parts' | 'carriers' | 'supplies'>,
) {
  const finish = { inline: bySlug(finishes, box.finish) };
  const wall: NonNullable<AssemblyDocumentInput['housing']>['faces']['top'] = {
    wallM: box.wallM,
    material: { inline: bySlug(materials, box.material) },
    finishOutside: finish,
    finishInside: finish,
    loadState: 'free',
  };
  const faces = Object.fromEntries(faceNames.map((name) => [name, wall])) as NonNullable<
    AssemblyDocumentInput['housing']
  >['faces'];
  return assemblyDocumentSchema.parse({
    format: 'trimwick-assembly/1',
    name: 'Plain box',
    housing: { outerM: box.outerM, touched: 'no', faces },
    scenarios: [{ id: 'room', name: 'Room', airC: box.airC }],
    ...rest,
  } satisfies AssemblyDocumentInput);
}

/** A hand-spread bond of plain thermal paste, 0.1 mm over nine tenths of the contact. */
export const pasteBond = [
  { material: { inline: bySlug(materials, 'thermal-paste') }, thicknessM: 0.0001, contactShare: 0.9 },
];
