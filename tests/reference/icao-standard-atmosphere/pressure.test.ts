/** ICAO Doc 7488, Manual of the ICAO Standard Atmosphere, table of pressure against geopotential altitude; values from memory. */
import { describe, expect, it } from 'vitest';
import { pressureIcao } from '../../../server/engine/atmosphere.js';

describe('The standard atmosphere', () => {
  it.each([
    [0, 101325],
    [1000, 89875],
    [3000, 70109],
    [5000, 54020],
  ])('has at %d m the tabulated pressure', (altitude, pressure) => {
    expect(Math.abs(pressureIcao(altitude) / pressure - 1)).toBeLessThan(2e-4);
  });
});
