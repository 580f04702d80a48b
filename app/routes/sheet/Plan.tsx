import { useState } from "react";
import { Form } from "react-router";
import {
  KEY_SOURCE_FIELDS,
  keyField,
  meaningValue,
  meansField,
  MEANING_OPTIONS,
  NEW_SOURCE,
  SETTING_OPTIONS,
  takesUnit,
  UNIT_OPTIONS,
  unitField,
} from "#app/intake/planChoices.ts";
import type { SheetPage } from "#app/intake/sheetPage.server.ts";
import { meaningWords } from "#app/intake/meaning.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { Button, usePending } from "#app/ui/Button.tsx";
import { DecisionBar } from "#app/ui/DecisionBar.tsx";
import { Field, InlineSelect, Select } from "#app/ui/Field.tsx";
import { type FieldState, plainField } from "#app/ui/fieldState.ts";
import { FormErrors } from "#app/ui/FormErrors.tsx";
import { MarginHead, MarginMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Columns, Fine, Section } from "#app/ui/Section.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { Table } from "#app/ui/Table.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { describedFields, type DescribedField, SourceFields } from "../source/SourceFields.tsx";
import type { SheetOutcome } from "./outcome.ts";
import { SheetText } from "./SheetText.tsx";

type Column = SheetPage["columns"][number];

/** Meanings of a sheet that says what species are called. */
const NAMING: ReadonlySet<string> = new Set(["name", "cas", "synonyms"]);

/** What the columns hold, to be confirmed: one choice a column, what holds for the whole sheet, and the source. */
export function PlanForm({ page, failed }: { page: SheetPage; failed: SheetOutcome | undefined }) {
  const typed = failed?.typed;
  const errorsAt = (pointer: string): string[] =>
    (failed?.errors ?? []).filter((error) => error.pointer === pointer).map((error) => error.detail);
  const columnErrors = page.columns.map((_, index) => errorsAt(`/columns/${index}`));
  const settings = settingFields(page, typed, errorsAt);
  const [meanings, setMeanings] = useState(
    page.columns.map((column, index) => typed?.[meansField(index)] ?? meaningValue(column)),
  );
  const keyColumn = meanings.indexOf("sourceKey");
  // What is asked of values is not asked of a sheet that only says what species are called.
  const valued = meanings.some(takesUnit) || !meanings.some((meaning) => NAMING.has(meaning));
  const source = sourceFields(page, typed, errorsAt);
  const keys = keyColumn === -1 ? [] : keyFields(page, keyColumn, typed, errorsAt);
  const pending = usePending("intent", "confirm");

  return (
    <Form method="post">
      <FormErrors
        errors={[...errorsAt("/columns"), ...(failed && failed.errors.length === 0 ? [failed.sentence] : [])]}
        fields={[
          ...page.columns.map(
            (column, index) =>
              [plainField(meansField(index), { errors: columnErrors[index] ?? [] }), column.name] as const,
          ),
          ...(valued ? settings : []).map(({ field, label }) => [field, label] as const),
          ...keys.map(({ key, choice }) => [choice, `Source of ${key}`] as const),
          ...keys.flatMap(({ described }) => described.map(({ field, label }) => [field, label] as const)),
          [source.choice, keyColumn === -1 ? "Source" : "Source of rows without a key"],
          ...source.described.map(({ field, label }) => [field, label] as const),
        ]}
      />
      <Table caption="What each column holds" marked even>
        <thead>
          <tr>
            <MarginHead />
            <th scope="col">Head in the sheet</th>
            <th scope="col">First values</th>
            <th scope="col">Means</th>
            <th scope="col">In</th>
            <th scope="col">Because</th>
          </tr>
        </thead>
        <tbody>
          {page.columns.map((column, index) => (
            <PlanRow
              key={index}
              column={column}
              index={index}
              errors={columnErrors[index] ?? []}
              typed={typed}
              onMeaning={(meaning) => setMeanings((now) => now.map((one, at) => (at === index ? meaning : one)))}
            />
          ))}
        </tbody>
      </Table>
      {page.notices.map((notice) => (
        <Fine key={notice}>
          <Prose text={notice} />
        </Fine>
      ))}
      {valued ? (
        <Columns>
          <Section head="The whole sheet">
            {settings.map(({ field, label, hint, options }) =>
              options ? (
                <Select key={field.name} field={field} label={label} options={options} hint={hint} />
              ) : (
                <Field key={field.name} field={field} label={label} hint={hint} />
              ),
            )}
          </Section>
          <Section head="Where the values come from">
            {keys.length > 0 && (
              <>
                <p className="mb-4">
                  Each row names its source in the column “
                  <SheetText text={page.columns[keyColumn]?.name ?? ""} />
                  ”. The rows of a key without an answer are refused.
                </p>
                {keys.map((key) => (
                  <KeyAnswer
                    key={`${keyColumn} ${key.key}`}
                    name={key.key}
                    choice={key.choice}
                    described={key.described}
                    options={source.options}
                  />
                ))}
              </>
            )}
            <SourceChoiceFields {...source} byKey={keys.length > 0} />
          </Section>
        </Columns>
      ) : (
        <Fine>
          No column holds values, so nothing more is asked: names, CAS numbers and synonyms become lines of what species
          are called.
        </Fine>
      )}
      <DecisionBar label="Confirm" end="nothing enters the table before it was reviewed">
        <Button kind="main" name="intent" value="confirm" pending={pending} pendingLabel="Confirming…">
          Read the rows
        </Button>
      </DecisionBar>
    </Form>
  );
}

