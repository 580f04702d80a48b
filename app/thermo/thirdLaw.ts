import {
  AVOGADRO_CONSTANT,
  BOLTZMANN_CONSTANT,
  GAS_CONSTANT,
  PLANCK_CONSTANT,
  REFERENCE_TEMPERATURE,
  SPEED_OF_LIGHT,
  STANDARD_PRESSURE,
} from "./constants.ts";

/** State in which an entropy is counted. */
export interface GasState {
  /** K; 298.15 when left out. */
  readonly temperature?: number;
  /** Pa; 100 000 when left out. */
  readonly pressure?: number;
}

/**
 * Translational entropy of an ideal gas in J/(mol K), by the Sackur–Tetrode equation:
 *
 *   S_tr = R [ 5/2 + ln( (2π m k T / h²)^{3/2} · kT / p° ) ]
 *
 * No gas has less; a noble gas has exactly this.
 *
 * @param molarMass in g/mol
 */
export function sackurTetrode(molarMass: number, state: GasState = {}): number {
  const { temperature = REFERENCE_TEMPERATURE, pressure = STANDARD_PRESSURE } = state;
  const mass = molarMass / 1000 / AVOGADRO_CONSTANT;
  const energy = BOLTZMANN_CONSTANT * temperature;
  const statesPerVolume = ((2 * Math.PI * mass * energy) / PLANCK_CONSTANT ** 2) ** 1.5;
  return GAS_CONSTANT * (2.5 + Math.log((statesPerVolume * energy) / pressure));
}

/** A group of electronic states of one energy. */
export interface ElectronicLevel {
  /** Number of states, g = 2J + 1. */
  readonly degeneracy: number;
  /** Above the ground level, in cm⁻¹, the unit of published atomic energy levels. */
  readonly wavenumber: number;
}

/**
 * Electronic entropy of a gas atom in J/(mol K):
 *
 *   S_el = R ( ln q + Σ gᵢ xᵢ e^{−xᵢ} / q ),   xᵢ = Eᵢ/kT,   q = Σ gᵢ e^{−xᵢ}
 *
 * With one level it is R ln g: R ln 2 for hydrogen and the alkali metals, R ln 4 for nitrogen, nothing for zinc.
 *
 * @throws RangeError without a level of positive degeneracy
 */
export function electronicEntropy(levels: readonly ElectronicLevel[], temperature = REFERENCE_TEMPERATURE): number {
  let partition = 0;
  let energy = 0;
  for (const { degeneracy, wavenumber } of levels) {
    const reduced = (PLANCK_CONSTANT * SPEED_OF_LIGHT * 100 * wavenumber) / (BOLTZMANN_CONSTANT * temperature);
    partition += degeneracy * Math.exp(-reduced);
    energy += degeneracy * reduced * Math.exp(-reduced);
  }
  if (!(partition > 0)) throw new RangeError("an atom has at least its ground level");
  return GAS_CONSTANT * (Math.log(partition) + energy / partition);
}
