/** Stefan–Boltzmann constant [W/(m² K⁴)]. CODATA 2018, exact in the revised SI. */
export const stefanBoltzmann = 5.670374419e-8;
/** Standard gravity [m/s²]. ISO 80000-3. */
export const gravity = 9.80665;
/** 0 °C [K]. */
export const zeroCelsius = 273.15;
