import { randomUUID } from "node:crypto";
import { act, type ActScope } from "#app/audit/act.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import type { FieldError } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { newSourceId } from "#app/sources/newId.server.ts";
import { describedSource, readSourceForm } from "#app/sources/sourceForm.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { DOI_IS_KNOWN, holderOfDoi } from "#app/sources/twins.ts";
import { readIdentity } from "#app/species/identityForm.ts";
import { findCandidates, lockNaming, type SpeciesCandidate } from "#app/species/species.queries.server.ts";
import { type Property, PROPERTIES } from "#app/thermo/property.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { DetailContent, SourceContent } from "./content.ts";
import {
  ANSWER,
  answerTo,
  type FormQuestions,
  type FormTrouble,
  isTroubled,
  namesakeQuestions,
  NEW_SOURCE,
  noTrouble,
  readDetail,
  readNames,
  readValues,
  reasonOf,
  TAKES_ALL,
  takesField,
  type Typed,
  wrong,
} from "./proposal.ts";
import { findNamedSpeciesIds, findNamesakes, findProposedSourceIds } from "./propose.queries.server.ts";
import { insertProposal, type ProposedLine, type ProposedSpecies } from "./propose.server.ts";
import { findProposable, type ProposableSpecies } from "./proposePage.server.ts";

/** What came of a form: the revision its lines went into, or everything that keeps it from being done. */
export type ProposeOutcome =
  | { ok: true; revisionId: number }
  | {
      ok: false;
      errors: readonly FieldError[];
      readings: Readonly<Record<string, readonly string[]>>;
      questions: FormQuestions | null;
    };

/** A form that is held, with everything that keeps it. */
export function held(trouble: FormTrouble, questions: FormQuestions | null = null): ProposeOutcome {
  return { ok: false, errors: trouble.errors, readings: trouble.readings, questions };
}

// --- Where the lines go -------------------------------------------------------

interface Target {
  revisionId: number | null;
  title: string;
}

function targetOf(typed: Typed, trouble: FormTrouble): Target {
  const revision = typed("revision");
  if (revision !== "") {
    if (!/^[1-9]\d{0,8}$/.test(revision)) {
      wrong(trouble, "revision", "Choose a draft of the list, or a new one.");
      return { revisionId: null, title: "" };
    }
    return { revisionId: Number(revision), title: "" };
  }
  const title = typed("title").trim();
  if (title === "" || title.length > 200 || /\p{Cc}/u.test(title)) {
    wrong(trouble, "title", "Give the new draft a title of one line and at most 200 characters.");
  }
  return { revisionId: null, title };
}

// --- Sources ------------------------------------------------------------------

interface ChosenSource {
  id: string;
  /** The identity does not exist yet. */
  isNew: boolean;
  /** The line that proposes it, where the draft needs one. */
  line: ProposedLine | null;
}

/** The source that was chosen or described. One that only an open revision proposes is proposed here again. */
async function sourceOf(
  typed: Typed,
  revisionId: number | null,
  trouble: FormTrouble,
  trx: ActScope["trx"],
): Promise<ChosenSource | null> {
  const chosen = typed("source");
  if (chosen === "") {
    wrong(trouble, "source", "Say where it comes from.");
    return null;
  }
  const edition = (await findNewestEdition(trx))?.number ?? 0;
  const sources = await findChoosableSources(edition, trx);
  if (chosen === NEW_SOURCE) {
    const described = readSourceForm((field) => typed(`source.${field}`));
    if (!described.ok) {
      for (const { field, detail } of described.errors) wrong(trouble, `source.${field}`, detail);
      return null;
    }
    if (holderOfDoi(described.source.doi, sources)) {
      wrong(trouble, "source.doi", DOI_IS_KNOWN);
      return null;
    }
    const id = newSourceId();
    return { id, isNew: true, line: sourceLine(id, { kind: "source", ...describedSource(described.source) }) };
  }
  const known = sources.find((one) => one.sourceId === chosen);
  if (!known) {
    wrong(trouble, "source", "This source is not proposed any more. Choose another, or describe it anew.");
    return null;
  }
  const there = revisionId !== null && (await findProposedSourceIds(revisionId, trx)).has(chosen);
  const { citation, doi, kind, notice } = known;
  const line = sourceLine(chosen, { kind: "source", citation, doi, sourceKind: kind, notice });
  return { id: chosen, isNew: false, line: known.named || there ? null : line };
}

