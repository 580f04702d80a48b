import { useState } from "react";
import { Link, Form } from "react-router";
import { digits } from "#app/thermo/digits.ts";
import type { Uncertainty } from "#app/thermo/uncertainty.ts";
import { paths } from "#app/paths.ts";
import { draftBookmark, Bookmark } from "./Bookmark.tsx";
import { Button, ButtonLink } from "./Button.tsx";
import { Caution } from "./Caution.tsx";
import { ClosurePlot } from "./ClosurePlot.tsx";
import { DataTable, type Column } from "./DataTable.tsx";
import { DecisionBar, KeysHint } from "./DecisionBar.tsx";
import { DifferencePlot } from "./DifferencePlot.tsx";
import { EditionLine } from "./EditionLine.tsx";
import { EmptyPage } from "./EmptyPage.tsx";
import { Check, Field, InlineField, InlineSelect, Select, Sentence, TextArea } from "./Field.tsx";
import { plainField } from "./fieldState.ts";
import { Finding } from "./Finding.tsx";
import { FormErrors } from "./FormErrors.tsx";
import { Formula } from "./Formula.tsx";
import { HistoryPlot } from "./HistoryPlot.tsx";
import { Leaf } from "./Leaf.tsx";
import { InlineMark, MarginHead, MarginMark } from "./MarginMark.tsx";
import { Notice } from "./Notice.tsx";
import { Progress } from "./Progress.tsx";
import { Prose } from "./Prose.tsx";
import { QuantityHead } from "./QuantityHead.tsx";
import { Columns, Fine, Section } from "./Section.tsx";
import { Arrow, Equilibrium } from "./Signs.tsx";
import type { Sorting } from "./SortHead.tsx";
import { SpeciesName } from "./SpeciesName.tsx";
import { StatusLine } from "./StatusLine.tsx";
import { Symbol } from "./Symbol.tsx";
import { RowUnder, Table } from "./Table.tsx";
import { Time } from "./Time.tsx";
import { tailOf } from "./figure.ts";
import { RootDataContext, type RootData } from "./useRootData.ts";
import { UnitText } from "./UnitText.tsx";
import { Figures, ValueCell, type ShownValue } from "./ValueCell.tsx";
import { concise } from "./concise.ts";

const reader: RootData = {
  visitor: { name: "R. Reviewer", roles: ["reviewer"] },
  opens: ["table", "sheets", "revisions", "editions", "sources", "conventions"],
  currentEdition: 7,
  demo: true,
};

interface Row {
  key: string;
  name: string;
  enthalpy: ShownValue | null;
  entropy: ShownValue | null;
  gibbs: ShownValue | null;
}

const expanded = (text: string): Uncertainty => ({ digits: digits(text), kind: "expanded", coverageFactor: 2 });
const value = (text: string, u?: string, derived = false): ShownValue => ({
  digits: digits(text),
  uncertainty: u ? expanded(u) : null,
  derived,
});

