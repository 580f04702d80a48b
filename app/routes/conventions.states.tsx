import { STANDARD_ATMOSPHERE, STANDARD_PRESSURE } from "#app/thermo/constants.ts";
import { elementOf, elementSymbols } from "#app/thermo/elements.ts";
import { showTerm } from "#app/thermo/notation.ts";
import { PHASES, phaseName } from "#app/thermo/phase.ts";
import { referenceStateOf } from "#app/thermo/referenceStates.ts";
import { readKey } from "#app/thermo/speciesKey.ts";
import { READ } from "#app/thermo/spellings.ts";
import { entropyStepToBar, gasFormed, gibbsStepToBar } from "#app/thermo/standardState.ts";
import { trueMinus } from "#app/ui/formulaPieces.ts";
import { Prose } from "#app/ui/Prose.tsx";
import { Columns, Fine, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Table } from "#app/ui/Table.tsx";
import type { Route } from "./+types/conventions.states";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";
import { ReadTable, UnreadTable } from "./conventions/Spellings.tsx";
import { toldBy } from "./conventions/unread.ts";

export const meta = () => [{ title: "States · Conventions · Tablewright" }];

/** What each phase is the standard state of. */
const standardStates: Record<(typeof PHASES)[number], string> = {
  g: "the pure ideal gas at 100 kPa",
  l: "the pure liquid under 100 kPa",
  s: "the pure solid under 100 kPa, where nobody says which kind",
  cr: "the pure crystal under 100 kPa; several forms are told apart by a label",
  am: "the pure solid without order under 100 kPa",
  vit: "the pure glass under 100 kPa",
  aq: "the hypothetical ideal solution of 1 mol in 1 kg of water under 100 kPa",
};

const STEP_EXAMPLES = [
  "O2(g)",
  "H2O(g)",
  "H2O(l)",
  "NH3(g)",
  "CO2(g)",
  "NaCl(cr)",
  "C(cr,graphite)",
  "Na+(aq)",
  "Cl-(aq)",
];

/** A step with its sign, `+0.1094`; 0 where nothing changes. */
function shownStep(step: number): string {
  return step === 0 ? "0" : showTerm(step, 4).replace(" ", "");
}

/** The states as the readers and the arithmetic know them. */
export function loader() {
  return {
    read: READ.phase,
    unread: toldBy("phase"),
    elements: elementSymbols().flatMap((symbol) => {
      const state = referenceStateOf(symbol);
      return state === undefined ? [] : [{ symbol, name: elementOf(symbol)?.name ?? "", key: state.key }];
    }),
    without: elementSymbols().filter((symbol) => referenceStateOf(symbol) === undefined),
    steps: STEP_EXAMPLES.flatMap((key) => {
      const reading = readKey(key);
      if (reading.outcome !== "read") return [];
      return [
        {
          key,
          formed: trueMinus(String(gasFormed(reading.value) ?? "")),
          entropy: shownStep(entropyStepToBar(reading.value)),
          gibbs: shownStep(gibbsStepToBar(reading.value) ?? 0),
        },
      ];
    }),
  };
}

