import type { NetworkDocument, NetworkLink } from '../../../shared/schemas/network.js';
import type { GridSurface } from '../../../shared/schemas/network-grid.js';
import { blankFilmAir, filmAir } from '../air.js';
import { gravity, stefanBoltzmann, zeroCelsius } from '../constants.js';
import type { Correlation, Nusselt } from '../convection/correlation.js';
import { coldCorrelation, findCorrelation, type ConvectionShape } from '../convection/registry.js';
import { carriesHeat } from './validate.js';

/** Where a link writes its flow q [W] and the partial derivatives of q [W/K] by the temperatures of its two ends. */
export interface FlowOut {
  flow: number;
  byFrom: number;
  byTo: number;
  /** Film coefficient [W/(m² K)] of a convective link. */
  film: number;
}

/** A link’s flow law: temperatures of both ends [K] in, flow and derivatives out. */
export interface LinkLaw {
  evaluate: (from: number, to: number, out: FlowOut) => void;
  /** A plain conductance [W/K] near the given temperature, for the first guess. */
  guess: (temperature: number) => number;
  /** Set where the law is linear: its conductance [W/K], 0 where it carries no heat. */
  conductance?: number;
  /** Set where the law is σ F (T₁⁴ − T₂⁴): F [m²]. */
  radiatingArea?: number;
  /** Set for links with a film coefficient. */
  convective?: { hot: Correlation; cold: Correlation; lengthM: number };
}

function linear(conductance: number): LinkLaw {
  return {
    conductance,
    evaluate: (from, to, out) => {
      out.flow = conductance * (from - to);
      out.byFrom = conductance;
      out.byTo = -conductance;
    },
    guess: () => conductance,
  };
}

/** q = k(T̄) A ΔT/L with k linear between the points of its table and flat outside, at the mean of both temperatures. */
function tabulated(points: readonly (readonly [number, number])[], areaOverLength: number): LinkLaw {
  const kelvin = points.map(([celsius]) => celsius + zeroCelsius);
  const values = points.map(([, value]) => value);
  const last = kelvin.length - 1;
  const at = { value: 0, slope: 0 };
  const lookUp = (temperature: number) => {
    at.slope = 0;
    if (temperature <= (kelvin[0] as number)) at.value = values[0] as number;
    else if (temperature >= (kelvin[last] as number)) at.value = values[last] as number;
    else {
      let i = 1;
      while ((kelvin[i] as number) < temperature) i++;
      const t0 = kelvin[i - 1] as number;
      const v0 = values[i - 1] as number;
      at.slope = ((values[i] as number) - v0) / ((kelvin[i] as number) - t0);
      at.value = v0 + at.slope * (temperature - t0);
    }
  };
  return {
    evaluate: (from, to, out) => {
      lookUp((from + to) / 2);
      const difference = from - to;
      const bend = (at.slope / 2) * areaOverLength * difference;
      out.flow = at.value * areaOverLength * difference;
      out.byFrom = at.value * areaOverLength + bend;
      out.byTo = -at.value * areaOverLength + bend;
    },
    guess: (temperature) => {
      lookUp(temperature);
      return at.value * areaOverLength;
    },
  };
}

/** Natural convection: q = h A ΔT, h = Nu(Ra, Pr) k/L, all properties at the film temperature. */
function natural(link: Extract<NetworkLink, { kind: 'convection' }>, pressurePa: number): LinkLaw {
  const hot = findCorrelation(link.shape, link.correlation);
  if (!hot) throw new RangeError(`No correlation for ${link.shape}`);
  const cold = coldCorrelation(link.shape, hot);
  const { areaM2, lengthM, scale } = link;
  const cubed = lengthM ** 3;
  const air = blankFilmAir();
  const nusselt: Nusselt = { nu: 0, byLogRa: 0, byPr: 0 };
  return {
    convective: { hot, cold, lengthM },
    evaluate: (from, to, out) => {
      const difference = from - to;
      filmAir((from + to) / 2, pressurePa, gravity, air);
      const ra = air.rayleighFactor * Math.abs(difference) * cubed;
      (difference >= 0 ? hot : cold).evaluate(ra, air.prandtl, nusselt);
      const film = (scale * nusselt.nu * air.conductivity) / lengthM;
      const perNu = (scale * air.conductivity) / lengthM;
      // dh/dT of the film temperature, half of which belongs to each end; and ΔT dh/dΔT = perNu · dNu/d ln Ra.
      const byFilm =
        perNu * (nusselt.byLogRa * air.rayleighSlope + nusselt.byPr * air.prandtlSlope) + film * air.conductivitySlope;
      const bend = (byFilm / 2) * areaM2 * difference;
      const main = areaM2 * (film + perNu * nusselt.byLogRa);
      out.flow = film * areaM2 * difference;
      out.byFrom = main + bend;
      out.byTo = -main + bend;
      out.film = film;
    },
    guess: () => 5 * scale * areaM2,
  };
}

/** Area × effective emissivity of a radiation link [m²]: towards large surroundings, or between two grey surfaces. */
function radiatingArea(link: Extract<NetworkLink, { kind: 'radiation' }>): number {
  if (link.emissivityTo === undefined) return link.areaM2 * link.emissivity * (link.viewFactor ?? 1);
  const a1 = link.areaM2;
  const a2 = link.areaToM2 ?? link.areaM2;
  const resistance =
    (1 - link.emissivity) / (link.emissivity * a1) +
    1 / (a1 * (link.viewFactor ?? 1)) +
    (1 - link.emissivityTo) / (link.emissivityTo * a2);
  return 1 / resistance;
}

/** q = σ A ε (T₁⁴ − T₂⁴). */
function radiative(link: Extract<NetworkLink, { kind: 'radiation' }>): LinkLaw {
  const area = radiatingArea(link);
  const factor = stefanBoltzmann * area;
  return {
    radiatingArea: area,
    evaluate: (from, to, out) => {
      const from2 = from * from;
      const to2 = to * to;
      // (T₁² + T₂²)(T₁ + T₂)(T₁ − T₂) keeps its digits where both are near.
      out.flow = factor * (from2 + to2) * (from + to) * (from - to);
      out.byFrom = 4 * factor * from2 * from;
      out.byTo = -4 * factor * to2 * to;
    },
    guess: (temperature) => 4 * factor * temperature ** 3,
  };
}

/** The law of one square metre of a gridded surface. */
export function surfaceLaw(
  surface: Extract<GridSurface, { kind: 'convection' }>,
  document: Pick<NetworkDocument, 'pressurePa'>,
): LinkLaw {
  return natural({ ...surface, shape: surface.shape as ConvectionShape, from: '', areaM2: 1 }, document.pressurePa);
}

/** The flow law of one link. A link that cannot carry heat has none: zero. */
export function linkLaw(link: NetworkLink, document: Pick<NetworkDocument, 'pressurePa'>): LinkLaw {
  if (!carriesHeat(link)) return linear(0);
  switch (link.kind) {
    case 'resistance':
      return linear(1 / link.resistanceKPerW);
    case 'film':
      return linear(link.coefficientWPerM2K * link.areaM2);
    case 'conduction': {
      const areaOverLength = link.areaM2 / link.lengthM;
      return typeof link.conductivityWPerMK === 'number'
        ? linear(link.conductivityWPerMK * areaOverLength)
        : tabulated(link.conductivityWPerMK, areaOverLength);
    }
    case 'convection':
      return natural(link, document.pressurePa);
    case 'radiation':
      return radiative(link);
  }
}