// Sample figures; those with an uncertainty are CODATA Key Values (1989) as remembered.
const rows: readonly Row[] = [
  {
    key: "AgCl(cr)",
    name: "silver chloride",
    enthalpy: value("-127.01", "0.05"),
    entropy: value("96.25", "0.20"),
    gibbs: value("-109.77", undefined, true),
  },
  {
    key: "Al2O3(cr,corundum)",
    name: "aluminium oxide",
    enthalpy: value("-1675.7", "1.3"),
    entropy: value("50.92", "0.10"),
    gibbs: value("-1582.3", undefined, true),
  },
  {
    key: "Br2(l)",
    name: "bromine",
    enthalpy: { digits: digits("0"), uncertainty: { digits: digits("0"), kind: "exact", coverageFactor: null } },
    entropy: value("152.21", "0.30"),
    gibbs: value("0", undefined, true),
  },
  {
    key: "Br2(g)",
    name: "bromine",
    enthalpy: value("30.91", "0.11"),
    entropy: value("245.468", "0.005"),
    gibbs: value("3.11", undefined, true),
  },
  {
    key: "C(cr,graphite)",
    name: "carbon",
    enthalpy: value("0"),
    entropy: value("5.74", "0.10"),
    gibbs: value("0", undefined, true),
  },
  {
    key: "CO2(g)",
    name: "carbon dioxide",
    enthalpy: value("-393.51", "0.13"),
    entropy: value("213.785", "0.010"),
    gibbs: value("-394.37", undefined, true),
  },
  {
    key: "CO3-2(aq)",
    name: "carbonate ion",
    enthalpy: value("-675.23", "0.25"),
    entropy: value("-50.0", "1.0"),
    gibbs: value("-527.90", undefined, true),
  },
  {
    key: "CaO(cr)",
    name: "calcium oxide",
    enthalpy: value("-634.92", "0.90"),
    entropy: value("38.1", "0.4"),
    gibbs: value("-603.30", undefined, true),
  },
  {
    key: "CdSO4·8/3H2O(cr)",
    name: "cadmium sulfate, hydrate",
    enthalpy: value("-1729.30", "0.80"),
    entropy: value("229.65", "0.40"),
    gibbs: null,
  },
  {
    key: "H2O(l)",
    name: "water",
    enthalpy: value("-285.830", "0.040"),
    entropy: value("69.95", "0.03"),
    gibbs: value("-237.14", undefined, true),
  },
  {
    key: "H2O(g)",
    name: "water",
    enthalpy: value("-241.826", "0.040"),
    entropy: value("188.835", "0.010"),
    gibbs: value("-228.58", undefined, true),
  },
  {
    key: "NH3(g)",
    name: "ammonia",
    enthalpy: value("-45.94", "0.35"),
    entropy: value("192.77", "0.05"),
    gibbs: value("-16.41", undefined, true),
  },
  {
    key: "Na+(aq)",
    name: "sodium ion",
    enthalpy: value("-240.34", "0.06"),
    entropy: value("58.45", "0.15"),
    gibbs: value("-261.95", undefined, true),
  },
  {
    key: "SO4-2(aq)",
    name: "sulfate ion",
    enthalpy: value("-909.34", "0.40"),
    entropy: value("18.50", "0.40"),
    gibbs: value("-744.00", undefined, true),
  },
  {
    key: "ZnO(cr)",
    name: "zinc oxide",
    enthalpy: value("-350.46", "0.27"),
    entropy: value("43.65", "0.40"),
    gibbs: null,
  },
];

const tail = (of: (row: Row) => ShownValue | null) =>
  tailOf(
    rows.flatMap((row) => {
      const shown = of(row);
      return shown ? [concise(shown.digits, shown.uncertainty).text] : [];
    }),
  );

const byDigits = (of: (row: Row) => ShownValue | null) => (a: Row, b: Row) =>
  Number(of(a)?.digits) - Number(of(b)?.digits);

const figures = (of: (row: Row) => ShownValue | null) => {
  const width = tail(of);
  return (row: Row) => {
    const shown = of(row);
    return shown ? <Figures {...shown} tail={width} /> : null;
  };
};

const columns: readonly Column<Row>[] = [
  {
    id: "species",
    head: "Species",
    rowHead: true,
    cell: (row) => <SpeciesName speciesKey={row.key} to={paths.specimens()} />,
    compare: (a, b) => a.key.localeCompare(b.key, "en"),
  },
  {
    id: "name",
    head: "Name",
    wraps: true,
    cell: (row) => row.name,
    compare: (a, b) => a.name.localeCompare(b.name, "en"),
  },
  {
    id: "enthalpyOfFormation",
    head: <QuantityHead property="enthalpyOfFormation" />,
    figure: true,
    cell: figures((row) => row.enthalpy),
    compare: byDigits((row) => row.enthalpy),
    missing: (row) => !row.enthalpy,
  },
  {
    id: "entropy",
    head: <QuantityHead property="entropy" />,
    figure: true,
    cell: figures((row) => row.entropy),
    compare: byDigits((row) => row.entropy),
    missing: (row) => !row.entropy,
  },
  {
    id: "gibbsEnergyOfFormation",
    head: <QuantityHead property="gibbsEnergyOfFormation" />,
    figure: true,
    cell: figures((row) => row.gibbs),
    compare: byDigits((row) => row.gibbs),
    missing: (row) => !row.gibbs,
  },
  { id: "source", head: "Source", cell: () => <Link to={paths.specimens()}>1</Link> },
];