function PlanRow({
  column,
  index,
  errors,
  typed,
  onMeaning,
}: {
  column: Column;
  index: number;
  errors: readonly string[];
  typed: SheetOutcome["typed"] | undefined;
  onMeaning: (meaning: string) => void;
}) {
  const [meaning, setMeaning] = useState(typed?.[meansField(index)] ?? meaningValue(column));
  const wrong = errors.length > 0;
  return (
    <tr>
      <MarginMark kind={wrong ? "block" : column.asks ? "look" : null} />
      <th scope="row" className={column.head === "" ? "text-soft" : undefined}>
        <SheetText text={column.name} />
      </th>
      <td>
        <Sample values={column.sample} />
      </td>
      <td>
        <InlineSelect
          id={meansField(index)}
          name={meansField(index)}
          label={`What ${column.name} holds`}
          options={MEANING_OPTIONS}
          defaultValue={meaning}
          onChange={(event) => {
            setMeaning(event.currentTarget.value);
            onMeaning(event.currentTarget.value);
          }}
          wrong={wrong}
          aria-describedby={`because-${index}`}
        />
      </td>
      <td>
        {takesUnit(meaning) && (
          <InlineSelect
            name={unitField(index)}
            label={`Unit of ${column.name}`}
            options={UNIT_OPTIONS}
            defaultValue={typed?.[unitField(index)] ?? column.unit ?? ""}
            wrong={wrong}
          />
        )}
      </td>
      <td className="min-w-[16rem]" id={`because-${index}`}>
        {wrong ? (
          <span className="is-block">
            <Prose text={errors.join(" ")} />
          </span>
        ) : (
          <span className={column.asks ? "is-look" : "text-soft"}>
            <Prose text={column.because} />
          </span>
        )}
      </td>
    </tr>
  );
}

function Sample({ values }: { values: readonly string[] }) {
  if (values.length === 0) return <span className="text-soft">empty</span>;
  return values.map((value, index) => (
    <span key={index}>
      {index > 0 && " · "}
      <SheetText text={value} />
    </span>
  ));
}

interface LabelledField {
  field: FieldState;
  label: string;
  hint?: string;
  options?: readonly (readonly [string, string])[];
}

