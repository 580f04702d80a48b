import { digits as digitsOf } from "#app/thermo/digits.ts";
import { bracketForm, plusMinusForm } from "#app/thermo/notation.ts";
import {
  CUSTOMARY_COVERAGE_FACTOR,
  normalizedError,
  standardUncertainty,
  type Uncertainty,
} from "#app/thermo/uncertainty.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Columns, Fine, Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";

export const meta = () => [{ title: "Uncertainty · Conventions · Tablewright" }];

const VALUE = digitsOf("-285.830");

const kinds: readonly (readonly [name: string, meaning: string, example: Uncertainty | null])[] = [
  ["standard", "one standard deviation, k = 1", { digits: digitsOf("0.020"), kind: "standard", coverageFactor: null }],
  [
    "expanded",
    "k times the standard one, with its k; CODATA gives k = 2, about 95 %",
    { digits: digitsOf("0.040"), kind: "expanded", coverageFactor: 2 },
  ],
  [
    "± of unstated kind",
    `the source does not say; counted as k = ${CUSTOMARY_COVERAGE_FACTOR} and marked as assumed`,
    { digits: digitsOf("0.040"), kind: "unstated", coverageFactor: null },
  ],
  ["exact", "none: the value holds by convention", { digits: digitsOf("0"), kind: "exact", coverageFactor: null }],
  ["none", "the source gives none; nothing is made up", null],
];

const expanded = (text: string): Uncertainty => ({ digits: digitsOf(text), kind: "expanded", coverageFactor: 2 });
const agreement = normalizedError(
  { digits: VALUE, uncertainty: expanded("0.040") },
  { digits: digitsOf("-285.79"), uncertainty: expanded("0.08") },
);

/** Kinds, the bracket form, digits and agreement. Readable by everybody. */
export default function UncertaintyPage() {
  return (
    <ConventionsLeaf
      part="uncertainty"
      heading="Uncertainty"
      lede="How well a number is known is part of it: it is kept as the source gave it, and everything is computed with the standard uncertainty."
    >
      <Section head="Kinds" id="kinds">
        <Table caption="Kinds of uncertainty, with the same value printed under each" even className="max-w-6xl">
          <thead>
            <tr>
              <th scope="col">Kind</th>
              <th scope="col">Meaning</th>
              <th scope="col">As the source gave it</th>
              <th scope="col" className="figure">
                <i>u</i>
              </th>
              <th scope="col">In the table</th>
            </tr>
          </thead>
          <tbody>
            {kinds.map(([name, meaning, example]) => (
              <tr key={name}>
                <th scope="row" className="tight">
                  {name}
                </th>
                <td className="wide">
                  <Prose text={meaning} />
                </td>
                <td className="tight">
                  <Prose text={plusMinusForm(VALUE, example)} />
                </td>
                <td className="figure">{standardUncertainty(example)?.toFixed(3) ?? "–"}</td>
                <td className="tight">{bracketForm(VALUE, example)}</td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>Terms after the Guide to the expression of uncertainty in measurement (GUM, JCGM 100:2008).</Fine>
      </Section>
      <Columns>
        <Section head="Figures in brackets" id="brackets">
          <p className="mb-2">
            <b>Brackets hold the standard uncertainty in the last digits</b>: −285.830(20) is −285.830 with <i>u</i> =
            0.020. At most two digits of it are shown, and the value is rounded to the same place; what is stored is not
            rounded.
          </p>
          <p>
            In a sheet, figures in brackets are read so as well, and ± as of unstated kind, unless the cell or the sheet
            says k, σ or 95 %.
          </p>
        </Section>
        <Section head="Digits" id="digits">
          <p className="mb-2">
            Digits are data: 205.10 is not 205.1. Values stay decimals from the sheet to the download, never binary
            fractions. A zero typed for a missing value is not a value.
          </p>
          <p>
            There is one rounding rule, half to even, used once at the end. A conversion keeps just enough digits to
            come back to what was printed; a repaired value keeps the precision it was printed with.
          </p>
        </Section>
      </Columns>
      <Columns>
        <Section head="When two values agree" id="agreement">
          <p className="mb-2">
            <Prose text="Two values agree when they lie no further apart than their joined expanded uncertainties: E_n = |a − b| / √(U_a² + U_b²) is at most 1 (ISO 13528)." />
          </p>
          <p>
            <Prose
              text={`For (−285.830 ± 0.040) and (−285.79 ± 0.08) it is ${agreement?.toFixed(2)}: they agree. Where either uncertainty is missing, or both are zero, E_n is not defined; and it says nothing of two values that rest on the same measurement.`}
            />
          </p>
        </Section>
        <Section head="Derived values" id="derived">
          <p>
            A value in the lighter hand is <b>derived</b>: it follows from the other values of its species. Values are
            taken as uncorrelated. Uncertainties of the elements cancel in a reaction only where they are netted first.
          </p>
        </Section>
      </Columns>
    </ConventionsLeaf>
  );
}
