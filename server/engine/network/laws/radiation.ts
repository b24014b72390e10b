import type { NetworkLink } from '../../../../shared/schemas/network.js';
import { stefanBoltzmann } from '../../constants.js';
import type { FlowOut, LinkLaw } from './law.js';

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
class RadiationLaw implements LinkLaw {
  constructor(readonly radiatingArea: number) {}

  evaluate(from: number, to: number, out: FlowOut): void {
    const factor = stefanBoltzmann * this.radiatingArea;
    const from2 = from * from;
    const to2 = to * to;
    // (T₁² + T₂²)(T₁ + T₂)(T₁ − T₂) keeps its digits where both are near.
    out.flow = factor * (from2 + to2) * (from + to) * (from - to);
    out.byFrom = 4 * factor * from2 * from;
    out.byTo = -4 * factor * to2 * to;
  }

  guess(temperature: number): number {
    return 4 * stefanBoltzmann * this.radiatingArea * temperature ** 3;
  }
}

export function radiationLaw(link: Extract<NetworkLink, { kind: 'radiation' }>): LinkLaw {
  return new RadiationLaw(radiatingArea(link));
}