const anyOf = [
  ["", "any element"],
  ["H", "hydrogen"],
  ["O", "oxygen"],
] as const;
const phases = [
  ["", "any phase"],
  ["g", "the gas"],
  ["aq", "solution"],
] as const;

/** Every piece of the design in all its states, with sample figures. A page for development and for the tests. */
export function Specimens({ sorting, withErrors }: { sorting: Sorting; withErrors: boolean }) {
  return (
    <RootDataContext value={reader}>
      <Leaf
        heading="Table of standard formation properties"
        section="table"
        bookmark={{ kind: "newest", label: "Edition", mark: 7 }}
        ribbon={
          <EditionLine
            edition={{ number: 7, publishedAt: "2026-03-12T09:30:00Z" }}
            newest={7}
            editions={[7, 6, 5, 4, 3, 2, 1]}
            end={
              <Link to={paths.tableDownload(7)} reloadDocument>
                download
              </Link>
            }
          >
            <span>151 species · 428 values</span>
            <span>298.15 K · 100 kPa</span>
          </EditionLine>
        }
      >
        <Filters />
        <DataTable
          caption="Standard formation properties, edition 7"
          rows={rows}
          columns={columns}
          rowKey={(row) => row.key}
          sorting={sorting}
        />
        <Fine>
          Figures in brackets are standard uncertainties in the last digits. Values in the lighter hand are derived from
          the others. 1 · Cox, Wagman, Medvedev, <i>CODATA Key Values for Thermodynamics</i>, 1989.
        </Fine>
        <RevisionSpecimen />
        <SheetSpecimen />
        <DrawingSpecimens />
        <FormSpecimens withErrors={withErrors} />
        <SmallPieces />
        <Caution />
        <DecisionBar
          end={
            <>
              3 block · 22 to look at · 387 clean{" "}
              <KeysHint
                keys={[
                  ["j", "next"],
                  ["k", "back"],
                  ["a", "accept"],
                  ["d", "decline"],
                ]}
              />
            </>
          }
        >
          <Button kind="main">Accept the 387 clean lines</Button>
          <Button>Return with comments</Button>
          <Button kind="quiet">Decline</Button>
        </DecisionBar>
      </Leaf>
    </RootDataContext>
  );
}

function Filters() {
  return (
    <Form method="get" role="search" aria-label="Filter the table">
      <Sentence>
        <span>Showing species with</span>
        <InlineSelect label="Element" name="element" options={anyOf} defaultValue="" />
        <span>in</span>
        <InlineSelect label="Phase" name="phase" options={phases} defaultValue="" />
        <span>named</span>
        <InlineField label="Name or formula" name="q" placeholder="anything" size={12} />
        <Button kind="text">show</Button>
        <StatusLine>15 of 151</StatusLine>
      </Sentence>
    </Form>
  );
}

const closure = {
  check: "gibbs-closure",
  severity: "block" as const,
  sentence: "NH3(g): the Gibbs closure is off by −3.60 kJ/mol; the tolerance is 0.46 kJ/mol.",
  arithmetic: ["ΔfH° − T ΔfS° = −49.54 − 298.15 × (−0.09905) = −20.01; stated ΔfG° −16.41 kJ/mol"],
  suggestions: [
    {
      property: "enthalpyOfFormation" as const,
      becomes: digits("-45.94"),
      slip: "digits exchanged",
      sentence: "Two digits exchanged would explain it: ΔfH° −45.94 kJ/mol leaves 0.00.",
    },
  ],
};

