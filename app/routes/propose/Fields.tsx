import { useState } from "react";
import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { ANSWER, answerTo, NEW_SOURCE, TAKES_ALL, takesField, valueField } from "#app/review/proposal.ts";
import type { ProposeChoices } from "#app/review/proposePage.server.ts";
import { showDigits } from "#app/thermo/notation.ts";
import { readDigits } from "#app/thermo/digits.ts";
import { type Property, propertyInfo } from "#app/thermo/property.ts";
import { Field, FieldError, Select, TextArea } from "#app/ui/Field.tsx";
import { Note } from "#app/ui/Note.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { describedFields, SourceFields } from "../source/SourceFields.tsx";
import type { FormState } from "./form.ts";

/** What stands in a value's place, as its row says it. */
export interface StandingPlace {
  property: Property;
  figure: React.ComponentProps<typeof Figures> | null;
  waitsIn: number | null;
  source: string | null;
  withdrawn: boolean;
}

/** What stands, in words behind the property's name. */
export function Stands({ place }: { place: StandingPlace }) {
  if (place.withdrawn) {
    return (
      <span className="text-soft">
        its withdrawal waits in <Link to={paths.revision(place.waitsIn ?? "")}>revision {place.waitsIn}</Link>
      </span>
    );
  }
  if (!place.figure) return <span className="text-soft">nothing stands</span>;
  return (
    <span className="text-soft">
      {place.waitsIn === null ? "stands " : "waits "}
      <Figures {...place.figure} />
      {place.waitsIn !== null && (
        <>
          {" in "}
          <Link to={paths.revision(place.waitsIn)}>revision {place.waitsIn}</Link>
        </>
      )}
      {place.source && `, ${place.source}`}
    </span>
  );
}

/** One value: number, unit, uncertainty. An entry with two readings is asked about with both. */
export function ValueRow({
  form,
  property,
  place,
  initial = {},
}: {
  form: FormState;
  property: Property;
  place?: StandingPlace | undefined;
  /** What stands in the fields before anything was sent. */
  initial?: Readonly<Record<string, string>>;
}) {
  const { symbol, name, unit } = propertyInfo[property];
  const value = form.field(valueField(property, "value"), initial[valueField(property, "value")]);
  const units = form.field(valueField(property, "unit"), initial[valueField(property, "unit")] ?? unit);
  const uncertainty = form.field(valueField(property, "uncertainty"), initial[valueField(property, "uncertainty")]);
  return (
    <fieldset className="border-t border-rule pt-3">
      <legend className="contents">
        <span className="mb-2 block">
          <b>
            <Symbol of={symbol} />
          </b>{" "}
          {name.replace(/^standard /, "")} {place && <Stands place={place} />}
        </span>
      </legend>
      <div className="grid grid-cols-2 items-start gap-x-6 sm:grid-cols-[minmax(0,2fr)_minmax(0,1fr)_minmax(0,1fr)]">
        <div className="col-span-2 sm:col-span-1">
          <Field field={value} label="Value" autoComplete="off" />
          <Readings form={form} field={value.name} />
        </div>
        <Field field={units} label="Unit" autoComplete="off" />
        <div>
          <Field field={uncertainty} label="Uncertainty" autoComplete="off" />
          <Readings form={form} field={uncertainty.name} />
        </div>
      </div>
    </fieldset>
  );
}

/** The readings of an ambiguous entry, one to be chosen; for numbers as they are printed. */
export function Readings({ form, field }: { form: FormState; field: string }) {
  const readings = form.reply?.readings[field];
  if (!readings) return null;
  return (
    <fieldset className="-mt-3 mb-4">
      <legend className="said">Which reading of it is meant</legend>
      {readings.map((reading) => {
        const figure = readDigits(reading);
        return (
          <label key={reading} className="flex items-baseline gap-2.5">
            <input className="check" type="radio" name={`${field}Is`} value={reading} />
            <span>{figure ? showDigits(figure) : <Prose text={reading} />}</span>
          </label>
        );
      })}
    </fieldset>
  );
}

const KINDS = [
  ["none", "none stated"],
  ["standard", "standard (k = 1)"],
  ["expanded", "expanded, with its k"],
  ["unstated", "the source does not say which"],
  ["exact", "exact by convention"],
] as const;

const PRESSURE_OPTIONS = [
  ["100000", "100 kPa (1 bar)"],
  ["101325", "101.325 kPa (1 atm), to be converted"],
] as const;

const BASIS_OPTIONS = [
  ["", "the source does not say"],
  ["molality", "1 mol/kg"],
  ["concentration", "1 mol/L"],
] as const;