function settingFields(
  page: SheetPage,
  typed: SheetOutcome["typed"] | undefined,
  errorsAt: (pointer: string) => string[],
): LabelledField[] {
  const { settings } = page;
  const field = (name: keyof typeof settings, stored: string): FieldState =>
    plainField(name, { initialValue: typed?.[name] ?? stored, errors: errorsAt(`/settings/${name}`) });
  return [
    {
      field: field("temperature", settings.temperature ?? ""),
      label: "Temperature of the values",
      options: SETTING_OPTIONS.temperature,
    },
    {
      field: field("standardPressure", settings.standardPressure ?? ""),
      label: "Standard pressure",
      options: SETTING_OPTIONS.standardPressure,
      hint: "Tables from before 1982 mostly use 1 atm. S° of gases and ΔfG° are then brought to 1 bar, each with the step beside it.",
    },
    {
      field: field("uncertaintyKind", settings.uncertaintyKind ?? ""),
      label: "Kind of the uncertainties",
      options: SETTING_OPTIONS.uncertaintyKind,
      hint: "Of the uncertainty columns and of what stands behind ±. Brackets are always standard.",
    },
    {
      field: field("basis", settings.basis ?? ""),
      label: "Standard state of solutes",
      options: SETTING_OPTIONS.basis,
    },
    {
      field: field("decimalComma", settings.decimalComma ? "on" : ""),
      label: "Decimal sign",
      options: SETTING_OPTIONS.decimalComma,
    },
    ...(page.bareSolid
      ? [
          {
            field: field("solidIs", settings.solidIs),
            label: "What s means as a phase",
            options: SETTING_OPTIONS.solidIs,
          },
        ]
      : []),
    {
      field: field("method", settings.method ?? ""),
      label: "How they were obtained (may stay empty)",
      hint: "Such as flow calorimetry, or third-law integration.",
    },
  ];
}

interface SourceState {
  choice: FieldState;
  options: readonly (readonly [string, string])[];
  described: DescribedField[];
}

function sourceFields(
  page: SheetPage,
  typed: SheetOutcome["typed"] | undefined,
  errorsAt: (pointer: string) => string[],
): SourceState {
  const { chosenSource } = page;
  const whole = chosenSource?.kind === "byKey" ? chosenSource.otherwise : chosenSource;
  const before = whole?.kind === "new" ? whole.source : null;
  const chosen = whole?.kind === "known" ? whole.sourceId : whole ? NEW_SOURCE : "";
  return {
    choice: plainField("source", { initialValue: typed?.["source"] ?? chosen, errors: errorsAt("/source") }),
    options: [
      ["", "say where the values come from"],
      [NEW_SOURCE, "a new source, described here"],
      ...page.sources.map(
        ({ id, name, proposed }) =>
          [id, proposed === null ? name : `${name} (proposed in revision ${proposed})`] as const,
      ),
    ],
    described: describedFields(
      (name) => typed?.[`source.${name}`] ?? before?.[name] ?? "",
      (name) => errorsAt(`/source/${name}`),
      "source.",
    ),
  };
}

interface KeyState {
  key: string;
  choice: FieldState;
  described: DescribedField[];
}

/** The keys of the column with their answers: as typed, as confirmed before, or guessed from the known sources. */
function keyFields(
  page: SheetPage,
  column: number,
  typed: SheetOutcome["typed"] | undefined,
  errorsAt: (pointer: string) => string[],
): KeyState[] {
  const { chosenSource } = page;
  return (page.columns[column]?.keys ?? []).map(({ key, guess }, index) => {
    const name = keyField(index);
    const before =
      chosenSource?.kind === "byKey" ? chosenSource.keys.find((one) => one.key === key)?.choice : undefined;
    const described = before?.kind === "new" ? before.source : null;
    const chosen =
      before === undefined ? (guess ?? "") : before === null ? "" : described ? NEW_SOURCE : knownId(before);
    return {
      key,
      choice: plainField(name, { initialValue: typed?.[name] ?? chosen, errors: errorsAt(`/keys/${index}`) }),
      described: describedFields(
        (field) => typed?.[`${name}.${field}`] ?? described?.[field] ?? "",
        (field) => errorsAt(`/keys/${index}/${field}`),
        `${name}.`,
      ).filter((one) => KEY_SOURCE_FIELDS.has(one.name)),
    };
  });
}

const knownId = (choice: { kind: string; sourceId?: string }): string => choice.sourceId ?? "";

