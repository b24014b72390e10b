/** A film coefficient made of a forced and a natural one, with its slopes by both. */
export interface MixedFilm {
  film: number;
  byForced: number;
  byNatural: number;
}

/**
 * Forced and natural convection together, helping each other or crossing: h³ = h_F³ + h_N³.
 *
 * **Source** S. W. Churchill’s cube rule, as given in textbooks; recalled, to be verified.
 * **Checked against** a hand calculation, tests/engine/convection.
 */
export function mixedAssisting(forced: number, natural: number, out: MixedFilm): void {
  const cubes = forced ** 3 + natural ** 3;
  const film = Math.cbrt(cubes);
  out.film = film;
  out.byForced = film > 0 ? (forced / film) ** 2 : 1;
  out.byNatural = film > 0 ? (natural / film) ** 2 : 0;
}

/** Share of the greater below which opposing flows do not fall, and the sharpness of the two blends. */
const floor = 0.7;
const greaterPower = 20;
const floorPower = 16;

/** x^n for whole n. */
function power(x: number, n: number): number {
  let result = 1;
  for (let square = x, rest = n; rest > 0; rest >>= 1, square *= square) if (rest & 1) result *= square;
  return result;
}

/**
 * Forced and natural convection against each other: |h_F³ − h_N³|^⅓, but not below 0.7 of the greater (our floor: below about 0.66 the heat flow
 * would fall as the difference rises). Both the greater and the floor are blended by powers, (a^n + b^n)^(1/n), so that the slope is continuous; the
 * blends add at most 5 % where the floor is met.
 *
 * **Source** S. W. Churchill’s cube rule; the floor is ours.
 * **Checked against** rising flow on random points, tests/engine/convection.
 */
export function mixedOpposing(forced: number, natural: number, out: MixedFilm): void {
  if (!(forced > 0)) {
    out.film = natural;
    out.byForced = 0;
    out.byNatural = 1;
    return;
  }
  if (natural > forced) {
    opposing(natural, forced, out);
    const swap = out.byForced;
    out.byForced = out.byNatural;
    out.byNatural = swap;
    return;
  }
  opposing(forced, natural, out);
}

/** The same with a ≥ b; slopes by a in `byForced`, by b in `byNatural`. */
function opposing(a: number, b: number, out: MixedFilm): void {
  const s = b / a;
  const difference = Math.cbrt(Math.max(1 - s * s * s, 0));
  const sum = 1 + power(s, greaterPower);
  const greater = sum ** (1 / greaterPower);
  const least = floor * greater;
  const leastSlope = (least * power(s, greaterPower - 1)) / sum;
  // G = (difference^p + least^p)^(1/p) = least (1 + r^p)^(1/p).
  const r = difference / least;
  const rp = power(r, floorPower);
  const g = least * (1 + rp) ** (1 / floorPower);
  const share = rp / (1 + rp);
  // d ln G = share d ln difference + (1 − share) d ln least; share/difference³ stays finite as difference → 0.
  const byDifference = r > 1e-3 ? (share * -(s * s)) / (difference * difference * difference) : 0;
  const slope = g * (byDifference + ((1 - share) * leastSlope) / least);
  out.film = a * g;
  out.byForced = g - s * slope;
  out.byNatural = slope;
}