/** What holds for every value of the form: kind of uncertainty, standard state, how it was obtained. */
export function ConditionFields({
  form,
  solute,
  initial = {},
}: {
  form: FormState;
  solute: boolean;
  initial?: Readonly<Record<string, string>>;
}) {
  const kind = form.field("kind", initial["kind"] ?? "none");
  const k = form.field("k", initial["k"], false);
  return (
    <>
      <div className="grid items-start gap-x-6 sm:grid-cols-2">
        <Select field={kind} label="Kind of the uncertainty" hint="Brackets are always standard." options={KINDS} />
        <Field field={k} label="Coverage factor k" hint="Of an expanded uncertainty; 2 where none is given." />
        <Select
          field={form.field("pressure", "100000")}
          label="Standard pressure"
          hint="The temperature is 298.15 K."
          options={PRESSURE_OPTIONS}
        />
        {solute && (
          <Select
            field={form.field("basis", initial["basis"])}
            label="Standard state of the solute"
            hint="Of the hypothetical ideal solution."
            options={BASIS_OPTIONS}
          />
        )}
      </div>
      <Field
        field={form.field("method", initial["method"], false)}
        label="How it was obtained"
        hint="Such as flow calorimetry, or third-law integration."
      />
      <Field
        field={form.field("remark", initial["remark"], false)}
        label="Remark of the source"
        hint="What its compilers say of the value, such as that a constraint was relaxed. The checks heed it."
      />
    </>
  );
}

/** Where the values come from: a source of the table, or one described here. */
export function SourceChoice({ form, sources }: { form: FormState; sources: ProposeChoices["sources"] }) {
  const choice = form.field("source");
  const [chosen, setChosen] = useState(typeof choice.initialValue === "string" ? choice.initialValue : "");
  const described = describedFields(
    (name) => form.typed(`source.${name}`) ?? "",
    (name) => [...(form.reply?.errors[`source.${name}`] ?? [])],
    "source.",
  );
  return (
    <>
      <Select
        field={choice}
        label="Source"
        options={[
          ["", "say where it comes from"],
          [NEW_SOURCE, "a new source, described below"],
          ...sources.map(
            ({ id, name, proposed }) =>
              [id, proposed === null ? name : `${name} (proposed in revision ${proposed})`] as const,
          ),
        ]}
        onChange={(event) => setChosen(event.currentTarget.value)}
      />
      <details className="disclosure mb-4" open={chosen === NEW_SOURCE}>
        <summary>Describe a new source</summary>
        <div className="mt-3">
          <SourceFields fields={described} />
        </div>
      </details>
    </>
  );
}

/** Why, and which draft the lines go into. */
export function DraftFields({
  form,
  drafts,
  title,
  revision,
}: {
  form: FormState;
  drafts: ProposeChoices["drafts"];
  /** What a new draft would be called. */
  title: string;
  /** The draft that the address names. */
  revision: number | null;
}) {
  const choice = form.field("revision", revision === null ? "" : String(revision));
  const [chosen, setChosen] = useState(typeof choice.initialValue === "string" ? choice.initialValue : "");
  return (
    <>
      <TextArea
        field={form.field("reason")}
        label="Reason"
        hint="What was measured, corrected or found wrong. The reviewer reads it beside the change."
        rows={2}
      />
      <div className="grid items-start gap-x-6 sm:grid-cols-2">
        <Select
          field={choice}
          label="Goes into"
          options={[
            ["", "a new draft"],
            ...drafts.map(({ id, title: called }) => [String(id), `revision ${id}: ${called}`] as const),
          ]}
          onChange={(event) => setChosen(event.currentTarget.value)}
        />
        <div hidden={chosen !== ""}>
          <Field field={form.field("title", title)} label="Title of the new draft" autoComplete="off" />
        </div>
      </div>
    </>
  );
}

