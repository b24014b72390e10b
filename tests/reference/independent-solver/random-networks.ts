import {
  convectionFlows,
  convectionShapes,
  linkSchema,
  networkDocumentSchema,
  type NetworkDocument,
} from '../../../shared/schemas/network.js';

/** Every kind of link that a document may have: a new one comes in by itself. */
const kinds = linkSchema.options.map(({ shape }) => shape.kind.value);

/** Without opposing flow, whose greatest of two is blended everywhere: that is compared link by link. */
const smoothFlows = ['assisting', 'transverse'] as const;

/** Pressures at sea level, 1 500, 3 000 and 5 000 m [Pa]. */
const pressures = [101325, 84556, 70109, 54020];

/** A generator of even numbers in [0, 1) that gives the same row for the same seed (mulberry32, in the public domain). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

class Draw {
  constructor(private readonly random: () => number) {}
  between(low: number, high: number): number {
    return low + (high - low) * this.random();
  }
  /** Evenly in the logarithm. */
  scaled(low: number, high: number): number {
    return low * (high / low) ** this.random();
  }
  whole(low: number, high: number): number {
    return Math.floor(this.between(low, high + 1));
  }
  one<T>(list: readonly T[]): T {
    return list[Math.floor(this.random() * list.length)] as T;
  }
  chance(share: number): boolean {
    return this.random() < share;
  }
}

const correlationsOf: Record<string, string[]> = {
  'vertical-plate': ['raithby-hollands', 'churchill-chu', 'churchill-chu-laminar'],
  'plate-facing-up': ['raithby-hollands', 'lloyd-moran'],
  'plate-facing-down': ['raithby-hollands', 'mcadams', 'fifth-power'],
  'horizontal-cylinder': ['churchill-chu-cylinder', 'morgan'],
};

function convectionFieldsOf(draw: Draw, flows: readonly string[]): object {
  const shape = draw.one<string>(convectionShapes);
  const lengthM = draw.scaled(0.01, 0.4);
  const known = correlationsOf[shape];
  const moved = draw.chance(0.4);
  const flat = shape.includes('plate');
  return {
    shape,
    lengthM,
    areaM2: draw.between(0.002, 0.03),
    ...(known && draw.chance(0.5) ? { correlation: draw.one(known) } : {}),
    ...(shape === 'inclined-plate' ? { tiltDeg: draw.between(0, 180) } : {}),
    ...(shape === 'vertical-cylinder' ? { diameterM: draw.scaled(0.005, 0.1) } : {}),
    ...(draw.chance(0.3) ? { scale: draw.between(0.5, 1.5) } : {}),
    ...(moved
      ? {
          airSpeedMPerS: draw.scaled(0.1, 5),
          flow: draw.one(flows),
          ...(flat && draw.chance(0.5) ? { flowLengthM: draw.scaled(0.02, 0.4) } : {}),
        }
      : {}),
  };
}

function radiationFieldsOf(draw: Draw): object {
  const areaM2 = draw.between(0.002, 0.03);
  const emissivity = draw.between(0.05, 0.98);
  if (draw.chance(0.5))
    return { areaM2, emissivity, ...(draw.chance(0.3) ? { viewFactor: draw.between(0.2, 1) } : {}) };
  const viewFactor = draw.between(0.2, 1);
  // Reciprocity: view factor × area must not exceed the other area.
  return {
    areaM2,
    emissivity,
    viewFactor,
    emissivityTo: draw.between(0.1, 0.95),
    areaToM2: areaM2 * draw.between(1, 2),
  };
}

function ventilationFieldsOf(draw: Draw): object {
  if (draw.chance(0.3)) return { flowM3PerS: draw.scaled(1e-4, 5e-3) };
  const openings = {
    inletAreaM2: draw.scaled(5e-5, 2e-3),
    outletAreaM2: draw.scaled(5e-5, 2e-3),
    dischargeCoefficient: draw.between(0.5, 0.7),
  };
  if (draw.chance(0.5)) return { ...openings, heightM: draw.between(0.05, 0.4) };
  const [flow, pressure] = [draw.scaled(1e-3, 1e-2), draw.scaled(5, 60)];
  const bend = draw.between(0.3, 0.8);
  return {
    ...openings,
    fanCurve: [
      [0, pressure],
      [flow * bend, pressure * draw.between(0.3, 0.9)],
      [flow, 0],
    ],
  };
}

function finFieldsOf(draw: Draw): object {
  const finCount = draw.whole(4, 20);
  const finThicknessM = draw.between(0.001, 0.002);
  return {
    finCount,
    finThicknessM,
    baseWidthM: finCount * finThicknessM + (finCount - 1) * draw.between(0.004, 0.012),
    baseHeightM: draw.between(0.05, 0.2),
    finHeightM: draw.between(0.01, 0.04),
    conductivityWPerMK: draw.between(15, 200),
    tiltDeg: draw.between(0, 40),
  };
}

