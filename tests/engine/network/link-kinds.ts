import { linkLaw } from '../../../server/engine/network/link-laws.js';
import { network } from './documents.js';

const plate = { kind: 'convection', shape: 'vertical-plate', areaM2: 0.02, lengthM: 0.1 } as const;
const ball = { kind: 'convection', shape: 'sphere', areaM2: 0.02, lengthM: 0.05 } as const;
const pipe = { kind: 'convection', shape: 'horizontal-cylinder', areaM2: 0.02, lengthM: 0.03 } as const;
const post = { kind: 'convection', shape: 'vertical-cylinder', areaM2: 0.02, lengthM: 0.2, diameterM: 0.02 } as const;
const up = { kind: 'convection', shape: 'plate-facing-up', areaM2: 0.02, lengthM: 0.03 } as const;
const down = { kind: 'convection', shape: 'plate-facing-down', areaM2: 0.02, lengthM: 0.03 } as const;
const leaning = { kind: 'convection', shape: 'inclined-plate', areaM2: 0.02, lengthM: 0.1 } as const;
const gap = { kind: 'air-gap', areaM2: 0.02, gapM: 0.02, heightM: 0.3 } as const;

/** One link of every kind, shape, correlation and way of the air, for the tests of the flow laws. */
export const kinds = {
  resistance: { kind: 'resistance', resistanceKPerW: 3 },
  conduction: { kind: 'conduction', areaM2: 0.01, lengthM: 0.02, conductivityWPerMK: 0.3 },
  conductionByTable: {
    kind: 'conduction',
    areaM2: 0.01,
    lengthM: 0.02,
    conductivityWPerMK: [
      [-100, 1],
      [40, 2],
      [60, 1.5],
      [900, 5],
    ],
  },
  film: { kind: 'film', coefficientWPerM2K: 8, areaM2: 0.02 },
  radiation: { kind: 'radiation', areaM2: 0.01, emissivity: 0.8 },
  grey: { kind: 'radiation', areaM2: 0.01, emissivity: 0.8, emissivityTo: 0.3, areaToM2: 0.05, viewFactor: 0.7 },
  vertical: plate,
  verticalTall: { ...plate, lengthM: 2 },
  verticalSecond: { ...plate, correlation: 'churchill-chu' },
  verticalLaminar: { ...plate, correlation: 'churchill-chu-laminar' },
  up,
  upLarge: { ...up, lengthM: 1 },
  upSecond: { ...up, areaM2: 0.5, lengthM: 0.12, correlation: 'lloyd-moran' },
  down,
  downSecond: { ...down, areaM2: 0.5, lengthM: 0.12, correlation: 'mcadams' },
  downThird: { ...down, correlation: 'fifth-power' },
  inclined: { ...leaning, tiltDeg: 50 },
  inclinedHardly: { ...leaning, tiltDeg: 89 },
  inclinedLevel: { ...leaning, tiltDeg: 0 },
  inclinedDown: { ...leaning, tiltDeg: 130 },
  pipe,
  pipeSecond: { ...pipe, correlation: 'morgan' },
  wireSecond: { ...pipe, lengthM: 0.0005, correlation: 'morgan' },
  trunkSecond: { ...pipe, lengthM: 0.15, correlation: 'morgan' },
  post,
  wireUpright: { ...post, lengthM: 0.5, diameterM: 0.001 },
  ball,
  windPlate: { ...plate, airSpeedMPerS: 0.4 },
  windAlong: { ...plate, airSpeedMPerS: 0.4, flow: 'assisting', flowLengthM: 0.3 },
  windTurbulent: { ...plate, airSpeedMPerS: 15, flowLengthM: 0.6 },
  windOpposing: { ...plate, airSpeedMPerS: 0.4, flow: 'opposing' },
  windOpposingUp: { ...up, airSpeedMPerS: 0.3, flow: 'opposing' },
  windOpposingPipe: { ...pipe, airSpeedMPerS: 0.2, flow: 'opposing' },
  windOpposingPost: { ...post, airSpeedMPerS: 0.3, flow: 'opposing' },
  windOpposingBall: { ...ball, airSpeedMPerS: 0.15, flow: 'opposing' },
  windLeaning: { ...leaning, tiltDeg: 40, airSpeedMPerS: 0.5, flow: 'opposing' },
  windPipe: { ...pipe, airSpeedMPerS: 2 },
  windPost: { ...post, airSpeedMPerS: 2 },
  windBall: { ...ball, airSpeedMPerS: 2 },
  gapUpright: { ...gap, tiltDeg: 90 },
  gapNarrow: { ...gap, gapM: 0.005, tiltDeg: 90 },
  gapWide: { ...gap, gapM: 0.06, tiltDeg: 90 },
  gapLevel: { ...gap, tiltDeg: 0 },
  gapFromAbove: { ...gap, tiltDeg: 180 },
  gapLow: { ...gap, tiltDeg: 35 },
  gapLeaning: { ...gap, tiltDeg: 75 },
  gapOverhanging: { ...gap, tiltDeg: 125 },
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
  fanBent: {
    kind: 'ventilation',
    inletAreaM2: 4e-4,
    fanCurve: [
      [0, 40],
      [0.0015, 25],
      [0.002, 16],
      [0.0024, 13],
      [0.003, 9],
      [0.005, 0],
    ],
  },
  /** Ends under pressure, and through openings so large that it delivers its last flow where the air is thin. */
  fanEnding: {
    kind: 'ventilation',
    inletAreaM2: 1.1e-3,
    fanCurve: [
      [0.001, 12],
      [0.0025, 11],
      [0.004, 5],
    ],
  },
} as const;

export type KindName = keyof typeof kinds;

/** The law of one of them, between a free node and a fixed one. */
export function lawOf(name: KindName) {
  const document = network({
    nodes: [{ id: 'a' }, { id: 'b', fixedC: 20 }],
    links: [{ from: 'a', to: 'b', ...structuredClone(kinds[name]) } as never],
  });
  const [link] = document.links;
  if (!link) throw new Error('no link');
  return linkLaw(link, document);
}
