/**
 * Pressure of the ICAO standard atmosphere below 11 km.
 *
 * p = 101325 (1 − 2.25577·10⁻⁵ h)^5.25588
 *
 * @param altitude geopotential height h [m]
 * @returns [Pa]
 *
 * **Valid for** −1 000 … 11 000 m.
 * **Source** ICAO Doc 7488, Manual of the ICAO Standard Atmosphere; constants of the troposphere (lapse 6.5 K/km).
 * **Checked against** the standard’s table at 1 000, 3 000 and 5 000 m, tests/reference/icao-standard-atmosphere.
 */
export function pressureIcao(altitude: number): number {
  return 101325 * (1 - 2.25577e-5 * altitude) ** 5.25588;
}
