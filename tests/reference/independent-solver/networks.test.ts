/**
 * The same networks by an independent solver: SciPy’s general root finder (Debian’s python3-scipy 1.10) on the laws as written a
 * second time, in another language, from their published formulas. It shares no line with the engine.
 */
import { beforeAll, describe, expect, it } from 'vitest';
import { convectionShapes, linkSchema, type NetworkDocument } from '../../../shared/schemas/network.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';
import { boxes } from './boxes.js';
import { solveIndependently, type IndependentAnswer } from './python.js';
import { randomNetwork, singleLinks } from './random-networks.js';

/** So many are drawn, and so many are compared at least. */
const drawn = 200;
const compared = 60;

/** Each draws links at one altitude. */
const pressureSeeds = [1, 2, 3, 4];

/** Greatest difference of a temperature, and the node it is at. */
function difference(document: NetworkDocument, reference: IndependentAnswer): { kelvin: number; node: string } {
  const { temperaturesC } = solveNetwork(document);
  let worst = { kelvin: 0, node: '' };
  for (const { id } of document.nodes) {
    const kelvin = Math.abs((temperaturesC[id] ?? NaN) - (reference.temperaturesC[id] ?? NaN));
    if (!(kelvin <= worst.kelvin)) worst = { kelvin, node: id };
  }
  return worst;
}

/** Where air’s laws hold, with room: nothing below 170 K or above 1 000 K. */
function withinAir({ temperaturesC }: IndependentAnswer): boolean {
  return Object.values(temperaturesC).every((celsius) => celsius > -100 && celsius < 730);
}

describe('Networks of every kind of link', () => {
  const documents = Array.from({ length: drawn }, (_, i) => randomNetwork(1000 + i));
  let pairs: { seed: number; document: NetworkDocument; reference: IndependentAnswer }[] = [];

  beforeAll(async () => {
    const answers = await solveIndependently(documents);
    pairs = documents
      .map((document, i) => ({ seed: 1000 + i, document, reference: answers[i] as IndependentAnswer }))
      // A law published in pieces may be joined in more than one way.
      .filter(
        ({ reference }) => reference.nearJoints.length + reference.closeLaws.length === 0 && withinAir(reference),
      );
  }, 120_000);

  it('are enough, and hold every kind of link and every shape often', () => {
    expect(pairs.length).toBeGreaterThanOrEqual(compared);
    for (const { shape } of linkSchema.options) {
      const kind = shape.kind.value;
      const holding = pairs.filter(({ document }) => document.links.some((link) => link.kind === kind));
      expect(holding.length, kind).toBeGreaterThan(20);
    }
    for (const wanted of convectionShapes) {
      const holding = pairs.filter(({ document }) =>
        document.links.some((link) => link.kind === 'convection' && link.shape === wanted),
      );
      expect(holding.length, wanted).toBeGreaterThan(10);
    }
    expect(Math.max(...pairs.map(({ reference }) => reference.residualW))).toBeLessThan(1e-8);
  });

  it('have a surface colder than its air in many of them', () => {
    const cold = pairs.filter(({ document, reference }) =>
      document.links.some((link) => link.kind === 'convection' && (reference.flowsW[link.id ?? ''] ?? 0) < -0.01),
    );
    expect(cold.length).toBeGreaterThan(20);
  });

  it('have the same temperatures within 0.01 K', () => {
    const differing = pairs
      .map(({ seed, document, reference }) => ({ seed, ...difference(document, reference) }))
      .filter(({ kelvin }) => !(kelvin <= 0.01));
    expect(differing).toEqual([]);
  });
});

describe('Links between fixed temperatures', () => {
  const documents = pressureSeeds.map((seed) => singleLinks(seed, 900));
  interface Row {
    kind: string;
    link: string;
    off: number;
    place: 'near' | 'close' | 'elsewhere';
  }
  const rows: Row[] = [];

  beforeAll(async () => {
    const references = await solveIndependently(documents);
    documents.forEach((document, i) => {
      const reference = references[i] as IndependentAnswer;
      const { flowsW } = solveNetwork(document);
      const near = new Set(reference.nearJoints);
      const close = new Set(reference.closeLaws);
      for (const link of document.links) {
        const id = link.id ?? '';
        const off = Math.abs((flowsW[id] ?? NaN) / (reference.flowsW[id] ?? NaN) - 1);
        const place = near.has(id) ? 'near' : close.has(id) ? 'close' : 'elsewhere';
        rows.push({ kind: link.kind, link: JSON.stringify(link), off, place });
      }
    });
  }, 120_000);

  const beyond = (place: Row['place'], allowed: number) =>
    rows.filter((row) => row.place === place && !(row.off <= allowed));

  it('are many of each kind, most of them away from joints', () => {
    for (const { shape } of linkSchema.options) {
      const away = rows.filter((row) => row.kind === shape.kind.value && row.place === 'elsewhere');
      expect(away.length, shape.kind.value).toBeGreaterThan(100);
    }
  });

  it('carry the same heat within 0.1 % away from the joints of laws in pieces', () => {
    expect(beyond('elsewhere', 1e-3)).toEqual([]);
  });

  it('carry the same heat within 5 % within a factor 3 of a joint', () => {
    expect(rows.filter(({ place }) => place === 'near').length).toBeGreaterThan(50);
    expect(beyond('near', 0.05)).toEqual([]);
  });

  it('carry the same heat within 0.5 % where a law is the greatest of several that are close', () => {
    expect(rows.filter(({ place }) => place === 'close').length).toBeGreaterThan(20);
    expect(beyond('close', 5e-3)).toEqual([]);
  });
});

describe('Boxes', () => {
  const documents = Object.values(boxes).map((content) => network(content));
  let references: IndependentAnswer[] = [];

  beforeAll(async () => {
    references = await solveIndependently(documents);
  }, 60_000);

  it.each(Object.keys(boxes).map((name, i) => [name, i] as const))('%s', (_, i) => {
    const document = documents[i] as NetworkDocument;
    const reference = references[i] as IndependentAnswer;
    expect(reference.residualW).toBeLessThan(1e-8);
    // The part is well away from the room: the comparison has something to compare.
    expect(Math.abs((reference.temperaturesC.part ?? 0) - (reference.temperaturesC.room ?? 0))).toBeGreaterThan(5);
    expect(difference(document, reference).kelvin).toBeLessThanOrEqual(0.01);
  });
});
