/** A fact of the trade; common practice, no source. */
import { describe, expect, it } from 'vitest';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { networkDocumentSchema } from '../../../shared/schemas/network.js';
import { bySlug, readPartTypes } from '../../data/files.js';
import { copperWPerMK, finResistance, openSurface } from './open-surfaces.js';

const film = bySlug(readPartTypes(), 'resistor-film-0w25');
const [bodyM, diameterM] = film.footprintM.value;

/**
 * Assumed: ten bodies side by side, 2.5 mm from one to the next, a flat block of 25 × 6.3 × 2.3 mm, lying flat, lacquered (0.9), in a
 * still room of 23 °C; twenty leads of 0.6 mm copper wire, 6 mm long each, to two rows of pads on a plain board (FR-4, 1.6 mm,
 * 0.8 W/(m K) in its plane, 20 mm of it beyond each row, no copper but the pads, 15 W/(m² K) from both its sides together per side).
 */
function bank(currentA: number) {
  const rowM = 0.025;
  const block = { node: 'bank', emissivity: 0.9 };
  const flat = { areaM2: rowM * bodyM, lengthM: (rowM * bodyM) / (2 * (rowM + bodyM)) };
  const lead = 0.006 / (copperWPerMK * (Math.PI / 4) * 0.0006 ** 2);
  const board = finResistance({
    conductivity: 0.8,
    sectionM2: rowM * 0.0016,
    perimeterM: 2 * rowM,
    lengthM: 0.02,
    film: 15,
  });
  return networkDocumentSchema.parse({
    format: 'trimwick-network/1',
    nodes: [
      { id: 'room', fixedC: 23 },
      {
        id: 'bank',
        source: { kind: 'resistor', currentA, resistanceOhm: 10, perK: 1e-4, count: 10, arrangement: 'parallel' },
      },
      { id: 'pads' },
    ],
    links: [
      ...openSurface({ ...block, name: 'upper', shape: 'plate-facing-up', ...flat }),
      ...openSurface({ ...block, name: 'lower', shape: 'plate-facing-down', ...flat }),
      ...openSurface({
        ...block,
        name: 'round',
        shape: 'vertical-plate',
        areaM2: 2 * (rowM + bodyM) * diameterM,
        lengthM: diameterM,
      }),
      { id: 'leads', kind: 'resistance', from: 'bank', to: 'pads', resistanceKPerW: lead / 20 },
      { id: 'board', kind: 'resistance', from: 'pads', to: 'room', resistanceKPerW: board / 2 },
    ],
  });
}

describe('A bank of ten small leaded 10 Ω resistors in parallel', () => {
  it('sits near 105 °C in a room at 1.4 A', () => {
    const bankC = solveNetwork(bank(1.4)).temperaturesC.bank;
    expect(bankC).toBeGreaterThan(95);
    expect(bankC).toBeLessThan(115);
  });

  it.each([
    [1.3, 1.7],
    [1.5, 2.25],
  ])('makes at %f A about %f W and stays between 90 and 120 °C', (currentA, powerW) => {
    const { temperaturesC, devices } = solveNetwork(bank(currentA));
    expect(Math.abs((devices.bank?.electricalW ?? NaN) / powerW - 1)).toBeLessThan(0.03);
    expect(temperaturesC.bank).toBeGreaterThan(90);
    expect(temperaturesC.bank).toBeLessThan(120);
  });
});
