import type { ClosureInput, ClosureSettings, ClosureValue } from "#app/thermo/closure.ts";
import type { Property } from "#app/thermo/property.ts";
import type { Policy } from "./policy.ts";
import type { TableView, ViewedSpecies, ViewedValue } from "./types.ts";

/** The three properties a Gibbs closure ties together. */
export const CLOSURE_PROPERTIES = ["enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation"] as const;

export type ClosureProperty = (typeof CLOSURE_PROPERTIES)[number];

/** The values of a species that its closure needs. */
export type ClosureValues = Readonly<Record<ClosureProperty, ViewedValue>>;

/** The three values, or undefined where the species does not have all of them. */
export function closureValues(values: Partial<Readonly<Record<Property, ViewedValue>>>): ClosureValues | undefined {
  const { enthalpyOfFormation, entropy, gibbsEnergyOfFormation } = values;
  if (enthalpyOfFormation === undefined || entropy === undefined || gibbsEnergyOfFormation === undefined) {
    return undefined;
  }
  return { enthalpyOfFormation, entropy, gibbsEnergyOfFormation };
}

/** What `gibbsClosure` asks for, from the three values of a species. */
export function closureInput(species: ViewedSpecies, values: ClosureValues, view: TableView): ClosureInput {
  return {
    identity: species.identity,
    enthalpy: values.enthalpyOfFormation,
    entropy: values.entropy,
    gibbs: values.gibbsEnergyOfFormation,
    elementEntropy: (element) => view.elementEntropy(element),
    constraintRelaxed: isConstraintRelaxed(species, values),
  };
}

/** The settings of the closure that a policy holds. */
export function closureSettings(policy: Policy): ClosureSettings {
  return { allowance: policy.closureAllowance };
}

/** The closure's input with one value's digits replaced. */
export function withValue(input: ClosureInput, property: ClosureProperty, value: Partial<ClosureValue>): ClosureInput {
  switch (property) {
    case "enthalpyOfFormation":
      return { ...input, enthalpy: { ...input.enthalpy, ...value } };
    case "entropy":
      return { ...input, entropy: { ...input.entropy, ...value } };
    case "gibbsEnergyOfFormation":
      return { ...input, gibbs: { ...input.gibbs, ...value } };
  }
}

/** Whether the source itself says that its three values need not fit together. */
function isConstraintRelaxed(species: ViewedSpecies, values: ClosureValues): boolean {
  return [species.notice, ...CLOSURE_PROPERTIES.map((property) => values[property].notice)].some(
    (notice) =>
      notice !== undefined && notice !== null && /constraint.{0,40}relaxed|relaxed.{0,40}constraint/i.test(notice),
  );
}
