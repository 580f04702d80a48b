/** The two units in which the table keeps its numbers. */
export type CanonicalUnit = "kJ/mol" | "J/(mol K)";

/** The quantities of a species that the table holds, all at 298.15 K and 100 kPa. */
export type Property =
  "enthalpyOfFormation" | "entropy" | "gibbsEnergyOfFormation" | "heatCapacity" | "enthalpyIncrement";

export interface PropertyInfo {
  /** Name in addresses, files and the API. */
  readonly code: Property;
  /** Name in sentences. */
  readonly name: string;
  /** Plain-text symbol (IUPAC Green Book, 3rd ed., 2007). */
  readonly symbol: string;
  readonly unit: CanonicalUnit;
}

/** In the order in which handbooks print them. */
export const PROPERTIES: readonly Property[] = [
  "enthalpyOfFormation",
  "entropy",
  "gibbsEnergyOfFormation",
  "heatCapacity",
  "enthalpyIncrement",
];

export const propertyInfo: Readonly<Record<Property, PropertyInfo>> = {
  enthalpyOfFormation: {
    code: "enthalpyOfFormation",
    name: "standard enthalpy of formation",
    symbol: "ΔfH°",
    unit: "kJ/mol",
  },
  entropy: { code: "entropy", name: "standard entropy", symbol: "S°", unit: "J/(mol K)" },
  gibbsEnergyOfFormation: {
    code: "gibbsEnergyOfFormation",
    name: "standard Gibbs energy of formation",
    symbol: "ΔfG°",
    unit: "kJ/mol",
  },
  heatCapacity: {
    code: "heatCapacity",
    name: "standard heat capacity at constant pressure",
    symbol: "Cp°",
    unit: "J/(mol K)",
  },
  enthalpyIncrement: {
    code: "enthalpyIncrement",
    name: "enthalpy increment from 0 K to 298.15 K",
    symbol: "H°(T)−H°(0)",
    unit: "kJ/mol",
  },
};

/** Whether a code from outside names a property of the table. */
export function isProperty(code: string): code is Property {
  return Object.hasOwn(propertyInfo, code);
}
