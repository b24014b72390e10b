import type { convectionFlows } from '../../../shared/schemas/network.js';
import { airConductivity, airViscosity, blankFilmAir, filmAir } from '../air.js';
import { gravity } from '../constants.js';
import { powerSum, type Correlation, type Nusselt } from './correlation.js';
import { forcedCorrelations, type ForcedCorrelation, type ForcedNusselt } from './forced.js';
import { mixedAssisting, mixedOpposing, type MixedFilm } from './mixed.js';
import { coldCorrelation, findCorrelation, type ConvectionShape } from './registry.js';

/**
 * A film coefficient between a surface and its air, with slopes that stay finite where both are equally warm.
 *
 * h depends on the difference d = |T_s − T_a| (natural convection: like d^¼) and smoothly on both temperatures:
 * dh = byLogDifference d ln d + bySurface dT_s + byAir dT_a. SI units.
 */
export interface FilmOut {
  film: number;
  byLogDifference: number;
  bySurface: number;
  byAir: number;
}

export interface FilmLaw {
  evaluate: (surface: number, air: number, out: FilmOut) => void;
  /** What leaves a published range at these temperatures, in words. */
  outside: (surface: number, air: number) => string[];
}

export function blankFilm(): FilmOut {
  return { film: 0, byLogDifference: 0, bySurface: 0, byAir: 0 };
}

/** Below this difference being outside a range changes nothing [K]. */
const negligible = 0.05;

/** “Ra = 3.2e+4 lies outside …”, or nothing. */
export function outsideText(symbol: string, value: number, range: readonly [number, number], of: string): string[] {
  if (value >= range[0] && value <= range[1]) return [];
  const published = `${range[0].toExponential(0)} … ${range[1].toExponential(0)}`;
  return [`${symbol} = ${value.toExponential(1)} lies outside the published range ${published} of ${of}`];
}

/** Room for the properties and the Nusselt number of the law that is being evaluated: used up before any other is. */
const air = blankFilmAir();
const nusselt: Nusselt = { nu: 0, byLogRa: 0, byPr: 0 };

/** Natural convection by one law for the warmer and one for the colder surface: h = Nu(Ra, Pr) k/L at film temperature. */
class NaturalFilm implements FilmLaw {
  private readonly cubed: number;

  /** @param strength gravity along the surface [m/s²]; @param ratio length ÷ diameter, where the shape has one */
  constructor(
    private readonly hot: Correlation,
    private readonly cold: Correlation,
    private readonly length: number,
    private readonly pressure: number,
    private readonly strength: number,
    private readonly ratio: number | undefined,
  ) {
    this.cubed = length ** 3;
  }

  evaluate(surface: number, ambient: number, out: FilmOut): void {
    const difference = surface - ambient;
    filmAir((surface + ambient) / 2, this.pressure, this.strength, air);
    const ra = air.rayleighFactor * Math.abs(difference) * this.cubed;
    (difference >= 0 ? this.hot : this.cold).evaluate(ra, air.prandtl, nusselt, this.ratio);
    const perNu = air.conductivity / this.length;
    out.film = nusselt.nu * perNu;
    out.byLogDifference = perNu * nusselt.byLogRa;
    const byFilm =
      perNu * (nusselt.byLogRa * air.rayleighSlope + nusselt.byPr * air.prandtlSlope) +
      out.film * air.conductivitySlope;
    out.bySurface = byFilm / 2;
    out.byAir = byFilm / 2;
  }

  outside(surface: number, ambient: number): string[] {
    const law = surface >= ambient ? this.hot : this.cold;
    if (!law.range.ra || Math.abs(surface - ambient) < negligible) return [];
    filmAir((surface + ambient) / 2, this.pressure, this.strength, air);
    const ra = air.rayleighFactor * Math.abs(surface - ambient) * this.cubed;
    return outsideText('Ra', ra, law.range.ra, `${law.id} (${law.shape})`);
  }
}

