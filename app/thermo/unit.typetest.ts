/**
 * What must not compile. The type check runs this file; nothing imports it.
 */
import { digits } from "./digits.ts";
import { addQuantities, convertQuantity, type Quantity, quantity, subtractQuantities } from "./unit.ts";

const enthalpy = quantity(digits("-285.830"), "kJ/mol");
const entropy = quantity(digits("69.95"), "J/(mol K)");

// Like quantities in one unit add.
export const sum: Quantity<"kJ/mol"> = addQuantities(enthalpy, quantity(digits("1"), "kJ/mol"));
export const inJoules: Quantity<"J/mol"> = convertQuantity(enthalpy, "J/mol");

// @ts-expect-error an enthalpy and an entropy are different quantities
addQuantities(enthalpy, entropy);

// @ts-expect-error in either order
subtractQuantities(entropy, enthalpy);

// @ts-expect-error kilojoules and joules must be brought to one unit first
addQuantities(enthalpy, inJoules);

// @ts-expect-error no factor leads from an entropy to an enthalpy
convertQuantity(entropy, "kJ/mol");

// @ts-expect-error text becomes digits only through a reader
quantity("69.95", "J/(mol K)");
