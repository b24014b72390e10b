/** Facts of the trade; common practice, no source. */
import { describe, expect, it } from 'vitest';
import { estimateAssembly } from '../../../server/engine/answers/estimate.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { networkDocumentSchema } from '../../../shared/schemas/network.js';
import { bySlug, readPartTypes, readRuleSets } from '../../data/files.js';
import { copperWPerMK, finResistance, openSurface, pasteBond, plainBox } from './open-surfaces.js';

const clad = bySlug(readPartTypes(), 'resistor-metal-clad-50w');
const [lengthM, widthM] = clad.footprintM.value;
const heightM = clad.heightM.value;
const emissivity = 0.85;

/**
 * Assumed: the body stands free on its long edge in a still room of 23 °C, anodised (0.85), its broad faces ribbed to 1.3 to 1.5
 * times their area, one endless insulated copper lead of 1.5 to 2.5 mm² (3 to 3.6 mm over all) at each end, 15 W/(m² K) along it.
 */
function bareBody(ribs: number, wireMm2: number, overInsulationM: number) {
  const body = { node: 'body', emissivity };
  const edge = { areaM2: lengthM * heightM, lengthM: (lengthM * heightM) / (2 * (lengthM + heightM)) };
  const lead = finResistance({
    conductivity: copperWPerMK,
    sectionM2: wireMm2 * 1e-6,
    perimeterM: Math.PI * overInsulationM,
    lengthM: Infinity,
    film: 15,
  });
  return networkDocumentSchema.parse({
    format: 'trimwick-network/1',
    nodes: [
      { id: 'room', fixedC: 23 },
      { id: 'body', heatW: 30 },
    ],
    links: [
      ...openSurface({
        ...body,
        name: 'broad',
        shape: 'vertical-plate',
        areaM2: 2 * lengthM * widthM,
        lengthM: widthM,
        ribs,
      }),
      ...openSurface({ ...body, name: 'ends', shape: 'vertical-plate', areaM2: 2 * widthM * heightM, lengthM: widthM }),
      ...openSurface({ ...body, name: 'upper', shape: 'plate-facing-up', ...edge }),
      ...openSurface({ ...body, name: 'lower', shape: 'plate-facing-down', ...edge }),
      { id: 'leads', kind: 'resistance', from: 'body', to: 'room', resistanceKPerW: lead / 2 },
    ],
  });
}

describe('A 50 W metal-clad resistor run at 30 W', () => {
  it.each([
    [1.3, 2.5, 0.0036],
    [1.5, 1.5, 0.003],
    [1.5, 2.5, 0.0036],
  ])('without a heat sink reaches 150 to 205 °C (ribs %f, leads of %f mm²)', (ribs, wireMm2, overInsulationM) => {
    const bodyC = solveNetwork(bareBody(ribs, wireMm2, overInsulationM)).temperaturesC.body;
    expect(bodyC).toBeGreaterThan(150);
    expect(bodyC).toBeLessThan(205);
  });

  // Assumed: box of 120 × 95 × 55 mm, 2 mm walls, all faces open to a still room of 23 °C, bolted down with paste.
  it.each([
    ['paint-black', 65, 110],
    ['aluminium-mill', 85, 135],
  ])('bolted into a small aluminium box (%s) stays well below 150 °C: %d to %d °C', (finish, low, high) => {
    const box = plainBox(
      { outerM: [0.12, 0.095, 0.055], wallM: 0.002, material: 'aluminium-6060', finish, airC: 23 },
      {
        parts: [{ id: 'r', type: { inline: clad }, mount: { on: 'face.bottom', stack: pasteBond }, supply: 's' }],
        supplies: [{ id: 's', currentA: Math.sqrt(3) }],
      },
    );
    const estimate = estimateAssembly(box, bySlug(readRuleSets(), 'plain-workshop'));
    expect(Math.abs((estimate.devices['part.r.junction']?.electricalW ?? NaN) - 30)).toBeLessThan(1);
    const bodyC = estimate.nodes.find(({ id }) => id === 'part.r.case')?.temperatureC;
    expect(bodyC).toBeGreaterThan(low);
    expect(bodyC).toBeLessThan(high);
  });
});