function sourceLine(sourceId: string, content: SourceContent): ProposedLine {
  return { kind: "source", speciesId: null, property: null, sourceId, content };
}

// --- What the person saw --------------------------------------------------------

/** The version that the form says stood or waited in a place; null for an empty one. */
function seenIn(typed: Typed, property: Property | null): string | null {
  const found = typed("seen")
    .split(" ")
    .map((part) => part.split(":"))
    .find(([place]) => place === (property ?? "detail"));
  return found?.[1] ?? null;
}

/** The line that names a species in this draft, where nothing else does so for sure. */
async function namingLine(
  species: ProposableSpecies,
  revisionId: number | null,
  trx: ActScope["trx"],
): Promise<ProposedLine[]> {
  if (species.named) return [];
  if (revisionId !== null && (await findNamedSpeciesIds(revisionId, trx)).has(species.id)) return [];
  return [detailLine(species.id, species.detail)];
}

function detailLine(speciesId: string, content: DetailContent): ProposedLine {
  return { kind: "detail", speciesId, property: null, sourceId: null, content };
}

// --- The acts -------------------------------------------------------------------

/** Proposes one or several values of a species, as the form says them. @throws whatever `proposeLines` throws */
export async function proposeValues(acting: Acting, key: string, typed: Typed): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  return act(acting, async (scope) => {
    const { trx } = scope;
    const species = await findProposable(key, trx);
    const trouble = noTrouble();
    const target = targetOf(typed, trouble);
    const values = readValues(typed, species.identity, trouble);
    if (values.length === 0 && !isTroubled(trouble)) {
      wrong(trouble, "enthalpyOfFormation.value", "Write at least one value.");
    }
    const source = await sourceOf(typed, target.revisionId, trouble, trx);
    const reason = reasonOf(typed, trouble);
    if (isTroubled(trouble) || !source) return held(trouble);
    const lines = values.map(({ property, content }): ProposedLine => ({
      kind: "value",
      speciesId: species.id,
      property,
      sourceId: null,
      content: { ...content, sourceId: source.id },
      reason,
      seen: seenIn(typed, property),
    }));
    const revisionId = await insertProposal(
      acting,
      {
        ...target,
        summary: reason,
        lines: [
          ...(source.line ? [source.line] : []),
          ...(await namingLine(species, target.revisionId, trx)),
          ...lines,
        ],
        newSources: source.isNew ? [source.id] : [],
      },
      scope,
    );
    return { ok: true, revisionId };
  });
}

/** Proposes to take values of a species out of the table. @throws whatever `proposeLines` throws */
export async function proposeWithdrawal(acting: Acting, key: string, typed: Typed): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  return act(acting, async (scope) => {
    const species = await findProposable(key, scope.trx);
    const trouble = noTrouble();
    const target = targetOf(typed, trouble);
    const properties = takenProperties(species, typed, trouble);
    const reason = reasonOf(typed, trouble);
    if (isTroubled(trouble)) return held(trouble);
    const lines = properties.map((property) => withdrawalLine(species.id, property, reason, typed));
    return {
      ok: true,
      revisionId: await insertProposal(acting, { ...target, summary: reason, lines }, scope),
    };
  });
}

/** The values ticked in a form, of those that stand or wait. */
function takenProperties(species: ProposableSpecies, typed: Typed, trouble: FormTrouble): Property[] {
  const properties = PROPERTIES.filter(
    (property) =>
      (typed(takesField(property)) === "on" || typed(TAKES_ALL) === "on") &&
      species.places.get(property)?.content.kind === "value",
  );
  if (properties.length === 0) wrong(trouble, "takes", "Tick at least one value.");
  return properties;
}

function withdrawalLine(speciesId: string, property: Property, reason: string, typed: Typed): ProposedLine {
  return {
    kind: "withdrawal",
    speciesId,
    property,
    sourceId: null,
    content: { kind: "withdrawal", reason },
    seen: seenIn(typed, property),
  };
}

