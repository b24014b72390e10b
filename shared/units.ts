import { create, unitDependencies } from 'mathjs';
import type { UnitConverter } from './quantities.js';

/**
 * The one place for conversions between units, built on mathjs. Load it on demand (`import('…/units.js')`): it is too
 * large for a page’s first load. Converts points only: a temperature *difference* stays in K.
 */
const math = create(unitDependencies ?? {}, {});

/** Converts a value between two units in plain signs (`degC`, `W/m^2`). */
export const convertUnit: UnitConverter = (value, from, to) => {
  try {
    math.unit(1, from);
  } catch {
    return 'unknown-unit';
  }
  try {
    return math.unit(value, from).toNumber(to);
  } catch {
    return 'does-not-fit';
  }
};