/** Standard states, phases, reference states and ions. Readable by everybody. */
export default function StatesPage({ loaderData }: Route.ComponentProps) {
  const { read, unread, elements, without, steps } = loaderData;
  return (
    <ConventionsLeaf
      part="states"
      heading="States"
      lede="What the sign ° stands for, how phases and species are named, and where formation counts from."
    >
      <Columns>
        <Section head="Standard state" id="standard-state">
          <p className="mb-2">
            The sign ° means the standard state at <b>100 kPa</b> (1 bar, since 1982). A gas is the pure ideal gas at
            that pressure, a liquid or solid the pure substance, a solute the hypothetical ideal solution of 1 mol in 1
            kg of water. Charts often say 1 mol/L for a solute; the record keeps what the source said.
          </p>
          <p>
            The temperature is no part of the standard state. “25 °C”, “298 K” and “298.15 K” are taken as one, with a
            remark; a value for any other temperature is refused, because nothing is carried over to another temperature
            in silence.
          </p>
        </Section>
        <Section head="Species keys" id="species">
          <p className="mb-2">
            A species is a formula, a charge and a phase, and where that leaves more than one substance, a label: the
            form of a solid or the name of an isomer. Its key is written as in the trade, and programs use the same:{" "}
            <code className="font-sans">H2O(l)</code>, <code className="font-sans">SO4-2(aq)</code>,{" "}
            <code className="font-sans">C(cr,graphite)</code>,{" "}
            <code className="font-sans">C2H6O(g,dimethyl-ether)</code>.
          </p>
          <p>
            Formulas print in the order their source gave and are compared by Hill order. D and T are elements of their
            own; other isotopes have no rows. A single charge prints its 1 where the bare sign would have two readings:{" "}
            <code className="font-sans">I3-1</code>.
          </p>
        </Section>
      </Columns>
      <Section head="Phases" id="phases">
        <Table caption="The phases of the table and their standard states" even className="max-w-4xl">
          <thead>
            <tr>
              <th scope="col">Key</th>
              <th scope="col">Phase</th>
              <th scope="col">Standard state</th>
            </tr>
          </thead>
          <tbody>
            {PHASES.map((phase) => (
              <tr key={phase}>
                <th scope="row">({phase})</th>
                <td className="tight">{phaseName[phase]}</td>
                <td className="wide">{standardStates[phase]}</td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>
          A further crystal form of a handbook (cr2, cr3) is never taken for the first: the sheet must name it. The sum
          of a salt’s ions (ai) is checked against its ions and not kept as a species.
        </Fine>
      </Section>
      <Columns>
        <Section head="Phases in a sheet: read" id="phases-read">
          <ReadTable caption="Spellings of phases that are read" groups={read} />
        </Section>
        <Section head="Phases in a sheet: refused" id="phases-refused">
          <UnreadTable caption="Spellings of phases that are refused" groups={unread} />
        </Section>
      </Columns>
      <Section head="Reference states of the elements" id="reference-states">
        <p className="mb-3 max-w-[72ch]">
          <Prose text="Formation counts from the elements in these states: there ΔfH° and ΔfG° are zero by definition, S° is not. An atom in the gas or another form, as O3(g), C(cr,diamond) or Br2(g), is not a reference state and its values are not zero. White phosphorus is the reference by agreement, although it is not the stablest form." />
        </p>
        <ul className="max-w-6xl columns-[15rem] gap-x-8" aria-label="Elements and their reference states">
          {elements.map(({ symbol, name, key }) => (
            <li key={symbol} className="break-inside-avoid">
              <SpeciesName speciesKey={key} /> <span className="text-soft">{name}</span>
            </li>
          ))}
        </ul>
        <Fine>
          Entropies are used per atom of the form listed. No reference state, and so no formation, is known to the table
          for {without.join(", ")}.
        </Fine>
      </Section>
      <Section head="Ions in solution" id="ions">
        <div className="max-w-[72ch] space-y-2">
          <p>
            <Prose text="The values of a single ion cannot be measured. All are relative to H+(aq), for which ΔfH°, ΔfG°, S° and Cp° are zero by convention, exactly, at every temperature." />
          </p>
          <p>
            <Prose text="So an ion of charge number z forms with z/2 H2(g) given off, and its entropy of formation is ΔfS° = S° − Σ ν S°(elements) + (z/2) S°(H2)." />
          </p>
          <p>
            <Prose text="A sheet that lists H3O+(aq) as the zero uses the same convention with a molecule of water added: there H3O+(aq) must carry the values of H2O(l). Ions in the gas follow other conventions, and their closure is not made." />
          </p>
        </div>
      </Section>
      <Section head="From 1 atm to 1 bar" id="atmosphere">
        <p className="mb-3 max-w-[72ch]">
          <Prose
            text={`Tables from before 1982 mostly use 1 atm (${STANDARD_ATMOSPHERE / 1000} kPa). For a gas, S° at 1 bar is S° at 1 atm + R ln ${STANDARD_ATMOSPHERE / STANDARD_PRESSURE}. ΔfH° does not change. ΔfG° moves by −RT ln ${STANDARD_ATMOSPHERE / STANDARD_PRESSURE} for each mole of gas that the formation sets free: Δν counts the gas of the species, less that of the elements, plus z/2 for a solute.`}
          />
        </p>
        <Table caption="The step from 1 atm to 1 bar for some species" even className="max-w-3xl">
          <thead>
            <tr>
              <th scope="col">Species</th>
              <th scope="col" className="figure">
                Δν
              </th>
              <th scope="col" className="figure">
                <Prose text="S° in J/(mol K)" />
              </th>
              <th scope="col" className="figure">
                <Prose text="ΔfG° in kJ/mol" />
              </th>
            </tr>
          </thead>
          <tbody>
            {steps.map(({ key, formed, entropy, gibbs }) => (
              <tr key={key}>
                <th scope="row">
                  <SpeciesName speciesKey={key} />
                </th>
                <td className="figure">{formed}</td>
                <td className="figure">{entropy}</td>
                <td className="figure">{gibbs}</td>
              </tr>
            ))}
          </tbody>
        </Table>
        <Fine>
          Worked out for the ideal gas at 298.15 K. The step can be seen only where values carry two decimals.
        </Fine>
      </Section>
    </ConventionsLeaf>
  );
}
