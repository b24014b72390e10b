/**
 * A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106 (1984) 116–123; W. Elenbaas, Physica 9 (1942) 1–28. Formulas from memory. Heat sink:
 * Çengel, Heat Transfer, the finned heat sink of the natural-convection chapter (from memory).
 */
import { describe, expect, it } from 'vitest';
import { nusseltChannelBarCohenRohsenow, nusseltChannelElenbaas } from '../../../server/engine/convection/channel.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';
import { exactly } from '../correlation-check.js';

const out = { nu: 0, byLogEl: 0 };
const points = [0.1, 1, 10, 50, 1e2, 1e3, 1e5];

describe('Channels', () => {
  it('follow Bar-Cohen and Rohsenow, with both limits', () => {
    for (const el of points) {
      nusseltChannelBarCohenRohsenow(el, out);
      expect(out.nu / exactly('(576 / ra^2 + 2.873 / ra^(1/2))^(-1/2)', el, 0.7)).toBeCloseTo(1, 11);
    }
    nusseltChannelBarCohenRohsenow(0.01, out);
    expect(out.nu / (0.01 / 24)).toBeCloseTo(1, 3);
    nusseltChannelBarCohenRohsenow(1e7, out);
    expect(out.nu / (0.59 * 1e7 ** 0.25)).toBeCloseTo(1, 2);
  });

  it('follow Elenbaas', () => {
    for (const el of points) {
      nusseltChannelElenbaas(el, out);
      expect(out.nu / exactly('ra / 24 * (1 - exp(-35 / ra))^(3/4)', el, 0.7)).toBeCloseTo(1, 11);
    }
  });
});

describe('A finned heat sink', () => {
  /** 0.12 m wide, 0.18 m high, fins 1 mm × 24 mm; 80 °C in 30 °C air. */
  const sink = (finCount: number) =>
    solveNetwork(
      network({
        nodes: [
          { id: 'base', fixedC: 80 },
          { id: 'room', fixedC: 30 },
        ],
        links: [
          {
            id: 'fins',
            kind: 'fin-array',
            from: 'base',
            to: 'room',
            baseWidthM: 0.12,
            baseHeightM: 0.18,
            finHeightM: 0.024,
            finThicknessM: 0.001,
            finCount,
            conductivityWPerMK: 200,
          },
        ],
      }),
    );

  it('loses most at the spacing that the book calls best, 7.45 mm and about 14 to 15 fins', () => {
    const flow = (finCount: number) => sink(finCount).flowsW.fins ?? 0;
    const counts = Array.from({ length: 40 }, (_, i) => i + 3);
    const best = counts.reduce((a, b) => (flow(b) > flow(a) ? b : a));
    const spacing = (0.12 - best * 0.001) / (best - 1);
    // The optimum is flat, and the book’s rule is for infinitely thin fins without their strips.
    expect(spacing).toBeGreaterThan(0.0062);
    expect(spacing).toBeLessThan(0.0088);
  });

  it('has the book’s film coefficient of 4.89 W/(m² K), and its fins lose 31.7 W', () => {
    // Printed: Nu = 1.307 at the best spacing, h = 1.307 · 0.0279/0.00745 = 4.89, Q = h 2 n L H ΔT = 31.7 W for 15 fins (from memory).
    const { filmCoefficientsWPerM2K, flowsW } = sink(15);
    expect(Math.abs((filmCoefficientsWPerM2K.fins ?? 0) / 4.89 - 1)).toBeLessThan(0.05);
    // The book leaves out the tips (t/2 each) and the strips of the base between the fins, which we count.
    const spacing = (0.12 - 0.015) / 14;
    const fins = 2 * 15 * 0.18 * 0.024;
    const counted = 2 * 15 * 0.18 * 0.0245 + 14 * spacing * 0.18;
    expect(Math.abs(((flowsW.fins ?? 0) * fins) / counted / 31.7 - 1)).toBeLessThan(0.05);
  });
});