function RevisionSpecimen() {
  return (
    <Section head="Lines under review">
      <Table caption="Lines of revision 14 against edition 7" marked>
        <thead>
          <tr>
            <MarginHead />
            <th scope="col">Species</th>
            <th scope="col">Property</th>
            <th scope="col" className="figure">
              Stands in edition 7
            </th>
            <th scope="col" className="figure">
              Proposed
            </th>
            <th scope="col" className="figure">
              Difference
            </th>
            <th scope="col" className="figure">
              <Symbol of="E_n" />
            </th>
          </tr>
        </thead>
        <tbody>
          <tr aria-current="true">
            <MarginMark kind="block" />
            <th scope="row">
              <SpeciesName speciesKey="NH3(g)" to={paths.specimens()} />
            </th>
            <td>
              <Symbol of="ΔfH°" />
            </td>
            <td className="figure">
              <del>
                <Figures {...value("-45.94", "0.35")} />
              </del>
            </td>
            <td className="figure">
              <ins>
                <Figures {...value("-49.54", "0.30")} />
              </ins>
            </td>
            <td className="figure">−3.60</td>
            <td className="figure">7.8</td>
          </tr>
          <RowUnder columns={7} marked>
            <Finding finding={closure} suggestionAction={() => <Button kind="text">return with this repair</Button>}>
              <Button kind="text">Set the finding aside, with a reason</Button>
              <Button kind="text">Comment</Button>
            </Finding>
          </RowUnder>
          <tr>
            <MarginMark kind="look" />
            <th scope="row">
              <SpeciesName speciesKey="ZnO(cr)" to={paths.specimens()} />
            </th>
            <td>
              <Symbol of="ΔfH°" />
            </td>
            <td className="figure">
              <del>
                <Figures {...value("-350.46", "0.27")} />
              </del>
            </td>
            <td className="figure">
              <ins>
                <Figures {...value("-350.1", "0.5")} />
              </ins>
            </td>
            <td className="figure">+0.36</td>
            <td className="figure">0.6</td>
          </tr>
          <RowUnder columns={7} marked>
            <Finding
              finding={{
                check: "precision",
                severity: "look",
                sentence:
                  "Fewer digits and a wider uncertainty than what stands. It agrees with it (E_n 0.6): is it meant to replace it?",
                arithmetic: [],
                suggestions: [],
              }}
            />
          </RowUnder>
          <tr>
            <MarginMark />
            <th scope="row">
              <SpeciesName speciesKey="CaO(cr)" to={paths.specimens()} />
            </th>
            <td>
              <Symbol of="ΔfH°" />
            </td>
            <td className="figure">
              <del>
                <Figures {...value("-634.92", "0.90")} />
              </del>
            </td>
            <td className="figure">
              <ins>
                <Figures {...value("-635.1", "0.4")} />
              </ins>
            </td>
            <td className="figure">−0.18</td>
            <td className="figure">0.2</td>
          </tr>
          <tr>
            <MarginMark kind="remark" />
            <th scope="row">
              <SpeciesName speciesKey="CuO(cr)" to={paths.specimens()} />
            </th>
            <td>
              <Symbol of="ΔfH°" />
            </td>
            <ValueCell value={null} none="new" />
            <td className="figure">
              <ins>
                <Figures {...value("-157.3", "0.4")} />
              </ins>
            </td>
            <td />
            <td />
          </tr>
          <tr>
            <MarginMark kind="clean" word="accepted" />
            <th scope="row">
              <SpeciesName speciesKey="MgO(cr)" to={paths.specimens()} />
            </th>
            <td>
              <Symbol of="ΔfH°" />
            </td>
            <td className="figure">
              <del>
                <Figures {...value("-601.60", "0.30")} />
              </del>
            </td>
            <td className="figure">
              <ins>
                <Figures {...value("-601.5", "0.3")} />
              </ins>
            </td>
            <td className="figure">+0.10</td>
            <td className="figure">0.2</td>
          </tr>
        </tbody>
      </Table>
    </Section>
  );
}

