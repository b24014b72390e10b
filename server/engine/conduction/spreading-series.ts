import { complementaryError, errorIntegral } from './error-function.js';

/**
 * Spreading of heat from rectangular sources in a rectangular plate that is cooled on its far side: the exact series. SI units.
 * Lengths from the plate’s corner where x = y = 0.
 */

export interface CooledPlate {
  /** Sides of the plate a and b [m]. */
  lengthX: number;
  lengthY: number;
  /** Thickness t [m]. */
  thickness: number;
  /** Conductivity k, the same in all directions [W/(m K)]. */
  conductivity: number;
  /** Film coefficient h on the far side [W/(m² K)]; the near side and the edges are adiabatic beside the sources. */
  filmCoefficient: number;
}

/** A rectangle on the near side. */
export interface Rectangle {
  /** Its middle [m]. */
  x: number;
  y: number;
  /** Its sides c and d [m]. */
  lengthX: number;
  lengthY: number;
}

/** How the sum is cut, for checks: the answer does not depend on it. */
export interface SeriesOptions {
  /** Width S of the near field that is summed in closed form, as a share of the source’s shorter side. */
  nearShare?: number;
}

/** Where the excess is taken along one side: at a point, or as the mean over a stretch. */
interface Place {
  middle: number;
  /** 0 for a point [m]. */
  stretch: number;
}

/** Where erfc(ζ S) and e^(−2 ζ t) have fallen below 10⁻⁸. */
const farthest = { near: 4.05, thickness: 9.2 };

/** Nodes and weights on [0, 1] of the Gauss–Legendre rule that the near field is integrated with (Newton on P₂₄). */
const rule = gaussLegendre(24);

function gaussLegendre(n: number): { at: number; weight: number }[] {
  return Array.from({ length: n }, (_, i) => {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let step = 0; step < 20; step++) {
      let before = 1;
      let now = x;
      for (let j = 2; j <= n; j++) [before, now] = [now, ((2 * j - 1) * x * now - (j - 1) * before) / j];
      slope = (n * (x * now - before)) / (x * x - 1);
      x -= now / slope;
    }
    return { at: (1 + x) / 2, weight: 1 / ((1 - x * x) * slope * slope) };
  });
}

/** Factors of the cosines of one side: of the source’s mean flux, times the value (or mean) of the cosine at the place. */
function cosines(side: number, source: Place, place: Place, count: number): Float64Array {
  const out = new Float64Array(count + 1);
  out[0] = 1;
  const mean = ({ middle, stretch }: Place, wave: number) => {
    const half = (wave * stretch) / 2;
    return Math.cos(wave * middle) * (half > 0 ? Math.sin(half) / half : 1);
  };
  for (let m = 1; m <= count; m++) {
    const wave = (m * Math.PI) / side;
    out[m] = 2 * mean(source, wave) * mean(place, wave);
  }
  return out;
}

/**
 * Share of a source’s flux that, spread by a Gaussian of width s along one side, is found at the place; the edges of the plate
 * mirror it.
 */
function spreadShare(side: number, source: Place, place: Place, s: number): number {
  const width = 2 * s;
  let share = 0;
  for (const mirrored of [source.middle, -source.middle, 2 * side - source.middle]) {
    const low = (mirrored - source.stretch / 2 - place.middle) / width;
    const high = (mirrored + source.stretch / 2 - place.middle) / width;
    if (place.stretch === 0) {
      share += (complementaryError(low) - complementaryError(high)) / 2;
      continue;
    }
    const half = place.stretch / 2 / width;
    const overlap =
      errorIntegral(high + half) - errorIntegral(high - half) - errorIntegral(low + half) + errorIntegral(low - half);
    share += overlap / (4 * half);
  }
  return share;
}

/**
 * Excess over the coolant that 1 W in a rectangle makes on the near side of the plate.
 *
 * With λ_m = mπ/a, δ_n = nπ/b, ζ = √(λ_m² + δ_n²) the cosine series of the flux gives
 * θ = (t/k + 1/h)/(a b) + Σ' c_m c_n/(a b k ζ φ(ζ)), φ = (ζ sinh ζt + (h/k) cosh ζt)/(ζ cosh ζt + (h/k) sinh ζt).
 * As it stands it converges slowly, for φ → 1 leaves c_m c_n/ζ. So 1/ζ is split into erfc(ζS)/ζ, which ends soon, and
 * erf(ζS)/ζ = (2/√π) ∫₀^S e^(−ζ²s²) ds, whose sum is a source spread by a Gaussian: error functions. This changes the sum’s speed only.
 */
