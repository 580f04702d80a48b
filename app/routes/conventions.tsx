import { Link } from "react-router";
import { checks } from "#app/checks/registry.ts";
import type { Check } from "#app/checks/types.ts";
import { paths } from "#app/paths.ts";
import { digits as digitsOf } from "#app/thermo/digits.ts";
import { elementSymbols } from "#app/thermo/elements.ts";
import { PHASES, phaseName } from "#app/thermo/phase.ts";
import { PROPERTIES, propertyInfo } from "#app/thermo/property.ts";
import { referenceStateOf, type ReferenceState } from "#app/thermo/referenceStates.ts";
import { Caution } from "#app/ui/Caution.tsx";
import { DataTable, type Column } from "#app/ui/DataTable.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Columns, Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import type { Route } from "./+types/conventions";

export const meta = () => [{ title: "Conventions · Tablewright" }];

type CheckEntry = Pick<Check, "code" | "title" | "severities" | "appliesTo">;

const checkColumns: readonly Column<CheckEntry>[] = [
  {
    id: "title",
    head: "Check",
    rowHead: true,
    cell: (check) => <Link to={paths.conventionsCheck(check.code)}>{check.title}</Link>,
  },
  {
    id: "severities",
    head: "A finding",
    cell: (check) =>
      check.severities.map((severity) => (
        <span key={severity} className="mr-3">
          <InlineMark kind={severity} />
        </span>
      )),
  },
  { id: "appliesTo", head: "Asked of", wraps: "wide", cell: (check) => <Prose text={check.appliesTo} /> },
];

// What each quantity may be; the sign of a solute’s value is relative to H+(aq).
const ranges: Record<(typeof PROPERTIES)[number], string> = {
  enthalpyOfFormation: "any sign; 0 for an element in its reference state",
  entropy: "above 0 for every pure substance; a solute’s may be negative, being relative to H+(aq)",
  gibbsEnergyOfFormation: "any sign; 0 for an element in its reference state",
  heatCapacity: "above 0; a solute’s may be negative",
  enthalpyIncrement: "above 0",
};

const factors = [
  ["J/mol", "0.001 kJ/mol", "exact"],
  ["kcal/mol", "4.184 kJ/mol", "exact, the thermochemical calorie"],
  ["cal/mol", "0.004184 kJ/mol", "exact"],
  ["kJ/(mol K)", "1000 J/(mol K)", "exact"],
  ["cal/(mol K)", "4.184 J/(mol K)", "exact; also written e.u. and gibbs/mol"],
] as const;

const referenceStates: readonly ReferenceState[] = elementSymbols().flatMap((symbol) => referenceStateOf(symbol) ?? []);
const named = referenceStates.filter(({ label }) => label !== undefined);
const gases = referenceStates.filter(({ phase }) => phase === "g");
const liquids = referenceStates.filter(({ phase }) => phase === "l");

/** The entries of the checks; what they run stays on the server. */
export function loader() {
  return {
    checks: checks.map(({ code, title, severities, appliesTo }): CheckEntry => ({
      code,
      title,
      severities,
      appliesTo,
    })),
  };
}

/** What the numbers of the table mean and how they are examined. Readable by everybody. */
export default function ConventionsPage({ loaderData }: Route.ComponentProps) {
  return (
    <Leaf
      heading="Conventions"
      section="conventions"
      lede="What the numbers mean, how they are printed, and what every proposed value is asked before it may stand."
    >
      <Quantities />
      <Columns>
        <StandardState />
        <Units />
      </Columns>
      <Columns>
        <SpeciesKeys />
        <ReferenceStates />
      </Columns>
      <Columns>
        <Uncertainties />
        <Ions />
      </Columns>
      <Section head="What is checked" id="checks">
        <p className="lede">
          Every line of a revision, and every edition before it is published, is asked these questions.{" "}
          <InlineMark kind="block" /> stops a line until it is mended or a reviewer sets the finding aside with a
          reason; <InlineMark kind="look" /> asks a person to look; <InlineMark kind="remark" /> only says something. No
          check changes a number: a repair is a suggestion with its arithmetic, and the steward takes it or leaves it.
        </p>
        <DataTable
          caption="The checks, in the order in which their findings are listed"
          rows={loaderData.checks}
          columns={checkColumns}
          rowKey={(check) => check.code}
          even
        />
      </Section>
      <Caution />
    </Leaf>
  );
}

