import { READ } from "#app/thermo/spellings.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { exactDecimalFactor, isLikeUnit, type Unit, UNITS } from "#app/thermo/unit.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Fine, Section } from "#app/ui/Section.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import type { Route } from "./+types/conventions.units";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";
import { ReadTable, UnreadTable } from "./conventions/Spellings.tsx";
import { toldBy } from "./conventions/unread.ts";

export const meta = () => [{ title: "Units · Conventions · Tablewright" }];

/** What defines a unit, in words; the factor is worked out from the same definitions that readings are. */
function definitionOf(unit: Unit): string {
  if (unit.includes("(IT)")) return "calorie of the International Table, 4.1868 J exactly";
  if (unit.includes("cal"))
    return "thermochemical calorie, 4.184 J exactly; cal/(mol K) is also written e.u. and gibbs/mol";
  if (unit.includes("eV")) return "electronvolt per particle of the formula; exact, the Faraday constant (SI 2019)";
  return "SI";
}

/** The factors, from the definitions the readers convert by. */
export function loader() {
  const factors = UNITS.map((unit) => {
    const own = isLikeUnit(unit, "kJ/mol") ? "kJ/mol" : propertyInfo.entropy.unit;
    return { unit, own, factor: exactDecimalFactor(unit, own) ?? "", definition: definitionOf(unit) };
  });
  return { factors, read: READ.unit, unread: toldBy("unit") };
}

/** Accepted units with exact factors, and what is refused. Readable by everybody. */
export default function UnitsPage({ loaderData }: Route.ComponentProps) {
  const { factors, read, unread } = loaderData;
  return (
    <ConventionsLeaf
      part="units"
      heading="Units"
      lede="The table keeps energies in kJ and entropies in J, per mole of the formula as written. Sheets may use any unit below."
    >
      <Section head="Units and their factors" id="factors">
        <Table caption="Units that sheets may use, with their factors" even className="max-w-5xl">
          <thead>
            <tr>
              <th scope="col">In a sheet</th>
              <th scope="col">In the table</th>
              <th scope="col">Definition</th>
            </tr>
          </thead>
          <tbody>
            {factors.map(({ unit, own, factor, definition }) => (
              <tr key={unit}>
                <th scope="row" className="tight">
                  1 <UnitText unit={unit} />
                </th>
                <td className="tight">
                  {factor} <UnitText unit={own} />
                </td>
                <td className="wide">
                  <Prose text={definition} />
                </td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>
          Factors are exact, and so are conversions: they keep just enough digits to come back to the number of the
          sheet, and round half to even once, at the end. The text and the unit of the sheet stay beside the converted
          number with the step that was taken, as <Prose text="× 4.184" />.
        </Fine>
      </Section>
      <Section head="Spellings that are read" id="read">
        <p className="lede">
          Brackets, dots, raised figures, words and capitals make no difference where only one unit can be meant.
        </p>
        <ReadTable caption="Spellings of units that are read" groups={read} />
      </Section>
      <Section head="Refused or asked about" id="refused">
        <p className="lede">
          Nothing is taken for a unit that it may not be. The sentence at the cell says what to do.
        </p>
        <UnreadTable caption="Spellings of units that are refused or asked about" groups={unread} />
      </Section>
    </ConventionsLeaf>
  );
}
