import {
  AVOGADRO_CONSTANT,
  BOLTZMANN_CONSTANT,
  ELEMENTARY_CHARGE,
  FARADAY_CONSTANT,
  GAS_CONSTANT,
  PLANCK_CONSTANT,
} from "#app/thermo/constants.ts";
import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";

export const meta = () => [{ title: "Symbols · Conventions · Tablewright" }];

// What each quantity may be; the sign of a solute’s value is relative to H+(aq).
const ranges: Record<(typeof PROPERTIES)[number], string> = {
  enthalpyOfFormation: "any sign; exactly 0 for an element in its reference state",
  entropy: "above 0 for every pure substance (third law); a solute’s may be negative, being relative to H+(aq)",
  gibbsEnergyOfFormation: "any sign; exactly 0 for an element in its reference state",
  heatCapacity: "above 0; a solute’s may be negative",
  enthalpyIncrement: "above 0",
};

const others: readonly (readonly [symbol: string, meaning: string, unit: string])[] = [
  ["ΔfS°", "entropy of formation, S° less that of the elements; worked out, not kept", "J/(mol K)"],
  ["ΔrH°", "enthalpy of a reaction, per mole of reaction as written; so ΔrS° and ΔrG°", "kJ/mol"],
  ["ln K", "equilibrium constant, −ΔrG°/RT; log10 K is ln K / 2.3026", "1"],
  ["E°", "standard potential against the standard hydrogen electrode, −ΔrG°/(nF)", "V"],
  ["T", "temperature, 298.15 K unless another is said", "K"],
  ["p°", "standard pressure, 100 kPa", "kPa"],
  ["ν", "number of atoms in a formula or moles in an equation, products positive", "1"],
  ["z", "charge number of an ion", "1"],
  ["u", "standard uncertainty, one standard deviation", "that of the value"],
  ["U", "expanded uncertainty, k times u; without a word k = 2, about 95 %", "that of the value"],
  ["E_n", "distance of two values over their joined expanded uncertainties", "1"],
];

const constants: readonly (readonly [symbol: string, name: string, value: number, unit: string])[] = [
  ["R", "molar gas constant, the Avogadro times the Boltzmann constant", GAS_CONSTANT, "J/(mol K)"],
  ["F", "Faraday constant, the Avogadro constant times the elementary charge", FARADAY_CONSTANT, "C/mol"],
  ["N", "Avogadro constant", AVOGADRO_CONSTANT, "1/mol"],
  ["k", "Boltzmann constant", BOLTZMANN_CONSTANT, "J/K"],
  ["h", "Planck constant", PLANCK_CONSTANT, "J s"],
  ["e", "elementary charge", ELEMENTARY_CHARGE, "C"],
];

/** Symbols, names, units, signs and ranges. Readable by everybody. */
export default function SymbolsPage() {
  return (
    <ConventionsLeaf
      part="symbols"
      heading="Symbols"
      lede="The quantities of the table, what they are called in files and by programs, and the values they can have."
    >
      <Section head="Quantities of the table" id="quantities">
        <Table caption="The quantities of the table, their symbols and units" even className="max-w-6xl">
          <thead>
            <tr>
              <th scope="col">Symbol</th>
              <th scope="col">Quantity</th>
              <th scope="col">Unit</th>
              <th scope="col">Sign and range</th>
              <th scope="col">For programs</th>
            </tr>
          </thead>
          <tbody>
            {PROPERTIES.map((property) => (
              <tr key={property}>
                <th scope="row" className="tight">
                  <Symbol of={propertyInfo[property].symbol} />
                </th>
                <td className="wide">{propertyInfo[property].name}</td>
                <td className="tight">
                  <UnitText unit={propertyInfo[property].unit} />
                </td>
                <td className="wide">
                  <Prose text={ranges[property]} />
                </td>
                <td>
                  <code className="font-sans">{property}</code>
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>
          All are molar and are given at 298.15 K. The heads of columns print them as quantity over unit, so that the
          figures below carry none. Mind the kilo: enthalpies and Gibbs energies are in kilojoules, entropies and heat
          capacities in joules.
        </Fine>
      </Section>
      <Section head="Other symbols">
        <Table caption="Other symbols that pages use" even className="max-w-5xl">
          <thead>
            <tr>
              <th scope="col">Symbol</th>
              <th scope="col">Meaning</th>
              <th scope="col">Unit</th>
            </tr>
          </thead>
          <tbody>
            {others.map(([symbol, meaning, unit]) => (
              <tr key={symbol}>
                <th scope="row" className="tight">
                  <SymbolOf symbol={symbol} />
                </th>
                <td className="wide">
                  <Prose text={meaning} />
                </td>
                <td className="tight">
                  <UnitText unit={unit} />
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>Symbols follow the IUPAC Green Book (3rd ed., 2007).</Fine>
      </Section>
      <Section head="Constants">
        <Table caption="Constants used by the arithmetic" even className="max-w-5xl">
          <thead>
            <tr>
              <th scope="col">Symbol</th>
              <th scope="col">Constant</th>
              <th scope="col">Value</th>
            </tr>
          </thead>
          <tbody>
            {constants.map(([symbol, name, value, unit]) => (
              <tr key={symbol}>
                <th scope="row" className="tight">
                  <i>{symbol}</i>
                  {symbol === "N" && <sub>A</sub>}
                </th>
                <td className="wide">{name}</td>
                <td className="tight">
                  <Figure value={value} />{" "}
                  {unit === "1/mol" ? (
                    <>
                      mol<sup>−1</sup>
                    </>
                  ) : (
                    <UnitText unit={unit} />
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>
          All are exact since 2019 (BIPM, The International System of Units, 9th ed.); the first two are products of
          exact ones and are shown to ten figures.
        </Fine>
      </Section>
    </ConventionsLeaf>
  );
}

function SymbolOf({ symbol }: { symbol: string }) {
  if (/^[A-Za-zν]°?$/.test(symbol)) {
    return (
      <>
        <i>{symbol[0]}</i>
        {symbol.slice(1)}
      </>
    );
  }
  return <Symbol of={symbol} />;
}

/** A constant in ten figures at most, its power of ten set as one. */
function Figure({ value }: { value: number }) {
  const [digits = "", power] = value.toPrecision(10).split("e");
  const shown = digits.includes(".") ? digits.replace(/\.?0+$/, "") : digits;
  if (power === undefined) return shown;
  return (
    <>
      {shown} × 10<sup>{String(Number(power)).replace("-", "−")}</sup>
    </>
  );
}