/** (h_a^n + h_b^n)^(1/n) of two laws. */
function greaterOf(a: FilmLaw, b: FilmLaw, n: number): FilmLaw {
  const fromA = blankFilm();
  const fromB = blankFilm();
  const sum = { value: 0, byA: 0, byB: 0 };
  return {
    evaluate: (surface, air, out) => {
      a.evaluate(surface, air, fromA);
      b.evaluate(surface, air, fromB);
      powerSum(fromA.film, fromB.film, n, sum);
      out.film = sum.value;
      out.byLogDifference = sum.byA * fromA.byLogDifference + sum.byB * fromB.byLogDifference;
      out.bySurface = sum.byA * fromA.bySurface + sum.byB * fromB.bySurface;
      out.byAir = sum.byA * fromA.byAir + sum.byB * fromB.byAir;
    },
    outside: (surface, air) => [...a.outside(surface, air), ...b.outside(surface, air)],
  };
}

/** Forced convection at film temperature: h = Nu(Re, Pr) k/L, Re = U L/ν. */
function forced(correlation: ForcedCorrelation, speed: number, length: number, pressure: number): FilmLaw {
  const air = blankFilmAir();
  const nusselt: ForcedNusselt = { nu: 0, byLogRe: 0, byPr: 0 };
  return {
    evaluate: (surface, ambient, out) => {
      filmAir((surface + ambient) / 2, pressure, gravity, air);
      correlation.evaluate((speed * length) / air.kinematicViscosity, air.prandtl, nusselt);
      const perNu = air.conductivity / length;
      out.film = nusselt.nu * perNu;
      out.byLogDifference = 0;
      const byFilm =
        perNu * (-nusselt.byLogRe * air.viscositySlope + nusselt.byPr * air.prandtlSlope) +
        out.film * air.conductivitySlope;
      out.bySurface = byFilm / 2;
      out.byAir = byFilm / 2;
    },
    outside: (surface, ambient) => {
      filmAir((surface + ambient) / 2, pressure, gravity, air);
      const re = (speed * length) / air.kinematicViscosity;
      return outsideText('Re', re, correlation.range.re, `${correlation.id} (${correlation.shape})`);
    },
  };
}

/** Forced convection past a sphere (Whitaker): properties of the free stream, and μ of the surface. */
function forcedSphere(speed: number, diameter: number, pressure: number): FilmLaw {
  const correlation = forcedCorrelations['sphere-in-flow'];
  const air = blankFilmAir();
  const nusselt: ForcedNusselt = { nu: 0, byLogRe: 0, byPr: 0 };
  /** d ln μ/dT [1/K]. */
  const viscositySlope = (t: number) => 1.5 / t - 1 / (t + 110.4);
  return {
    evaluate: (surface, ambient, out) => {
      filmAir(ambient, pressure, gravity, air);
      correlation.evaluate((speed * diameter) / air.kinematicViscosity, air.prandtl, nusselt);
      const correction = (airViscosity(ambient) / airViscosity(surface)) ** 0.25;
      const perNu = airConductivity(ambient) / diameter;
      const moved = nusselt.nu * correction;
      out.film = (2 + moved) * perNu;
      out.byLogDifference = 0;
      out.bySurface = (-perNu * moved * viscositySlope(surface)) / 4;
      out.byAir =
        perNu *
          (correction * (-nusselt.byLogRe * air.viscositySlope + nusselt.byPr * air.prandtlSlope) +
            (moved * viscositySlope(ambient)) / 4) +
        out.film * air.conductivitySlope;
    },
    outside: (_surface, ambient) => {
      filmAir(ambient, pressure, gravity, air);
      return outsideText('Re', (speed * diameter) / air.kinematicViscosity, correlation.range.re, correlation.id);
    },
  };
}

/** A forced and a natural law together. */
function together(f: FilmLaw, n: FilmLaw, flow: (typeof convectionFlows)[number]): FilmLaw {
  const fromF = blankFilm();
  const fromN = blankFilm();
  const mixed: MixedFilm = { film: 0, byForced: 0, byNatural: 0 };
  const rule = flow === 'opposing' ? mixedOpposing : mixedAssisting;
  return {
    evaluate: (surface, air, out) => {
      f.evaluate(surface, air, fromF);
      n.evaluate(surface, air, fromN);
      rule(fromF.film, fromN.film, mixed);
      out.film = mixed.film;
      out.byLogDifference = mixed.byForced * fromF.byLogDifference + mixed.byNatural * fromN.byLogDifference;
      out.bySurface = mixed.byForced * fromF.bySurface + mixed.byNatural * fromN.bySurface;
      out.byAir = mixed.byForced * fromF.byAir + mixed.byNatural * fromN.byAir;
    },
    outside: (surface, air) => {
      f.evaluate(surface, air, fromF);
      n.evaluate(surface, air, fromN);
      // A law that hardly counts need not be within its range.
      const counts = (own: number, other: number) => own > 0.2 * other;
      return [
        ...(counts(fromF.film, fromN.film) ? f.outside(surface, air) : []),
        ...(counts(fromN.film, fromF.film) ? n.outside(surface, air) : []),
      ];
    },
  };
}