function SheetSpecimen() {
  return (
    <Section head="Rows of a sheet">
      <Progress done={301} of={418} label="Rows read">
        301 of 418 read · 289 lines built · 9 refused · 3 skipped: headings
      </Progress>
      <Table caption="Rows with a cell that is wrong" marked className="mt-4">
        <thead>
          <tr>
            <MarginHead />
            <th scope="col" className="figure">
              Row
            </th>
            <th scope="col">Formula</th>
            <th scope="col">Phase</th>
            <th scope="col" className="figure">
              dHf (kcal)
            </th>
            <th scope="col" className="figure">
              S
            </th>
            <th scope="col">What is wrong</th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <MarginMark kind="block" />
            <th scope="row" className="figure">
              14
            </th>
            <td>H2O</td>
            <td>l</td>
            <td className="figure">−68,315</td>
            <td className="figure">
              <InlineField label="Row 14, column S" wrong figure defaultValue="−16,72" />
            </td>
            <td className="wide">
              The entropy of a substance cannot be negative. Did the sign come from the next column?
            </td>
          </tr>
          <tr>
            <MarginMark kind="block" />
            <th scope="row" className="figure">
              37
            </th>
            <td>
              <InlineField label="Row 37, column Formula" wrong defaultValue="SO42-" size={8} />
            </td>
            <td>aq</td>
            <td className="figure">−217,34</td>
            <td className="figure">4,42</td>
            <td className="wide">
              Two readings: <Formula printed="SO4-2" /> or <Formula printed="SO42-" />.{" "}
              <Button kind="text">
                Take <Formula printed="SO4-2" />
              </Button>
            </td>
          </tr>
        </tbody>
      </Table>
    </Section>
  );
}

function DrawingSpecimens() {
  return (
    <>
      <Columns>
        <Section head="Does it close?">
          <ClosurePlot
            follows={-16.41}
            stated={-16.38}
            tolerance={0.46}
            verdict="closes"
            printed={{
              follows: "−16.41",
              stated: "−16.38",
              low: "−16.87",
              high: "−15.95",
              gap: "0.03",
              tolerance: "0.46",
            }}
          />
          <p className="lede">
            <Prose text="The stated ΔfG° lies 0.03 kJ/mol from what ΔfH° and S° require; the tolerance is 0.46 kJ/mol." />
          </p>
        </Section>
        <Section
          head={
            <>
              <Symbol of="ΔfH°" /> through the editions
            </>
          }
        >
          <HistoryPlot
            what="ΔfH° of NH3(g) in kJ/mol"
            newest={7}
            decimals={2}
            points={[
              { since: 1, until: 4, value: -46.11, expanded: 0.45 },
              { since: 4, until: null, value: -45.94, expanded: 0.35 },
            ]}
          />
        </Section>
        <Section head="Off by a little">
          <ClosurePlot
            follows={-20.01}
            stated={-19.2}
            tolerance={0.46}
            verdict="look"
            printed={{
              follows: "−20.01",
              stated: "−19.20",
              low: "−20.47",
              high: "−19.55",
              gap: "0.81",
              tolerance: "0.46",
            }}
          />
        </Section>
        <Section head="Off by much">
          <ClosurePlot
            follows={-20.01}
            stated={-16.41}
            tolerance={0.46}
            verdict="block"
            printed={{
              follows: "−20.01",
              stated: "−16.41",
              low: "−20.47",
              high: "−19.55",
              gap: "3.60",
              tolerance: "0.46",
            }}
          />
        </Section>
      </Columns>
      <Section head="Differences">
        <DifferencePlot
          caption="Differences in ΔfH° between editions 6 and 7"
          head={<QuantityHead property="enthalpyOfFormation" />}
          differences={[
            { speciesKey: "NH3(g)", difference: -0.17, printed: "−0.17", expanded: 0.47 },
            { speciesKey: "CaO(cr)", difference: -0.18, printed: "−0.18", expanded: 0.98 },
            { speciesKey: "ZnO(cr)", difference: 0.36, printed: "+0.36", expanded: 0.57 },
            { speciesKey: "HS-(aq)", difference: 1.1, printed: "+1.1", expanded: 1.75 },
            { speciesKey: "Al+3(aq)", difference: -2.4, printed: "−2.4", expanded: 1.92 },
            { speciesKey: "CuO(cr)", difference: 0.9, printed: "+0.9", expanded: null },
          ]}
        />
      </Section>
    </>
  );
}

