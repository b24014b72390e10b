import { faceNames, type AssemblyDocumentInput } from '../../../shared/schemas/assembly.js';
import { plainHeat } from '../../../shared/first-assembly.js';
import type { MaterialVersion } from '../../../shared/schemas/reference-lists.js';

/** Edits of the assembly document as a whole: adding and removing entries, with references kept whole. */

type Document = AssemblyDocumentInput;

/** `stem-1`, `stem-2` …: the first that is free. */
export function freeId(stem: string, taken: readonly { id: string }[]): string {
  const ids = new Set(taken.map(({ id }) => id));
  for (let n = 1; ; n += 1) {
    const id = `${stem}-${String(n)}`;
    if (!ids.has(id)) return id;
  }
}

export function addPart(document: Document): Document {
  const id = freeId('part', document.parts);
  const on = document.carriers?.[0]?.id ?? (document.housing === null ? '' : 'face.bottom');
  return {
    ...document,
    parts: [
      ...document.parts,
      {
        id,
        name: `Part ${id.slice(5)}`,
        type: { inline: plainHeat },
        mount: { on, stack: null },
        supply: document.supplies?.[0]?.id ?? null,
        count: 1,
        arrangement: 'parallel',
        heatW: null,
        lightKeptShare: null,
      },
    ],
  };
}

function inner(document: Document): [number, number] {
  const [x, y] = document.housing?.outerM ?? [0.1, 0.08];
  const share = (size: unknown) => (typeof size === 'number' ? Math.max(Math.round(size * 750) / 1000, 0.003) : 0.05);
  return [share(x), share(y)];
}

function versionOf(materials: readonly MaterialVersion[], word: RegExp): { version: string } | null {
  const found = materials.find(({ content }) => word.test(content.slug) || word.test(content.name));
  return found ? { version: found.version } : null;
}

export function addPlate(document: Document, materials: readonly MaterialVersion[]): Document {
  const material = versionOf(materials, /^aluminium-606/) ?? versionOf(materials, /alumin/i);
  if (!material) return document;
  return {
    ...document,
    carriers: [
      ...(document.carriers ?? []),
      {
        id: freeId('plate', document.carriers ?? []),
        kind: 'plate',
        sizeM: inner(document),
        thicknessM: 0.0015,
        material,
        finish: null,
        on: document.housing === null ? null : { face: 'top', stack: null },
      },
    ],
  };
}

export function addBoard(document: Document, materials: readonly MaterialVersion[]): Document {
  const laminate = materials.find(({ content }) => content.group === 'laminate');
  const copper = versionOf(materials, /copper/i);
  if (!laminate) return document;
  const foil = copper ? [{ material: copper, thicknessM: 0.000035, coverage: 0.5 }] : [];
  return {
    ...document,
    carriers: [
      ...(document.carriers ?? []),
      {
        id: freeId('board', document.carriers ?? []),
        kind: 'board',
        sizeM: inner(document),
        layers: [...foil, { material: { version: laminate.version }, thicknessM: 0.0016, coverage: 1 }, ...foil],
        finish: null,
        standOffM: null,
        on: document.housing === null ? null : { face: 'bottom' },
      },
    ],
  };
}

/** A base plate with fins: in the open, or on the outside of the back. */
export function addFins(document: Document, materials: readonly MaterialVersion[]): Document {
  const material = versionOf(materials, /^aluminium-606/) ?? versionOf(materials, /alumin/i);
  if (!material) return document;
  return {
    ...document,
    carriers: [
      ...(document.carriers ?? []),
      {
        id: freeId('sink', document.carriers ?? []),
        kind: 'fins',
        sizeM: [0.06, 0.04],
        thicknessM: 0.003,
        material,
        finish: null,
        facing: 'sideways',
        fins: { heightM: 0.02, thicknessM: 0.001, count: 8, along: 'y' },
        on: document.housing === null ? null : { face: 'back', stack: null },
      },
    ],
  };
}

export function addLead(document: Document): Document {
  const id = freeId('lead', document.leads ?? []);
  return {
    ...document,
    leads: [
      ...(document.leads ?? []),
      {
        id,
        name: `Lead ${id.slice(5)}`,
        part: document.parts[0]?.id ?? '',
        supply: document.supplies?.[0]?.id ?? null,
        currentA: null,
        count: 2,
        crossSectionM2: 7.5e-7,
        insideM: 0.05,
        outsideM: 1,
        outerDiameterM: null,
        insulationMaxC: 70,
      },
    ],
  };
}

export function removeLead(document: Document, index: number): Document {
  return { ...document, leads: (document.leads ?? []).filter((_, i) => i !== index) };
}