/** A surface in air, as a convection link describes it. */
export interface ConvectiveSurface {
  shape: ConvectionShape;
  lengthM: number;
  /** Width across the slope, for an inclined plate; without it as wide as long. */
  widthM?: number | undefined;
  tiltDeg?: number | undefined;
  diameterM?: number | undefined;
  airSpeedMPerS?: number | undefined;
  flowLengthM?: number | undefined;
  flow?: (typeof convectionFlows)[number] | undefined;
  correlation?: string | undefined;
}

function naturalLaw(surface: ConvectiveSurface, pressure: number): FilmLaw {
  const { shape, lengthM } = surface;
  if (shape === 'inclined-plate') return inclined(surface, pressure);
  const hot = findCorrelation(shape, surface.correlation);
  if (!hot) throw new RangeError(`No correlation for ${shape}`);
  const ratio = surface.diameterM === undefined ? undefined : lengthM / surface.diameterM;
  return new NaturalFilm(hot, coldCorrelation(shape, hot), lengthM, pressure, gravity, ratio);
}

/** Sharpness of the blend of an inclined plate’s two laws. */
const inclinedPower = 10;

/**
 * An inclined plate: the smooth greatest (h_v¹⁰ + h_h¹⁰)^(1/10) of the vertical law with g cos θ and the horizontal law with g sin θ,
 * θ = |90° − tilt| from the vertical; the horizontal law on area/perimeter.
 *
 * **Source** after Raithby & Hollands, Handbook of Heat Transfer, ch. 4 (the greatest of the laws); the blend is ours.
 */
function inclined({ tiltDeg = 90, lengthM, widthM = lengthM }: ConvectiveSurface, pressure: number): FilmLaw {
  const theta = (Math.abs(90 - tiltDeg) * Math.PI) / 180;
  const vertical = findCorrelation('vertical-plate', undefined) as Correlation;
  const shape = tiltDeg < 90 ? ('plate-facing-up' as const) : ('plate-facing-down' as const);
  const level = findCorrelation(shape, undefined) as Correlation;
  const alongWall = new NaturalFilm(vertical, vertical, lengthM, pressure, gravity * Math.cos(theta), undefined);
  if (theta < 1e-9) return alongWall;
  const across = new NaturalFilm(
    level,
    coldCorrelation(shape, level),
    (lengthM * widthM) / (2 * (lengthM + widthM)),
    pressure,
    gravity * Math.sin(theta),
    undefined,
  );
  if (Math.cos(theta) < 1e-9) return across;
  return greaterOf(alongWall, across, inclinedPower);
}

function forcedLaw(surface: ConvectiveSurface, speed: number, pressure: number): FilmLaw {
  switch (surface.shape) {
    case 'horizontal-cylinder':
      return forced(forcedCorrelations['cylinder-in-cross-flow'], speed, surface.lengthM, pressure);
    case 'vertical-cylinder':
      return forced(
        forcedCorrelations['cylinder-in-cross-flow'],
        speed,
        surface.diameterM ?? surface.lengthM,
        pressure,
      );
    case 'sphere':
      return forcedSphere(speed, surface.lengthM, pressure);
    default:
      return forced(forcedCorrelations['flat-plate'], speed, surface.flowLengthM ?? surface.lengthM, pressure);
  }
}

/** The film law of a surface: natural, or with moving air both together. */
export function filmLaw(surface: ConvectiveSurface, pressure: number): FilmLaw {
  const natural = naturalLaw(surface, pressure);
  const speed = surface.airSpeedMPerS ?? 0;
  if (speed <= 0) return natural;
  return together(forcedLaw(surface, speed, pressure), natural, surface.flow ?? 'transverse');
}
