/**
 * Constants of the International System of Units as revised in 2019, where h, e, k and N_A are exact by definition
 * (BIPM, The International System of Units, 9th ed., 2019), and those that follow from them.
 */

/** Planck constant h, J s. Exact. */
export const PLANCK_CONSTANT = 6.626_070_15e-34;
/** Speed of light in vacuum c, m/s. Exact. */
export const SPEED_OF_LIGHT = 299_792_458;
/** Boltzmann constant k, J/K. Exact. */
export const BOLTZMANN_CONSTANT = 1.380_649e-23;
/** Avogadro constant N_A, 1/mol. Exact. */
export const AVOGADRO_CONSTANT = 6.022_140_76e23;
/** Elementary charge e, C. Exact. */
export const ELEMENTARY_CHARGE = 1.602_176_634e-19;

/** Molar gas constant R = N_A k = 8.314 462 618 … J/(mol K). Exact. */
export const GAS_CONSTANT = AVOGADRO_CONSTANT * BOLTZMANN_CONSTANT;
/** Faraday constant F = N_A e = 96 485.332 12 … C/mol. Exact. */
export const FARADAY_CONSTANT = AVOGADRO_CONSTANT * ELEMENTARY_CHARGE;

/** Standard pressure p° since 1982, Pa. */
export const STANDARD_PRESSURE = 100_000;
/** The standard pressure of older tables, 1 atm in Pa. */
export const STANDARD_ATMOSPHERE = 101_325;
/** Reference temperature of the table, K. */
export const REFERENCE_TEMPERATURE = 298.15;