function excessPerWatt(plate: CooledPlate, source: Rectangle, place: [Place, Place], options: SeriesOptions): number {
  const { lengthX: a, lengthY: b, thickness, conductivity: k } = plate;
  const onX = { middle: source.x, stretch: source.lengthX };
  const onY = { middle: source.y, stretch: source.lengthY };
  const nearWidth = (options.nearShare ?? 1 / 12) * Math.min(source.lengthX, source.lengthY);
  const film = plate.filmCoefficient / k;
  const end = Math.max(farthest.near / nearWidth, farthest.thickness / thickness);
  const countX = Math.floor((end * a) / Math.PI);
  const countY = Math.floor((end * b) / Math.PI);
  const alongX = cosines(a, onX, place[0], countX);
  const alongY = cosines(b, onY, place[1], countY);

  let far = 0;
  for (let m = 0; m <= countX; m++) {
    const lambda = (m * Math.PI) / a;
    const last = Math.floor((Math.sqrt(Math.max(0, end * end - lambda * lambda)) * b) / Math.PI);
    let row = 0;
    for (let n = m === 0 ? 1 : 0; n <= last; n++) {
      const delta = (n * Math.PI) / b;
      const zeta = Math.sqrt(lambda * lambda + delta * delta);
      const tanh = Math.tanh(zeta * thickness);
      // 1/φ − 1, written so that it does not cancel where φ is near 1.
      const beyondThick = ((zeta - film) * (1 - tanh)) / (zeta * tanh + film);
      const near = zeta * nearWidth < farthest.near ? complementaryError(zeta * nearWidth) : 0;
      row += ((alongY[n] as number) * (beyondThick + near)) / zeta;
    }
    far += (alongX[m] as number) * row;
  }

  let near = 0;
  for (const { at, weight } of rule) {
    const s = at * nearWidth;
    near += weight * spreadShare(a, onX, place[0], s) * spreadShare(b, onY, place[1], s);
  }
  near *= (2 / Math.sqrt(Math.PI)) * nearWidth;
  // erf(ζS)/ζ does not vanish at ζ = 0, where the series has its one-dimensional term.
  const uniform = thickness + 1 / film - (2 / Math.sqrt(Math.PI)) * nearWidth;
  return (uniform + far) / (a * b * k) + near / (source.lengthX * source.lengthY * k);
}

/**
 * Excess over the coolant at a point of the near side, per watt of one source [K/W]; that of several sources is the sum, each
 * times its heat.
 *
 * @param plate the plate; @param source a rectangle within it; @param x, y the point [m]
 * @param options how the sum is cut; the answer does not depend on it
 *
 * **Valid for** any rectangle within the plate, also at its edge and in its corner, h > 0. What is computed grows as
 * (side/shortest length)²; a thousandth of the side is some tenths of a second.
 * **Source** Y. S. Muzychka, J. R. Culham, M. M. Yovanovich, “Thermal spreading resistance of eccentric heat sources on rectangular
 * flux channels”, J. Electronic Packaging 125 (2003) 178–185; recalled, to be verified. Split of the sum after P. P. Ewald (1921).
 * **Checked against** 0.5611/(k √A) on a thick body, the same series summed as it stands, and a finite-volume model,
 * tests/reference/muzychka-culham-yovanovich-2003 and tests/reference/independent-solver.
 */
export function excessAtPoint(
  plate: CooledPlate,
  source: Rectangle,
  x: number,
  y: number,
  options: SeriesOptions = {},
): number {
  const place: [Place, Place] = [
    { middle: x, stretch: 0 },
    { middle: y, stretch: 0 },
  ];
  return excessPerWatt(plate, source, place, options);
}

/**
 * Mean excess over the coolant on a rectangle of the near side, per watt of one source [K/W].
 *
 * **Valid for**, **Source** as `excessAtPoint`.
 * **Checked against** 0.4732/(k √A) on a thick body and the reciprocity of two rectangles, the same tests.
 */
export function excessOnRectangle(
  plate: CooledPlate,
  source: Rectangle,
  rectangle: Rectangle,
  options: SeriesOptions = {},
): number {
  const place: [Place, Place] = [
    { middle: rectangle.x, stretch: rectangle.lengthX },
    { middle: rectangle.y, stretch: rectangle.lengthY },
  ];
  return excessPerWatt(plate, source, place, options);
}

export interface SpreadingSeriesAnswer {
  /** From the middle of the source to the mean of the near side [K/W]: the peak, where the source is in the plate’s middle. */
  centre: number;
  /** From the mean of the source to the mean of the near side [K/W]. */
  mean: number;
  /** From the mean of the near side to the coolant, (t/k + 1/h)/(a b) [K/W]. */
  oneDimensional: number;
}

/**
 * Spreading resistance of one rectangular source, centred or eccentric.
 *
 * @returns resistances [K/W] beyond the one-dimensional one, and that one
 *
 * **Valid for**, **Source**, **Checked against** as `excessAtPoint`; a source as large as the plate spreads nothing.
 */
export function spreadingMuzychkaCulhamYovanovich(plate: CooledPlate, source: Rectangle): SpreadingSeriesAnswer {
  const oneDimensional =
    (plate.thickness / plate.conductivity + 1 / plate.filmCoefficient) / (plate.lengthX * plate.lengthY);
  return {
    centre: excessAtPoint(plate, source, source.x, source.y) - oneDimensional,
    mean: excessOnRectangle(plate, source, source) - oneDimensional,
    oneDimensional,
  };
}

/**
 * Excess over the coolant of several sources on one plate, by superposition.
 *
 * @param heats heat of each source [W]
 * @returns for each source its `mean` and its `centre` excess [K]
 *
 * **Valid for**, **Source**, **Checked against** as `excessAtPoint`.
 */
export function excessOfSources(
  plate: CooledPlate,
  sources: readonly Rectangle[],
  heats: readonly number[],
): { mean: number; centre: number }[] {
  if (sources.length !== heats.length) throw new RangeError('As many heats as sources');
  return sources.map((here) => {
    const sum = { mean: 0, centre: 0 };
    sources.forEach((source, i) => {
      const heat = heats[i] as number;
      sum.mean += heat * excessOnRectangle(plate, source, here);
      sum.centre += heat * excessAtPoint(plate, source, here.x, here.y);
    });
    return sum;
  });
}