/** Narrow gaps that air only conducts across, and wide ones, whose laws are joined at few places. */
function gapFieldsOf(draw: Draw): object {
  const gapM = draw.chance(0.4) ? draw.between(0.002, 0.005) : draw.scaled(0.012, 0.05);
  return {
    gapM,
    heightM: gapM * draw.between(6, 60),
    areaM2: draw.between(0.005, 0.04),
    tiltDeg: draw.between(0, 180),
  };
}

function fieldsOf(kind: (typeof kinds)[number], draw: Draw, flows: readonly string[]): object {
  switch (kind) {
    case 'resistance':
      return { resistanceKPerW: draw.scaled(0.05, 50) };
    case 'conduction': {
      const k = draw.scaled(0.15, 200);
      const table = [
        [0, k],
        [60, k * draw.between(0.8, 1.3)],
        [150, k * draw.between(0.8, 1.5)],
      ];
      return {
        conductivityWPerMK: draw.chance(0.4) ? table : k,
        areaM2: draw.between(0.001, 0.02),
        lengthM: draw.scaled(0.002, 0.05),
      };
    }
    case 'film':
      return { coefficientWPerM2K: draw.between(1, 60), areaM2: draw.between(0.002, 0.03) };
    case 'convection':
      return convectionFieldsOf(draw, flows);
    case 'radiation':
      return radiationFieldsOf(draw);
    case 'ventilation':
      return ventilationFieldsOf(draw);
    case 'air-gap':
      return gapFieldsOf(draw);
    case 'fin-array':
      return finFieldsOf(draw);
    case 'channel':
      return {
        ...(draw.chance(0.5) ? { correlation: draw.one(['bar-cohen-rohsenow', 'elenbaas']) } : {}),
        areaM2: draw.between(0.01, 0.05),
        spacingM: draw.scaled(0.004, 0.02),
        heightM: draw.between(0.05, 0.3),
      };
  }
}

/**
 * A connected network of 5 to 40 free nodes and up to three fixed ones, one of which may be much colder, at some altitude. Nodes are
 * heated, idle or cooled; every kind of link may join any two of them.
 */
export function randomNetwork(seed: number): NetworkDocument {
  const draw = new Draw(seeded(seed));
  const fixed = [
    { id: 'room', fixedC: draw.between(-20, 60) },
    ...(draw.chance(0.6) ? [{ id: 'walls', fixedC: draw.between(-20, 60) }] : []),
    ...(draw.chance(0.5) ? [{ id: 'cold', fixedC: draw.between(-60, 10) }] : []),
  ];
  const count = draw.whole(5, 40);
  const names = Array.from({ length: count }, (_, i) => `n${String(i)}`);
  const free = names.map((id) => {
    if (draw.chance(0.45)) return { id };
    return { id, heatW: draw.chance(0.15) ? -draw.between(0.05, 0.6) : draw.scaled(0.05, 3) };
  });
  const links: { kind: string; [field: string]: unknown }[] = [];
  const join = (from: string, to: string) => {
    let kind = draw.one(kinds);
    // Of many gaps one would always work near a joint of its laws.
    if (kind === 'air-gap' && links.filter((link) => link.kind === kind).length > 1) kind = 'radiation';
    links.push({ id: `l${String(links.length)}`, kind, from, to, ...fieldsOf(kind, draw, smoothFlows) });
  };
  names.forEach((id, i) => {
    const earlier = [...fixed.map((node) => node.id), ...names.slice(0, i)];
    join(id, draw.one(earlier));
    // Enough ways out that nothing glows.
    if (draw.chance(0.6)) join(id, draw.one(fixed).id);
    const other = draw.one(names);
    if (draw.chance(0.3) && other !== id) join(other, id);
  });
  return networkDocumentSchema.parse({
    format: 'trimwick-network/1',
    pressurePa: draw.one(pressures),
    nodes: [...fixed, ...free],
    links,
  });
}

/** One link of each kind between two fixed nodes for each seed: what is compared is its flow. */
export function singleLinks(seed: number, count: number): NetworkDocument {
  const draw = new Draw(seeded(seed));
  const nodes: object[] = [];
  const links: object[] = [];
  for (let i = 0; i < count; i++) {
    const [from, to] = [`a${String(i)}`, `b${String(i)}`];
    const fixedC = draw.between(-40, 60);
    // From a tenth of a kelvin to 300 K, either way round.
    const excess = draw.scaled(0.1, 300) * (draw.chance(0.7) ? 1 : -0.3);
    nodes.push({ id: from, fixedC: fixedC + excess }, { id: to, fixedC });
    const kind = kinds[i % kinds.length] as (typeof kinds)[number];
    links.push({ id: `l${String(i)}`, kind, from, to, ...fieldsOf(kind, draw, convectionFlows) });
  }
  return networkDocumentSchema.parse({ format: 'trimwick-network/1', pressurePa: draw.one(pressures), nodes, links });
}