function Quantities() {
  return (
    <Section head="Quantities" id="quantities">
      <Table caption="The quantities of the table, their symbols and units" even className="max-w-5xl">
        <thead>
          <tr>
            <th scope="col">Symbol</th>
            <th scope="col">Quantity</th>
            <th scope="col">Unit</th>
            <th scope="col">Values</th>
          </tr>
        </thead>
        <tbody>
          {PROPERTIES.map((property) => (
            <tr key={property}>
              <th scope="row" className="tight">
                <Symbol of={propertyInfo[property].symbol} />
              </th>
              <td className="wide">{propertyInfo[property].name}</td>
              <td>
                <UnitText unit={propertyInfo[property].unit} />
              </td>
              <td className="wide">
                <Prose text={ranges[property]} />
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      <Fine>
        All are molar and are given at 298.15 K. The heads of columns print them as quantity over unit, so that the
        figures below carry none.
      </Fine>
    </Section>
  );
}

function StandardState() {
  return (
    <Section head="Standard state" id="standard-state">
      <p className="mb-2">
        The sign ° means the standard state at <b>100 kPa</b> (1 bar). A gas is the pure ideal gas at that pressure, a
        liquid or solid the pure substance, a solute the hypothetical ideal solution of 1 mol in 1 kg of water.
      </p>
      <p className="mb-2">
        <Prose text="Tables from before 1982 mostly use 1 atm (101.325 kPa). For a gas, S° at 1 bar is S° at 1 atm + R ln 1.01325, which is + 0.1094 J/(mol K); ΔfH° does not change; ΔfG° moves by −0.0326 kJ/mol for each mole of gas that the formation sets free." />
      </p>
      <p>
        The temperature is no part of the standard state. “25 °C”, “298 K” and “298.15 K” are taken as one, with a
        remark; a value for any other temperature is refused, because nothing is carried over to another temperature in
        silence.
      </p>
    </Section>
  );
}

function Units() {
  return (
    <Section head="Units" id="units">
      <Table caption="Units that sheets may use, with their factors" even>
        <thead>
          <tr>
            <th scope="col">In a sheet</th>
            <th scope="col">In the table</th>
            <th scope="col">Factor</th>
          </tr>
        </thead>
        <tbody>
          {factors.map(([unit, becomes, note]) => (
            <tr key={unit}>
              <th scope="row" className="tight">
                1 <UnitText unit={unit} />
              </th>
              <td className="tight">
                <Prose text={becomes} />
              </td>
              <td>{note}</td>
            </tr>
          ))}
        </tbody>
      </Table>
      <Fine>
        Conversions are exact decimals. The text and the unit of the sheet stay beside the converted number. The only
        rounding rule is half to even, and it is used for printing alone.
      </Fine>
    </Section>
  );
}

function SpeciesKeys() {
  return (
    <Section head="Species" id="species">
      <p className="mb-2">
        A species is a formula, a charge and a state, and where that leaves more than one substance, a label: the form
        of a solid or the name of an isomer. Its key is written as in the trade, and programs use the same:{" "}
        <code className="font-sans">H2O(l)</code>, <code className="font-sans">SO4-2(aq)</code>,{" "}
        <code className="font-sans">C(cr,graphite)</code>.
      </p>
      <dl className="my-3 grid grid-cols-[3rem_1fr] gap-y-1">
        {PHASES.map((phase) => (
          <div key={phase} className="contents">
            <dt className="text-soft">({phase})</dt>
            <dd>{phaseName[phase]}</dd>
          </div>
        ))}
      </dl>
      <p>
        <Prose text="Formulas print in the order their source gave and are compared by Hill order. A charge is read in any of its common spellings; where a spelling has two possible readings (O2-, SO42-), the steward is asked." />
      </p>
    </Section>
  );
}

function ReferenceStates() {
  return (
    <Section head="Element reference states" id="reference-states">
      <p className="mb-2">
        <Prose text="Formation counts from the elements in these states: there ΔfH° and ΔfG° are zero by definition, S° is not." />
      </p>
      <p className="mb-2">
        Named forms: <SpeciesList states={named} />. White phosphorus is the reference by agreement, although it is not
        the stablest form.
      </p>
      <p className="mb-2">
        Gases: <SpeciesList states={gases} />. Liquids: <SpeciesList states={liquids} />. Iodine is{" "}
        <SpeciesName speciesKey="I2(cr)" />, the other metals and solids are one atom of the crystal.
      </p>
      <p>
        <Prose text="An atom in the gas or another form, as O3(g), C(cr,diamond) or Br2(g), is not a reference state and its values are not zero." />
      </p>
    </Section>
  );
}

function SpeciesList({ states }: { states: readonly ReferenceState[] }) {
  return states.map(({ key }, index) => (
    <span key={key}>
      {index > 0 && ", "}
      <SpeciesName speciesKey={key} />
    </span>
  ));
}

function Uncertainties() {
  return (
    <Section head="Uncertainty and digits" id="uncertainty">
      <p className="mb-2">
        A stated uncertainty has a kind: exact by convention; standard; expanded with its coverage factor <i>k</i>; or ±
        of a kind the source does not say, which is counted as <i>k</i> = 2 and marked as assumed. It is kept as given,
        and everything is computed with the standard one.
      </p>
      <p className="mb-2">
        <b>Brackets hold the standard uncertainty in the last digits</b>: a value of −285.830 with an expanded
        uncertainty of 0.040 (<i>k</i> = 2) is printed{" "}
        <Figures digits="-285.830" uncertainty={{ digits: digitsOf("0.040"), kind: "expanded", coverageFactor: 2 }} />.
        At most two digits of it are shown, and the value is rounded to the same place; what is stored is not rounded.
        Digits are data: 205.10 is not 205.1.
      </p>
      <p className="mb-2">
        <Prose text="Two values agree when they lie no further apart than their joined expanded uncertainties: E_n = |a − b| / √(U_a² + U_b²) is at most 1. Where either is missing, E_n is not defined." />
      </p>
      <p>
        A value in the lighter hand is <b>derived</b>: it follows from the other values of its species. Values are taken
        as uncorrelated.
      </p>
    </Section>
  );
}

function Ions() {
  return (
    <Section head="Ions in solution" id="ions">
      <p className="mb-2">
        <Prose text="The values of a single ion cannot be measured. All are relative to H+(aq), for which ΔfH°, ΔfG°, S° and Cp° are zero by convention, exactly, at every temperature." />
      </p>
      <p className="mb-2">
        <Prose text="So a cation of charge z forms with z/2 H2(g) given off, and its entropy of formation is ΔfS° = S° − Σ ν S°(elements) + (z/2) S°(H2)." />
      </p>
      <p>
        <Prose text="A sheet that lists H3O+(aq) as the zero uses the same convention with a molecule of water added: there H3O+(aq) must carry the values of H2O(l)." />
      </p>
    </Section>
  );
}