/** What one key stands for. The description of a new source can be opened without scripts. */
function KeyAnswer({
  name,
  choice,
  described,
  options,
}: Omit<KeyState, "key"> & { name: string; options: SourceState["options"] }) {
  const [chosen, setChosen] = useState(typeof choice.initialValue === "string" ? choice.initialValue : "");
  const wrong = described.some(({ field }) => (field.errors ?? []).length > 0);
  return (
    <div className="mb-4">
      <Select
        field={choice}
        label={`Source of ${name}`}
        options={[["", "not answered: its rows are refused"], ...options.slice(1)]}
        onChange={(event) => setChosen(event.currentTarget.value)}
      />
      {(chosen === NEW_SOURCE || chosen === "") && (
        <details className="disclosure" open={chosen === NEW_SOURCE || wrong}>
          <summary>describe {name} as a new source</summary>
          <div className="mt-3" role="group" aria-label={`${name} as a new source`}>
            <SourceFields fields={described} />
          </div>
        </details>
      )}
    </div>
  );
}

/** The choice of a source. Its description is open from the start, so that it can be filled in without scripts. */
function SourceChoiceFields({ choice, options, described, byKey }: SourceState & { byKey: boolean }) {
  const [chosen, setChosen] = useState(typeof choice.initialValue === "string" ? choice.initialValue : "");
  return (
    <>
      <Select
        field={choice}
        label={byKey ? "Source of rows without a key (may stay empty)" : "Source"}
        options={byKey ? [["", "none: such rows are refused"], ...options.slice(1)] : options}
        onChange={(event) => setChosen(event.currentTarget.value)}
      />
      {(chosen === NEW_SOURCE || (chosen === "" && !byKey)) && (
        <fieldset className="mt-4">
          <legend className="mb-3 font-semibold">A new source</legend>
          <SourceFields fields={described} />
        </fieldset>
      )}
    </>
  );
}

/** The plan as it was confirmed, or as it was guessed to somebody who may only look. */
export function PlanShown({ page }: { page: SheetPage }) {
  const { sheet, settings } = page;
  return (
    <details className="disclosure" open={sheet.state === "planned"}>
      <summary>
        {page.columns.filter((column) => column.means !== "ignore").length} of {page.columns.length} columns are read
        {page.sourceName && `, as values of ${page.sourceName}`}
      </summary>
      <Table caption="What each column holds" even className="mt-3">
        <thead>
          <tr>
            <th scope="col">Head in the sheet</th>
            <th scope="col">First values</th>
            <th scope="col">Means</th>
            <th scope="col">In</th>
            <th scope="col">Because</th>
          </tr>
        </thead>
        <tbody>
          {page.columns.map((column, index) => (
            <tr key={index}>
              <th scope="row">
                <SheetText text={column.name} />
              </th>
              <td>
                <Sample values={column.sample} />
              </td>
              <td>
                <Meaning column={column} />
              </td>
              <td>{column.unit && <UnitText unit={column.unit} />}</td>
              <td className="text-soft">
                <Prose text={column.because} />
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      <Fine>
        {page.columns.some((column) => takesUnit(meaningValue(column))) ? (
          <Settings settings={settings} />
        ) : (
          "No values"
        )}
        {sheet.confirmedBy && `, confirmed by ${sheet.confirmedBy}`}.
      </Fine>
    </details>
  );
}

/** What was said of all values of the sheet, in a line. */
function Settings({ settings }: Pick<SheetPage, "settings">) {
  const { temperature, standardPressure, uncertaintyKind } = settings;
  const pressure =
    standardPressure === "100000" ? "100 kPa" : standardPressure ? "1 atm, brought to 100 kPa" : "pressure not said";
  const kinds = { expanded: "expanded with k = 2", standard: "standard", unstated: "of a kind not said" };
  return (
    <>
      {temperature ? `${temperature} K` : "temperature not said"}, {pressure}
      {uncertaintyKind && `, uncertainties ${kinds[uncertaintyKind]}`}
    </>
  );
}

function Meaning({ column }: { column: Column }) {
  if (column.property === null) return meaningWords[column.means];
  const symbol = <Symbol of={propertyInfo[column.property].symbol} />;
  return column.means === "uncertainty" ? <>uncertainty of {symbol}</> : symbol;
}