function FormSpecimens({ withErrors }: { withErrors: boolean }) {
  const [pending, setPending] = useState(false);
  const wrongField = plainField("email", {
    errors: ["Write the address with an @, as in r.reviewer@calderpoint.example."],
    initialValue: "r.reviewer",
  });
  return (
    <Section head="Forms">
      <Form method="get">
        {withErrors && <FormErrors errors={["The form was not sent."]} fields={[[wrongField, "Email"]]} />}
        <Field field={wrongField} label="Email" type="email" autoComplete="email" />
        <Field
          field={plainField("title", { required: true })}
          label="Title"
          hint="What the sheet holds, in a few words."
        />
        <Select
          field={plainField("kind")}
          label="Kind of source"
          options={[
            ["measurement", "measurement"],
            ["evaluation", "evaluation"],
          ]}
        />
        <TextArea field={plainField("reason", { required: false })} label="Reason" hint="The steward reads it." />
        <Check field={plainField("agree")} label="The figures were compared with the printed page." />
        <div className="actions">
          <Button kind="main" type="button" pending={pending} pendingLabel="Sending…" onClick={() => setPending(true)}>
            Send to review
          </Button>
          <Button type="button">Save draft</Button>
          <Button kind="quiet" type="button">
            Discard
          </Button>
          <Button type="button" disabled>
            Publish edition 8
          </Button>
          <ButtonLink to={paths.specimens()}>A way on</ButtonLink>
        </div>
      </Form>
    </Section>
  );
}

function SmallPieces() {
  return (
    <Section head="Small pieces">
      <p className="flex flex-wrap gap-x-4">
        {["SO4-2", "Fe+3", "Na+", "CuSO4·5H2O", "CdSO4·8/3H2O", "Fe0.947O", "Al(OH)4-", "e-"].map((printed) => (
          <Formula key={printed} printed={printed} />
        ))}
      </p>
      <p className="flex flex-wrap gap-x-4">
        {["ΔfH°", "ΔfG°", "S°", "Cp°", "H°(T)−H°(0)", "E_n", "log10K", "ΔrH°"].map((symbol) => (
          <Symbol key={symbol} of={symbol} />
        ))}
        {["kJ/mol", "J/(mol K)", "kcal/mol", "cal/(mol K)", "g/mol"].map((unit) => (
          <UnitText key={unit} unit={unit} />
        ))}
      </p>
      <p>
        <Prose text="N2(g) + 3 H2(g) → 2 NH3(g), ΔrG° -32.8 kJ/mol, log10 K 5.75; |r| ≤ t; SO4-2(aq) in J/(mol K); kJ·mol⁻¹" />{" "}
        <Arrow /> <Equilibrium />
      </p>
      <p>
        <Figures {...value("-12345678.9")} /> · <Figures {...value("3.25")} sign="plus" /> ·{" "}
        <Figures {...value("0.00")} sign="plus" /> · <Figures {...value("-237.14", undefined, true)} />
      </p>
      <p>
        <InlineMark kind="block">3 block</InlineMark> <InlineMark kind="look">22 to look at</InlineMark>{" "}
        <InlineMark kind="remark">1 remark</InlineMark> <InlineMark kind="clean">all clean</InlineMark>
      </p>
      <p>
        <Time at="2026-03-12T14:05:00Z" /> · <Time at="2026-03-12T14:05:00Z" withTime />
      </p>
      <p className="flex gap-2">
        <Bookmark kind="newest" label="Edition" mark={7} />
        <Bookmark kind="older" label="Edition" mark={5} />
        <Bookmark {...draftBookmark(7)} />
        <Bookmark kind="sheet" label="Sheet" mark={21} />
        <Bookmark kind="plain" label="Editions" mark="6·7" />
      </p>
      <Notice
        word="retracted"
        text="The source was retracted by its authors on 3 May 2025; 2 values of the table rest on it."
      />
      <EmptyPage
        start={
          <ButtonLink kind="main" to={paths.newSheet()}>
            Bring a sheet
          </ButtonLink>
        }
      >
        No sheet has been received yet. A sheet is a CSV file with one species a row.
      </EmptyPage>
    </Section>
  );
}
