import type { Material } from '../../../shared/schemas/material.js';
import type { LoadState } from '../../../shared/schemas/rule-set.js';
import type { Standing } from '../../../shared/schemas/value.js';

export interface Softening {
  /** Temperature that the region must not pass, before any margin [°C]. */
  temperatureC: number;
  reason: string;
  source: string;
  standing: Standing;
}

const isClamped = (load: LoadState) => load === 'screw-clamped' || load === 'structural';

/**
 * The temperature at which a polymer gives way, by morphology and load:
 * amorphous – the lower of glass transition and heat deflection (at 1.8 MPa where clamped or structural, else at 0.45 MPa);
 * semi-crystalline – heat deflection at 1.8 MPa where clamped or structural, else the long-term service value; never T_g;
 * elastomers – the data sheet’s long-term service value only.
 *
 * @returns `null` where the material has no value to check against
 *
 * **Source** common practice of derating polymers; quantities after ISO 75 and ISO 11357.
 */
export function softeningOf(material: Material, load: LoadState): Softening | null {
  const { glassTransitionC, heatDeflection045C, heatDeflection180C, longTermServiceC } = material;
  const take = (entry: typeof glassTransitionC, reason: string): Softening[] =>
    entry ? [{ temperatureC: entry.value, reason, source: entry.source, standing: entry.standing }] : [];
  const clamped = isClamped(load);
  const deflection180 = take(heatDeflection180C, 'heat deflection at 1.8 MPa');
  const deflection045 = take(heatDeflection045C, 'heat deflection at 0.45 MPa');
  const service = take(longTermServiceC, 'long-term service temperature');
  let candidates: Softening[];
  if (material.morphology === 'elastomer') candidates = service;
  else if (material.morphology === 'semi-crystalline') {
    candidates = clamped || service.length === 0 ? deflection180 : service;
    if (candidates.length === 0) candidates = service;
  } else {
    const deflection = clamped || deflection045.length === 0 ? deflection180 : deflection045;
    candidates = [...deflection, ...take(glassTransitionC, 'glass transition')];
    if (candidates.length === 0) candidates = service;
  }
  return candidates.reduce<Softening | null>(
    (lowest, entry) => (lowest === null || entry.temperatureC < lowest.temperatureC ? entry : lowest),
    null,
  );
}
