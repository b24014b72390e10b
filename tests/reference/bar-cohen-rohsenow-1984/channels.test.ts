/**
 * A. Bar-Cohen, W. M. Rohsenow, J. Heat Transfer 106 (1984) 116–123; W. Elenbaas, Physica 9 (1942) 1–28. Formulas from memory. Heat sink:
 * Çengel, Heat Transfer, the finned heat sink of the natural-convection chapter (from memory).
 */
import { describe, expect, it } from 'vitest';
import { nusseltChannelBarCohenRohsenow, nusseltChannelElenbaas } from '../../../server/engine/convection/channel.js';
import { blankFilmAir, filmAir } from '../../../server/engine/air.js';
import { solveNetwork } from '../../../server/engine/network/solve.js';
import { network } from '../../engine/network/documents.js';
import { agreesWith, exactly } from '../correlation-check.js';

const out = { nu: 0, byLogEl: 0 };
const points = [0.1, 1, 10, 50, 1e2, 1e3, 1e5];

type ChannelLaw = typeof nusseltChannelElenbaas;

/** A channel’s law in the clothes of a plate’s, for the same check of value and slope. */
function dressed(law: ChannelLaw): Parameters<typeof agreesWith>[0] {
  return (el, _pr, at) => {
    law(el, out);
    at.nu = out.nu;
    at.byLogRa = out.byLogEl;
    at.byPr = 0;
  };
}

describe('Channels', () => {
  it('follow Bar-Cohen and Rohsenow, with both limits', () => {
    agreesWith(dressed(nusseltChannelBarCohenRohsenow), '(576 / ra^2 + 2.873 / ra^(1/2))^(-1/2)', points, [0.7]);
    nusseltChannelBarCohenRohsenow(0.01, out);
    expect(out.nu / (0.01 / 24)).toBeCloseTo(1, 3);
    nusseltChannelBarCohenRohsenow(1e7, out);
    expect(out.nu / (0.59 * 1e7 ** 0.25)).toBeCloseTo(1, 2);
  });

  it('follow Elenbaas', () => {
    agreesWith(dressed(nusseltChannelElenbaas), 'ra / 24 * (1 - exp(-35 / ra))^(3/4)', points, [0.7]);
    nusseltChannelElenbaas(0.01, out);
    expect(out.nu / (0.01 / 24)).toBeCloseTo(1, 10);
  });

  it('lose nothing without a difference', () => {
    for (const law of [nusseltChannelBarCohenRohsenow, nusseltChannelElenbaas]) {
      law(0, out);
      expect(out).toEqual({ nu: 0, byLogEl: 0 });
    }
  });
});

describe('An array of fins', () => {
  const fins = {
    baseWidthM: 0.1,
    baseHeightM: 0.15,
    finHeightM: 0.03,
    finThicknessM: 0.001,
    finCount: 12,
  };

  it.each([
    [40, 20, 200, 0],
    [60, 20, 200, 0],
    [90, 20, 15, 0],
    [120, 40, 1, 30],
    [300, 25, 0.2, 45],
  ])(
    'at %d °C in air of %d °C, of %d W/(m K), leaning by %d°, is h (η A_fins + A_strips) ΔT by hand',
    (hotC, airC, k, tiltDeg) => {
      const { flowsW, filmCoefficientsWPerM2K } = solveNetwork(
        network({
          nodes: [
            { id: 'base', fixedC: hotC },
            { id: 'room', fixedC: airC },
          ],
          links: [{ id: 'fins', kind: 'fin-array', from: 'base', to: 'room', ...fins, conductivityWPerMK: k, tiltDeg }],
        }),
      );
      const air = blankFilmAir();
      filmAir((hotC + airC) / 2 + 273.15, 101325, 9.80665, air);
      const spacing = (0.1 - 12 * 0.001) / 11;
      const el = (air.rayleighFactor * Math.cos((tiltDeg * Math.PI) / 180) * (hotC - airC) * spacing ** 4) / 0.15;
      const h = (exactly('(576 / ra^2 + 2.873 / ra^(1/2))^(-1/2)', el, 0.7) * air.conductivity) / spacing;
      expect((filmCoefficientsWPerM2K.fins ?? NaN) / h).toBeCloseTo(1, 9);
      // Incropera et al., straight fin with an adiabatic tip and the corrected length L + t/2: η = tanh(mL)/(mL).
      const m = Math.sqrt((2 * h) / (k * 0.001));
      const efficiency = exactly('tanh(ra) / ra', m * 0.0305, 0.7);
      const area = efficiency * 2 * 12 * 0.0305 * 0.15 + 11 * spacing * 0.15;
      expect((flowsW.fins ?? NaN) / (h * area * (hotC - airC))).toBeCloseTo(1, 9);
    },
  );
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

  it('has the book’s film coefficient of 4.86 W/(m² K), with which the faces of 15 fins lose 31.5 W', () => {
    // Printed: Nu = 1.307 at S = 7.45 mm, k = 0.02772 W/(m K): h = 4.86. The book counts the faces of the fins only, 2 n L H h ΔT; ours adds their
    // tips and the strips of base between them. 4 %: our spacing is 7.5 mm, and the book’s k is 2.4 % under Sutherland’s law.
    const { filmCoefficientsWPerM2K } = sink(15);
    const h = filmCoefficientsWPerM2K.fins ?? NaN;
    expect(Math.abs(h / 4.863 - 1)).toBeLessThan(0.04);
    expect(Math.abs((2 * 15 * 0.18 * 0.024 * h * 50) / 31.5 - 1)).toBeLessThan(0.04);
  });

  it.each([2, 5, 10, 20, 40])('of %d fins loses h (η A_fins + A_strips) ΔT, by hand', (finCount) => {
    // Efficiency of a straight fin with its tip as half a thickness more of length: any heat-transfer text.
    const { filmCoefficientsWPerM2K, flowsW } = sink(finCount);
    const h = filmCoefficientsWPerM2K.fins ?? NaN;
    const x = Math.sqrt((2 * h) / (200 * 0.001)) * 0.0245;
    const fins = 2 * finCount * 0.0245 * 0.18;
    const strips = (0.12 - finCount * 0.001) * 0.18;
    expect((flowsW.fins ?? NaN) / (h * ((Math.tanh(x) / x) * fins + strips) * 50)).toBeCloseTo(1, 9);
  });

  it('loses less the further its channels lean: g cos of the tilt', () => {
    // In narrow channels Nu = El/24, and El is proportional to g.
    const lean = (tiltDeg: number) =>
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
              baseWidthM: 0.05,
              baseHeightM: 0.18,
              finHeightM: 0.02,
              finThicknessM: 0.0005,
              finCount: 35,
              conductivityWPerMK: 200,
              tiltDeg,
            },
          ],
        }),
      ).filmCoefficientsWPerM2K.fins ?? NaN;
    expect(lean(45) / lean(0)).toBeCloseTo(Math.SQRT1_2, 3);
  });
});