/** Proposes what a species shall be called. @throws whatever `proposeLines` throws */
export async function proposeNames(acting: Acting, key: string, typed: Typed): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  return act(acting, async (scope) => {
    const species = await findProposable(key, scope.trx);
    const trouble = noTrouble();
    const target = targetOf(typed, trouble);
    const detail = readDetail(typed, species.identity, trouble);
    const reason = reasonOf(typed, trouble);
    const questions = isTroubled(trouble)
      ? null
      : await asksAboutNames(typed, detail, species.identity, species.id, species.detail, trouble, scope.trx);
    if (isTroubled(trouble)) return held(trouble, questions);
    const line: ProposedLine = { ...detailLine(species.id, detail), reason, seen: seenIn(typed, null) };
    return {
      ok: true,
      revisionId: await insertProposal(acting, { ...target, summary: reason, lines: [line] }, scope),
    };
  });
}

/** Asks about names and numbers that another species carries; only those that the proposal changes. */
export async function asksAboutNames(
  typed: Typed,
  detail: DetailContent,
  identity: SpeciesIdentity,
  speciesId: string | null,
  before: DetailContent | null,
  trouble: FormTrouble,
  trx: ActScope["trx"],
): Promise<FormQuestions | null> {
  const changed = {
    ...detail,
    cas: detail.cas === before?.cas ? null : detail.cas,
    inchikey: detail.inchikey === before?.inchikey ? null : detail.inchikey,
    name: detail.name === before?.name ? "" : detail.name,
  };
  const others = await findNamesakes({ ...changed, except: speciesId }, trx);
  return settle(typed, { matches: [], sentences: namesakeQuestions(changed, identity, others) }, trouble);
}

/** Whether the person has answered just these questions; if not, the form is held. */
function settle(typed: Typed, questions: FormQuestions, trouble: FormTrouble): FormQuestions | null {
  if (questions.matches.length === 0 && questions.sentences.length === 0) return null;
  if (typed(ANSWER) === answerTo(questions)) return questions;
  wrong(trouble, ANSWER, "Look at the question and answer it, then send the form again.");
  return questions;
}

/** A species as it was typed: one that the table or an open revision has already, or one that is new to both. */
interface TypedSpecies {
  identity: SpeciesIdentity;
  key: string;
  /** Those of the same composition, charge and phase. */
  matches: SpeciesCandidate[];
}

async function typedSpecies(typed: Typed, trouble: FormTrouble, trx: ActScope["trx"]): Promise<TypedSpecies | null> {
  const reading = readIdentity({
    formula: typed("formula"),
    phase: typed("phase"),
    label: typed("label"),
    formulaIs: typed("formulaIs"),
  });
  if (reading.outcome === "wrong") {
    for (const [field, detail] of Object.entries(reading.errors)) wrong(trouble, field, detail);
    if (reading.readings.length > 0) trouble.readings["formula"] = reading.readings;
    return null;
  }
  const { identity, key } = reading;
  const edition = (await findNewestEdition(trx))?.number ?? 0;
  const candidates = await findCandidates(edition, [identity.formula.hill], trx);
  const matches = candidates.filter((one) => one.charge === identity.formula.charge && one.phase === identity.phase);
  return { identity, key, matches };
}

/** Makes the identity and the naming line of a species new to the table, after what must be asked was answered. */
async function newSpecies(
  typed: Typed,
  { identity, key, matches }: TypedSpecies,
  trouble: FormTrouble,
  trx: ActScope["trx"],
): Promise<{ species: ProposedSpecies; line: ProposedLine; questions: FormQuestions | null }> {
  const { formula, phase, label } = identity;
  const detail: DetailContent = {
    kind: "detail",
    key,
    printed: formula.printed,
    label: label ?? null,
    ...readNames(typed, trouble),
  };
  const others = await findNamesakes({ ...detail, except: null }, trx);
  const questions = isTroubled(trouble)
    ? null
    : settle(
        typed,
        {
          matches: matches.map(({ key: called, name, cas, revisionId }) => ({ key: called, name, cas, revisionId })),
          sentences: namesakeQuestions(detail, identity, others),
        },
        trouble,
      );
  const id = `sp_${randomUUID().replaceAll("-", "")}`;
  return {
    species: { id, hill: formula.hill, composition: formula.composition, charge: formula.charge, phase },
    line: detailLine(id, detail),
    questions,
  };
}

