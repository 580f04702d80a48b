import { FARADAY_CONSTANT, GAS_CONSTANT, REFERENCE_TEMPERATURE } from "./constants.ts";

/**
 * Reactions: sums over formation properties and what follows from them. Everything is **per mole of reaction as
 * written**: doubling the equation doubles every Δr, squares K and leaves E° alone.
 */

/** A number with its standard uncertainty (k = 1) in the same unit; null where none is stated. */
export interface Estimate {
  readonly value: number;
  readonly standardUncertainty: number | null;
}

/** What a reaction takes from a species: ΔfH° in kJ/mol, S° in J/(mol K), and ΔfG° in kJ/mol where one is stated. */
export interface ReactionSpecies {
  readonly key: string;
  readonly enthalpy?: Estimate;
  readonly entropy?: Estimate;
  readonly gibbs?: Estimate;
}

/** A species with its stoichiometric number ν: positive for products, negative for reactants. */
export interface ReactionTerm {
  readonly coefficient: number;
  readonly species: ReactionSpecies;
}

/** A sum Σ ν X, with the keys of the species that lack X; no value unless all have it. */
export type ReactionSum =
  | { readonly outcome: "summed"; readonly value: number; readonly standardUncertainty: number | null }
  | { readonly outcome: "missing"; readonly keys: readonly string[] };

/**
 * One term per species: a species on both sides counts with the difference of its numbers, and drops out at zero.
 * Doing this first keeps its uncertainty from being counted twice.
 */
export function netTerms(terms: readonly ReactionTerm[]): ReactionTerm[] {
  const net = new Map<string, ReactionTerm>();
  for (const { coefficient, species } of terms) {
    const sum = coefficient + (net.get(species.key)?.coefficient ?? 0);
    net.set(species.key, { coefficient: sum, species });
  }
  return [...net.values()].filter(({ coefficient }) => Math.abs(coefficient) > 1e-12);
}

/**
 * Δr X = Σ ν X over the netted species, in the unit of X per mole of reaction.
 *
 * Values count as uncorrelated: u² = Σ ν² u² (GUM, JCGM 100:2008, 5.1.2). Derived ΔfG° share element entropies and are
 * not; for them take u from ΔfH° and S° (`gibbsFromEnthalpyAndEntropy`). u is null as soon as one value states none.
 */
export function reactionSum(terms: readonly ReactionTerm[], property: "enthalpy" | "entropy" | "gibbs"): ReactionSum {
  const net = netTerms(terms);
  const keys = net.filter(({ species }) => species[property] === undefined).map(({ species }) => species.key);
  if (keys.length > 0) return { outcome: "missing", keys };
  let value = 0;
  let variance: number | null = 0;
  for (const { coefficient, species } of net) {
    const estimate = species[property];
    if (estimate === undefined) continue;
    value += coefficient * estimate.value;
    const uncertainty = estimate.standardUncertainty;
    variance = variance === null || uncertainty === null ? null : variance + (coefficient * uncertainty) ** 2;
  }
  return { outcome: "summed", value, standardUncertainty: variance === null ? null : Math.sqrt(variance) };
}

/**
 * Δr G° = Δr H° − T Δr S° in kJ/mol of reaction as written, with u from ΔfH° and S°; element entropies cancel.
 * At temperatures other than 298.15 K this holds ΔrH° and ΔrS° constant, which the caller must say.
 */
export function gibbsFromEnthalpyAndEntropy(
  terms: readonly ReactionTerm[],
  temperature = REFERENCE_TEMPERATURE,
): ReactionSum {
  const enthalpy = reactionSum(terms, "enthalpy");
  const entropy = reactionSum(terms, "entropy");
  if (enthalpy.outcome === "missing" || entropy.outcome === "missing") {
    const keys = [enthalpy, entropy].flatMap((sum) => (sum.outcome === "missing" ? sum.keys : []));
    return { outcome: "missing", keys: [...new Set(keys)] };
  }
  const kilo = temperature / 1000;
  return {
    outcome: "summed",
    value: enthalpy.value - kilo * entropy.value,
    standardUncertainty:
      enthalpy.standardUncertainty === null || entropy.standardUncertainty === null
        ? null
        : Math.hypot(enthalpy.standardUncertainty, kilo * entropy.standardUncertainty),
  };
}

/**
 * The electron of a half reaction stands for ½ H2(g) − H+(aq): ΔfH° 0, S° ½ S°(H2) = 65.34 J/(mol K), ΔfG° 0. Potentials
 * are then against the standard hydrogen electrode.
 *
 * @param hydrogenEntropy S° of H2(g) in J/(mol K)
 */
export function electron(hydrogenEntropy: Estimate): ReactionSpecies {
  const { value, standardUncertainty } = hydrogenEntropy;
  return {
    key: "e-",
    enthalpy: { value: 0, standardUncertainty: 0 },
    entropy: { value: value / 2, standardUncertainty: standardUncertainty === null ? null : standardUncertainty / 2 },
    gibbs: { value: 0, standardUncertainty: 0 },
  };
}

/** ln K = −ΔrG° / RT. ΔrG° in kJ/mol; gases relative to p°, solutes to 1 mol/kg. */
export function lnK(gibbs: number, temperature = REFERENCE_TEMPERATURE): number {
  return (-gibbs * 1000) / (GAS_CONSTANT * temperature);
}

/** log10 K = ln K / ln 10. ΔrG° in kJ/mol. */
export function log10K(gibbs: number, temperature = REFERENCE_TEMPERATURE): number {
  return lnK(gibbs, temperature) / Math.LN10;
}

/** K = exp(−ΔrG° / RT). ΔrG° in kJ/mol; overflows to Infinity or 0 beyond about ±1 750 kJ/mol, so prefer `log10K`. */
export function equilibriumConstant(gibbs: number, temperature = REFERENCE_TEMPERATURE): number {
  return Math.exp(lnK(gibbs, temperature));
}

/** ΔrG° in kJ/mol that belongs to a measured K: −RT ln K. */
export function gibbsFromLog10K(logarithm: number, temperature = REFERENCE_TEMPERATURE): number {
  return (-GAS_CONSTANT * temperature * logarithm * Math.LN10) / 1000;
}

/**
 * E° = −ΔrG° / (nF) in volts. ΔrG° in kJ/mol for the reaction as written with n electrons.
 *
 * @throws RangeError when no electron takes part
 */
export function standardPotential(gibbs: number, electrons: number): number {
  if (!(electrons > 0)) throw new RangeError("a potential needs electrons that take part");
  return (-gibbs * 1000) / (electrons * FARADAY_CONSTANT);
}

/** ΔrG° in kJ/mol that belongs to a measured potential: −nFE°. */
export function gibbsFromPotential(potential: number, electrons: number): number {
  return (-electrons * FARADAY_CONSTANT * potential) / 1000;
}
