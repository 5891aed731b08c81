/** Physical constants, SI, each with the edition it was taken from. */

/** Electric constant, F/m. CODATA 2018 recommended value. */
export const epsilon0 = 8.8541878128e-12;

/** Magnetic constant, H/m. CODATA 2018 recommended value. */
export const mu0 = 1.25663706212e-6;

/** Speed of light in vacuum, m/s. Exact, SI 2019. */
export const speedOfLight = 299_792_458;

/** Boltzmann constant, J/K. Exact, SI 2019. */
export const boltzmann = 1.380649e-23;

/** Resistivity of annealed copper at 20 °C, Ω m. IEC 60028 (1925, International Annealed Copper Standard). */
export const copperResistivity = 1.724e-8;