/** Proposes a species that the table does not have, with the values that were filled in. */
export async function proposeSpecies(acting: Acting, typed: Typed): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  return act(acting, async (scope) => {
    const { trx } = scope;
    await lockNaming(trx);
    const trouble = noTrouble();
    const target = targetOf(typed, trouble);
    const read = await typedSpecies(typed, trouble, trx);
    const values = read ? readValues(typed, read.identity, trouble) : [];
    const source = values.length > 0 ? await sourceOf(typed, target.revisionId, trouble, trx) : null;
    const reason = reasonOf(typed, trouble);
    if (!read) return held(trouble);
    const same = read.matches.find((one) => one.key === read.key);
    if (same) {
      wrong(
        trouble,
        "formula",
        same.revisionId === null
          ? `${same.key} is in the table already. Propose its values on its own page, or name the form or isomer of this one.`
          : `${same.key} is proposed in revision ${same.revisionId} already. Add to it there, or name the form or isomer of this one.`,
      );
    }
    const made = await newSpecies(typed, read, trouble, trx);
    if (isTroubled(trouble)) return held(trouble, made.questions);
    const lines = values.map(({ property, content }): ProposedLine => ({
      kind: "value",
      speciesId: made.species.id,
      property,
      sourceId: null,
      content: { ...content, sourceId: source?.id ?? "" },
      reason,
    }));
    const revisionId = await insertProposal(
      acting,
      {
        ...target,
        summary: reason,
        lines: [...(source?.line ? [source.line] : []), { ...made.line, reason }, ...lines],
        newSpecies: [made.species],
        newSources: source?.isNew ? [source.id] : [],
      },
      scope,
    );
    return { ok: true, revisionId };
  });
}

/**
 * Moves values to the species they really belong to: withdrawn here and set there, in one revision. The other species is
 * one of the table, one that an open revision proposes, or a new one.
 */
export async function proposeMove(acting: Acting, key: string, typed: Typed): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  return act(acting, async (scope) => {
    const { trx } = scope;
    await lockNaming(trx);
    const species = await findProposable(key, trx);
    const trouble = noTrouble();
    const target = targetOf(typed, trouble);
    const properties = takenProperties(species, typed, trouble);
    const reason = reasonOf(typed, trouble);
    const read = await typedSpecies(typed, trouble, trx);
    if (!read) return held(trouble);
    const known = read.matches.find((one) => one.key === read.key);
    if (known?.speciesId === species.id || read.key === species.detail.key) {
      wrong(trouble, "formula", `${read.key} is this species itself. Write the one the values belong to.`);
    }
    const made = known ? null : await newSpecies(typed, read, trouble, trx);
    if (isTroubled(trouble)) return held(trouble, made?.questions ?? null);
    const there = known ? await findProposable(known.key, trx) : null;
    const thereId = there?.id ?? made?.species.id ?? "";
    const moved = properties.flatMap((property): ProposedLine[] => {
      const content = species.places.get(property)?.content;
      if (content?.kind !== "value") return [];
      const withdrawn = withdrawalLine(species.id, property, reason, typed);
      const stood = there?.places.get(property)?.content;
      // The right species has just this already: the wrong one only loses it.
      if (stood?.kind === "value" && stood.digits === content.digits && stood.sourceId === content.sourceId) {
        return [withdrawn];
      }
      const basis = read.identity.phase === "aq" ? content.basis : null;
      return [
        withdrawn,
        {
          kind: "value",
          speciesId: thereId,
          property,
          sourceId: null,
          content: { ...content, basis },
          reason: `moved from ${species.detail.key}: ${reason}`,
        },
      ];
    });
    const naming = made ? [{ ...made.line, reason }] : there ? await namingLine(there, target.revisionId, trx) : [];
    const revisionId = await insertProposal(
      acting,
      {
        ...target,
        summary: reason,
        lines: [...naming, ...moved],
        newSpecies: made ? [made.species] : [],
      },
      scope,
    );
    return { ok: true, revisionId };
  });
}
