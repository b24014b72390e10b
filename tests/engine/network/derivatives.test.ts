import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linkLaw, type FlowOut } from '../../../server/engine/network/link-laws.js';
import { network } from './documents.js';

const kinds = {
  resistance: { kind: 'resistance', resistanceKPerW: 3 },
  conduction: {
    kind: 'conduction',
    areaM2: 0.01,
    lengthM: 0.02,
    conductivityWPerMK: [
      [-100, 1],
      [900, 5],
    ],
  },
  film: { kind: 'film', coefficientWPerM2K: 8, areaM2: 0.02 },
  vertical: { kind: 'convection', shape: 'vertical-plate', areaM2: 0.02, lengthM: 0.1 },
  verticalSecond: {
    kind: 'convection',
    shape: 'vertical-plate',
    areaM2: 0.02,
    lengthM: 0.1,
    correlation: 'churchill-chu',
  },
  up: { kind: 'convection', shape: 'plate-facing-up', areaM2: 0.02, lengthM: 0.03 },
  upSecond: { kind: 'convection', shape: 'plate-facing-up', areaM2: 0.5, lengthM: 0.3, correlation: 'lloyd-moran' },
  down: { kind: 'convection', shape: 'plate-facing-down', areaM2: 0.02, lengthM: 0.03 },
  downSecond: {
    kind: 'convection',
    shape: 'plate-facing-down',
    areaM2: 0.02,
    lengthM: 0.03,
    correlation: 'fifth-power',
  },
  radiation: { kind: 'radiation', areaM2: 0.01, emissivity: 0.8 },
  inclined: { kind: 'convection', shape: 'inclined-plate', tiltDeg: 50, areaM2: 0.02, lengthM: 0.1 },
  inclinedDown: { kind: 'convection', shape: 'inclined-plate', tiltDeg: 130, areaM2: 0.02, lengthM: 0.1 },
  pipe: { kind: 'convection', shape: 'horizontal-cylinder', areaM2: 0.02, lengthM: 0.03 },
  pipeSecond: { kind: 'convection', shape: 'horizontal-cylinder', areaM2: 0.02, lengthM: 0.03, correlation: 'morgan' },
  post: { kind: 'convection', shape: 'vertical-cylinder', areaM2: 0.02, lengthM: 0.2, diameterM: 0.02 },
  ball: { kind: 'convection', shape: 'sphere', areaM2: 0.02, lengthM: 0.05 },
  windPlate: { kind: 'convection', shape: 'vertical-plate', areaM2: 0.02, lengthM: 0.1, airSpeedMPerS: 0.4 },
  windOpposing: {
    kind: 'convection',
    shape: 'vertical-plate',
    areaM2: 0.02,
    lengthM: 0.1,
    airSpeedMPerS: 0.4,
    flow: 'opposing',
  },
  windPipe: { kind: 'convection', shape: 'horizontal-cylinder', areaM2: 0.02, lengthM: 0.03, airSpeedMPerS: 2 },
  windBall: { kind: 'convection', shape: 'sphere', areaM2: 0.02, lengthM: 0.05, airSpeedMPerS: 2 },
  gapUpright: { kind: 'air-gap', areaM2: 0.02, gapM: 0.02, heightM: 0.3, tiltDeg: 90 },
  gapLevel: { kind: 'air-gap', areaM2: 0.02, gapM: 0.02, heightM: 0.3, tiltDeg: 0 },
  gapLeaning: { kind: 'air-gap', areaM2: 0.02, gapM: 0.02, heightM: 0.3, tiltDeg: 75 },
  channel: { kind: 'channel', areaM2: 0.02, spacingM: 0.008, heightM: 0.1 },
  channelSecond: { kind: 'channel', areaM2: 0.02, spacingM: 0.008, heightM: 0.1, correlation: 'elenbaas' },
  fins: {
    kind: 'fin-array',
    baseWidthM: 0.1,
    baseHeightM: 0.15,
    finHeightM: 0.03,
    finThicknessM: 0.001,
    finCount: 12,
    conductivityWPerMK: 20,
    tiltDeg: 20,
  },
  draught: { kind: 'ventilation', inletAreaM2: 2e-4, outletAreaM2: 3e-4, heightM: 0.1 },
  givenFlow: { kind: 'ventilation', flowM3PerS: 1e-3 },
  fan: {
    kind: 'ventilation',
    inletAreaM2: 4e-4,
    fanCurve: [
      [0, 30],
      [0.004, 0],
    ],
  },
  grey: { kind: 'radiation', areaM2: 0.01, emissivity: 0.8, emissivityTo: 0.3, areaToM2: 0.05, viewFactor: 0.7 },
} as const;

function lawOf(name: keyof typeof kinds) {
  const document = network({
    nodes: [{ id: 'a' }, { id: 'b', fixedC: 20 }],
    links: [{ from: 'a', to: 'b', ...structuredClone(kinds[name]) } as never],
  });
  const [link] = document.links;
  if (!link) throw new Error('no link');
  return linkLaw(link, document);
}

describe('Every flow law', () => {
  for (const name of Object.keys(kinds) as (keyof typeof kinds)[]) {
    it(`“${name}” has the derivatives of central differences, where the ends differ by more than 0.01 K`, () => {
      const law = lawOf(name);
      const at = (from: number, to: number): FlowOut => {
        const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
        law.evaluate(from, to, out);
        return out;
      };
      fc.assert(
        fc.property(
          fc.double({ min: 200, max: 900, noNaN: true }),
          fc.double({ min: 200, max: 900, noNaN: true }),
          (a, b) => {
            fc.pre(Math.abs(a - b) > 0.01);
            const d = Math.min(1e-3, Math.abs(a - b) / 20);
            const here = at(a, b);
            const byFrom = (at(a + d, b).flow - at(a - d, b).flow) / (2 * d);
            const byTo = (at(a, b + d).flow - at(a, b - d).flow) / (2 * d);
            const scale = Math.abs(here.byFrom) + Math.abs(here.byTo) + 1e-9;
            expect(Math.abs(byFrom - here.byFrom) / scale).toBeLessThan(2e-4);
            expect(Math.abs(byTo - here.byTo) / scale).toBeLessThan(2e-4);
          },
        ),
        { numRuns: 150 },
      );
    });

    it(`“${name}” carries nothing between equal temperatures and turns its sign with the difference`, () => {
      const out = { flow: NaN, byFrom: NaN, byTo: NaN, film: 0 };
      const law = lawOf(name);
      law.evaluate(320, 320, out);
      expect(Math.abs(out.flow)).toBe(0);
      expect(Number.isFinite(out.byFrom) && Number.isFinite(out.byTo)).toBe(true);
      law.evaluate(330, 320, out);
      expect(out.flow).toBeGreaterThan(0);
      law.evaluate(310, 320, out);
      expect(out.flow).toBeLessThan(0);
    });
  }
});
