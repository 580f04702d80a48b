/** Every tolerance of the examination, in one place. An examination records the version it was made with. */
export interface Policy {
  readonly version: number;
  /** c of the Gibbs closure, in kJ/mol: c·√(N + 1) for N atoms allows for intermediate rounding. */
  readonly closureAllowance: number;
  /** E_n above which two values of one quantity disagree (ISO 13528). */
  readonly normalizedErrorLimit: number;
  /** A change is large, where no uncertainty can judge it, above this many kJ/mol … */
  readonly largeEnergyChange: number;
  /** … or J/(mol K) … */
  readonly largeEntropyChange: number;
  /** … and above this share of the standing value. */
  readonly largeRelativeChange: number;
  /** A new uncertainty is called wider above this multiple of the standing one. */
  readonly widerUncertainty: number;
  /** Relative distance within which a value counts as the standing one times a factor (1000, 4.184). */
  readonly factorAgreement: number;
  /** Below this S° or Cp° of a pure substance is in another unit, J/(mol K); diamond, the lowest of all, has 2.4. */
  readonly leastEntropy: number;
  /** Above `mostEntropy` + `mostEntropyPerAtom` for each atom S° or Cp° is in another unit, J/(mol K). */
  readonly mostEntropy: number;
  readonly mostEntropyPerAtom: number;
  /** Above this for each atom ΔfH° or ΔfG° is in another unit, kJ/mol; gas atoms of heavy metals reach 860. */
  readonly mostEnergyPerAtom: number;
  /** Decimals that a value may carry beyond its standard uncertainty's first digit. */
  readonly digitsBeyondUncertainty: number;
}

export const POLICY: Policy = {
  version: 1,
  closureAllowance: 0.05,
  normalizedErrorLimit: 1,
  largeEnergyChange: 1,
  largeEntropyChange: 1,
  largeRelativeChange: 0.01,
  widerUncertainty: 1.5,
  factorAgreement: 0.02,
  leastEntropy: 1,
  mostEntropy: 300,
  mostEntropyPerAtom: 100,
  mostEnergyPerAtom: 1500,
  digitsBeyondUncertainty: 2,
};
