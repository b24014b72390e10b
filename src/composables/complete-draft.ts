import { assemblyFormat, faceNames, type AssemblyDocumentInput } from '../../shared/schemas/assembly.js';

type Loose = Record<string, unknown>;

function record(value: unknown): Loose {
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Loose) : {};
}

function records(value: unknown): Loose[] {
  return Array.isArray(value) ? value.map(record) : [];
}

function pair(value: unknown, length: number): unknown[] {
  const given: unknown[] = Array.isArray(value) ? value : [];
  return Array.from({ length }, (_, i) => given[i] ?? '');
}

function wall(value: unknown): Loose {
  const given = record(value);
  return {
    wallM: null,
    material: null,
    finishOutside: null,
    finishInside: null,
    print: null,
    loadState: null,
    ...given,
    exposure: { kind: 'open', ...record(given.exposure) },
    vents: given.vents ?? [],
  };
}

/**
 * A draft is kept as typed and may be unfinished: this fills in the frame that the sheet draws its fields into. Values are left as
 * they stand, right or wrong, so that nothing is lost and each wrong one shows its error beside its field.
 */
export function completeDraft(draft: unknown): AssemblyDocumentInput {
  const given = record(draft);
  const housing = record(given.housing);
  const faces = record(housing.faces);
  const filled: Loose = {
    name: '',
    note: '',
    drive: null,
    cutOuts: [],
    limits: [],
    ...given,
    format: given.format ?? assemblyFormat,
    housing:
      given.housing === null
        ? null
        : {
            touched: null,
            fill: { kind: 'air' },
            fan: null,
            ...housing,
            outerM: pair(housing.outerM, 3),
            pose: { up: 'top', tiltDeg: 0, towards: null, ...record(housing.pose) },
            faces: Object.fromEntries(faceNames.map((face) => [face, wall(faces[face])])),
          },
    carriers: records(given.carriers).map((carrier) => ({
      ...carrier,
      sizeM: pair(carrier.sizeM, 2),
      on: given.housing === null ? null : { face: 'bottom', ...record(carrier.on) },
      ...(carrier.kind === 'board' ? { layers: records(carrier.layers) } : {}),
      ...(carrier.kind === 'fins' ? { fins: record(carrier.fins) } : {}),
    })),
    parts: records(given.parts).map((part) => ({
      supply: null,
      count: 1,
      arrangement: 'parallel',
      heatW: null,
      lightKeptShare: null,
      ...part,
      mount: { on: '', stack: null, ...record(part.mount) },
    })),
    supplies: records(given.supplies).map((supply) => ({ maxA: null, ...supply })),
    leads: records(given.leads),
    scenarios: records(given.scenarios).map((scenario) => ({
      airC: null,
      surroundingsC: null,
      altitudeM: 0,
      airSpeedMPerS: 0,
      skyC: null,
      pose: null,
      sun: null,
      mustHold: true,
      fault: null,
      ...scenario,
    })),
  };
  return filled as unknown as AssemblyDocumentInput;
}