/** What must be answered before the lines are written: species this one may be, names that another one carries. */
export function Questions({ form, edition }: { form: FormState; edition: number }) {
  const questions = form.reply?.questions;
  const field = form.field(ANSWER);
  if (!questions) return null;
  const { matches, sentences } = questions;
  return (
    <Note kind="look" word="question">
      {matches.length > 0 && (
        <>
          <p>
            {matches.length === 1
              ? "One species of the same composition, charge and phase is there already:"
              : `${matches.length} species of the same composition, charge and phase are there already:`}
          </p>
          <ul className="my-1 list-disc pl-5">
            {matches.map(({ key, name, cas, revisionId }) => (
              <li key={key}>
                <SpeciesName
                  speciesKey={key}
                  to={revisionId === null ? paths.species(edition, key) : paths.revision(revisionId)}
                />
                {name && ` ${name}`}
                {cas && `, CAS ${cas}`}
                {revisionId !== null && `, proposed in revision ${revisionId}`}
                {" · "}
                <Link to={paths.propose({ species: key, what: "values" })}>propose a value of this one</Link>
              </li>
            ))}
          </ul>
        </>
      )}
      {sentences.map((sentence) => (
        <p key={sentence}>
          <Prose text={sentence} />
        </p>
      ))}
      <label className="mt-2 flex items-start gap-2.5">
        <input
          className="check"
          type="checkbox"
          id={field.id}
          name={ANSWER}
          value={answerTo(questions)}
          defaultChecked={form.typed(ANSWER) === answerTo(questions)}
          aria-describedby={field.errors ? field.errorId : undefined}
        />
        <span>
          {matches.length > 0 ? "This is another substance than these." : "I have looked: propose it all the same."}
        </span>
      </label>
      <FieldError field={field} />
    </Note>
  );
}

/** The values that stand or wait, each with a box to tick. */
export function TakenValues({
  form,
  places,
  ticked,
}: {
  form: FormState;
  places: readonly StandingPlace[];
  /** Whether the boxes start ticked. */
  ticked: boolean;
}) {
  const standing = places.filter((place) => place.figure !== null);
  const field = form.field("takes");
  return (
    <fieldset id="takes" className="mb-4" aria-describedby={field.errors ? field.errorId : undefined}>
      <legend className="said">Values</legend>
      {standing.length === 0 && <p>Nothing stands here.</p>}
      {standing.map((place) => (
        <label key={place.property} className="my-1 flex items-start gap-2.5">
          <input
            className="check"
            type="checkbox"
            name={takesField(place.property)}
            value="on"
            defaultChecked={form.reply ? form.typed(takesField(place.property)) === "on" : ticked}
          />
          <span>
            <Symbol of={propertyInfo[place.property].symbol} /> {place.figure && <Figures {...place.figure} />}{" "}
            <UnitText unit={propertyInfo[place.property].unit} />
            {place.source && <span className="text-soft">, {place.source}</span>}
            {place.waitsIn !== null && <span className="text-soft">, waits in revision {place.waitsIn}</span>}
          </span>
        </label>
      ))}
      {!ticked && standing.length > 1 && (
        <label className="my-1 flex items-start gap-2.5">
          <input
            className="check"
            type="checkbox"
            name={TAKES_ALL}
            value="on"
            defaultChecked={form.typed(TAKES_ALL) === "on"}
          />
          <span>all of them, the whole species</span>
        </label>
      )}
      <FieldError field={field} />
    </fieldset>
  );
}

/** Formula, phase and label of a species, as a person types them. */
export function IdentityFields({ form }: { form: FormState }) {
  return (
    <div className="grid items-start gap-x-6 sm:grid-cols-[minmax(0,2fr)_minmax(0,1fr)_minmax(0,1.5fr)]">
      <div>
        <Field
          field={form.field("formula")}
          label="Formula"
          hint="C2H6O, SO4-2, or a whole key: H2O(l)."
          autoComplete="off"
        />
        <Readings form={form} field="formula" />
      </div>
      <Field field={form.field("phase")} label="Phase" hint="g, l, cr, am, vit, aq." autoComplete="off" />
      <Field
        field={form.field("label", "", false)}
        label="Form or isomer"
        hint="Such as graphite, or ethanol."
        autoComplete="off"
      />
    </div>
  );
}

/** Name, CAS number, InChIKey and synonyms. */
export function NameFields({ form, stands }: { form: FormState; stands: Readonly<Record<string, string>> }) {
  return (
    <div className="grid items-start gap-x-6 sm:grid-cols-2">
      <Field
        field={form.field("name", stands["name"], false)}
        label="Name"
        hint="As the trade calls it."
        autoComplete="off"
      />
      <Field
        field={form.field("cas", stands["cas"], false)}
        label="CAS number"
        hint="Its last digit is checked: 7732-18-5."
        autoComplete="off"
      />
      <Field
        field={form.field("inchikey", stands["inchikey"], false)}
        label="InChIKey"
        hint="Three groups of capital letters."
        autoComplete="off"
      />
      <TextArea
        field={form.field("synonyms", stands["synonyms"], false)}
        label="Synonyms"
        hint="One a line."
        rows={2}
      />
    </div>
  );
}