/** Takes the housing away: its carriers stand in the room. Only where no part stands on a wall. */
export function removeHousing(document: Document): Document {
  return {
    ...document,
    housing: null,
    carriers: (document.carriers ?? []).map((carrier) => ({ ...carrier, on: null, facing: carrier.facing ?? 'up' })),
    scenarios: document.scenarios.map((scenario) => ({ ...scenario, pose: null })),
  };
}

/** A plain box round the carriers, of walls that nothing is known of yet. */
export function addHousing(document: Document): Document {
  const wall = { wallM: null, material: null, finishOutside: null, finishInside: null, print: null };
  const largest = (axis: 0 | 1) =>
    Math.max(
      0.05,
      ...(document.carriers ?? []).map(({ sizeM }) => (typeof sizeM[axis] === 'number' ? sizeM[axis] : 0)),
    );
  return {
    ...document,
    housing: {
      outerM: [largest(0) + 0.03, largest(1) + 0.03, 0.05],
      touched: null,
      faces: Object.fromEntries(faceNames.map((face) => [face, wall])) as NonNullable<Document['housing']>['faces'],
    },
    carriers: (document.carriers ?? []).map((carrier): typeof carrier =>
      carrier.kind === 'board'
        ? { ...carrier, on: { face: 'bottom' } }
        : carrier.kind === 'fins'
          ? { ...carrier, on: { face: 'back', stack: null } }
          : { ...carrier, on: { face: 'bottom', stack: null } },
    ),
  };
}

export function addSupply(document: Document): Document {
  const id = freeId('supply', document.supplies ?? []);
  return {
    ...document,
    supplies: [...(document.supplies ?? []), { id, name: `Supply ${id.slice(7)}`, currentA: 0.1, maxA: null }],
  };
}

export function removePart(document: Document, index: number): Document {
  const id = document.parts[index]?.id;
  const { drive } = document;
  const driven = drive && 'parts' in drive ? drive.parts.filter((part) => part !== id) : [];
  return {
    ...document,
    parts: document.parts.filter((_, i) => i !== index),
    drive: drive && 'parts' in drive ? (driven.length > 0 ? { parts: driven } : null) : (drive ?? null),
  };
}

/** Parts that stood on the carrier stand on the wall that it stood on. */
export function removeCarrier(document: Document, index: number): Document {
  const gone = document.carriers?.[index];
  if (!gone) return document;
  return {
    ...document,
    carriers: (document.carriers ?? []).filter((_, i) => i !== index),
    parts: document.parts.map((part) =>
      part.mount.on === gone.id
        ? { ...part, mount: { ...part.mount, on: gone.on ? `face.${gone.on.face}` : '' } }
        : part,
    ),
  };
}

/** Parts that it fed are fed by nothing, and say so. */
export function removeSupply(document: Document, index: number): Document {
  const gone = document.supplies?.[index]?.id;
  const { drive } = document;
  return {
    ...document,
    supplies: (document.supplies ?? []).filter((_, i) => i !== index),
    parts: document.parts.map((part) => (part.supply === gone ? { ...part, supply: null } : part)),
    drive: drive && 'supply' in drive && drive.supply === gone ? null : (drive ?? null),
  };
}

export const scenarioTemplates = [
  { id: 'room', name: 'Room', airC: 25, altitudeM: 0, sun: null },
  { id: 'hot-attic', name: 'Hot attic', airC: 50, altitudeM: 0, sun: null },
  {
    id: 'window-sill',
    name: 'Sunlit window sill',
    airC: 35,
    altitudeM: 0,
    sun: { irradianceWPerM2: 1000, onto: 'worst' as const, glazingTransmittance: 0.85 },
  },
  { id: 'mountain-hut', name: 'Mountain hut, cold and thin-aired', airC: 10, altitudeM: 2500, sun: null },
] as const;

export function addScenario(document: Document, template: (typeof scenarioTemplates)[number]): Document {
  const taken = new Set(document.scenarios.map(({ id }) => id));
  const id = taken.has(template.id) ? freeId(template.id, document.scenarios) : template.id;
  return {
    ...document,
    scenarios: [
      ...document.scenarios,
      {
        id,
        name: template.name,
        airC: template.airC,
        surroundingsC: null,
        altitudeM: template.altitudeM,
        airSpeedMPerS: 0,
        sun: template.sun,
        mustHold: true,
        fault: null,
      },
    ],
  };
}

export function removeScenario(document: Document, index: number): Document {
  return { ...document, scenarios: document.scenarios.filter((_, i) => i !== index) };
}
