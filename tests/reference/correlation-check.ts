import { all, create, type BigNumber, type MathJsInstance } from 'mathjs';
import { expect } from 'vitest';
import type { Nusselt } from '../../server/engine/convection/correlation.js';

if (!all) throw new Error('mathjs has no functions');
const math: MathJsInstance = create(all, { number: 'BigNumber', precision: 50 });

type Law = (ra: number, pr: number, out: Nusselt) => void;

/** Nu by the law as we compute it. */
export function nusselt(law: Law, ra: number, pr: number): Nusselt {
  const out = { nu: 0, byLogRa: 0, byPr: 0 };
  law(ra, pr, out);
  return out;
}

/** A formula in `ra` and `pr`, evaluated with fifty digits. */
export function exactly(formula: string, ra: number, pr: number): number {
  const value = math.evaluate(formula, { ra: math.bignumber(ra), pr: math.bignumber(pr) }) as BigNumber;
  return value.toNumber();
}

/** The law agrees with its formula to rounding, and its slopes with central differences, at each Ra. */
export function agreesWith(
  law: Law,
  formula: string,
  ras: readonly number[],
  prs: readonly number[] = [0.69, 0.72, 7],
): void {
  for (const pr of prs) {
    for (const ra of ras) {
      const here = nusselt(law, ra, pr);
      expect(here.nu / exactly(formula, ra, pr)).toBeCloseTo(1, 11);
      const d = 1e-5;
      const byLogRa = (nusselt(law, ra * Math.exp(d), pr).nu - nusselt(law, ra * Math.exp(-d), pr).nu) / (2 * d);
      const byPr = (nusselt(law, ra, pr * (1 + d)).nu - nusselt(law, ra, pr * (1 - d)).nu) / (2 * d * pr);
      expect(Math.abs(byLogRa - here.byLogRa)).toBeLessThan(1e-7 * Math.max(here.nu, 1));
      expect(Math.abs(byPr - here.byPr)).toBeLessThan(1e-6 * Math.max(here.nu, 1));
    }
  }
}
