import { act } from "#app/audit/act.server.ts";
import { database } from "#app/db/database.server.ts";
import { findNewestEdition } from "#app/editions/editions.queries.server.ts";
import { identityOf } from "#app/editions/identity.ts";
import { NotFound } from "#app/http/errors.ts";
import { demand } from "#app/people/permissions.ts";
import type { Acting } from "#app/people/person.ts";
import { shortCitation } from "#app/sources/citation.ts";
import { describedSource, readSourceForm, typedSource } from "#app/sources/sourceForm.ts";
import { findChoosableSources } from "#app/sources/sources.queries.server.ts";
import { findSpeciesByIds, lockNaming } from "#app/species/species.queries.server.ts";
import type { SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import type { LineContent } from "./content.ts";
import {
  type FormTrouble,
  isTroubled,
  noTrouble,
  readDetail,
  readValues,
  reasonOf,
  textOf,
  type Typed,
  typedDetail,
  typedValue,
  wrong,
} from "./proposal.ts";
import { findProposedSourceIds } from "./propose.queries.server.ts";
import { refuseTakenKeys } from "./propose.server.ts";
import { asksAboutNames, held, type ProposeOutcome } from "./proposeForm.server.ts";
import { findLine, findRevision, type LineRow } from "./review.queries.server.ts";
import { writeLine } from "./revise.server.ts";
import { findNames } from "./revisionPage.server.ts";
import { isWritable } from "./states.ts";

async function findEditable(revisionId: number, lineId: string): Promise<LineRow> {
  const line = /^[1-9]\d{0,17}$/.test(lineId) ? await findLine(lineId, database()) : undefined;
  if (!line || line.revisionId !== revisionId || line.state === "dropped") {
    throw new NotFound(`Revision ${revisionId} has no such line.`);
  }
  return line;
}

async function identityOfLine(line: LineRow): Promise<SpeciesIdentity | null> {
  const [stored] = line.speciesId ? await findSpeciesByIds([line.speciesId], database()) : [];
  if (!stored) return null;
  const { content } = line;
  const called = content.kind === "detail" ? content : { printed: stored.hill, label: null };
  return identityOf({ ...stored, printed: called.printed, label: called.label });
}

/** The sources that a value of this revision may rest on without a further line. */
async function findUsableSources(revisionId: number) {
  const edition = (await findNewestEdition(database()))?.number ?? 0;
  const here = await findProposedSourceIds(revisionId, database());
  return (await findChoosableSources(edition, database()))
    .filter((one) => one.named || here.has(one.sourceId))
    .map(({ sourceId, citation, revisionId: proposed }) => ({
      id: sourceId,
      name: shortCitation(citation) || sourceId,
      proposed,
    }))
    .sort((a, b) => a.name.localeCompare(b.name, "en"));
}

/** What the page shows on which one line is written anew. @throws NotFound, Forbidden */
export async function findLineEdit(acting: Acting, revisionId: number, lineId: string) {
  demand(acting, "revision:write");
  const revision = await findRevision(revisionId, database());
  if (!revision) throw new NotFound(`There is no revision ${revisionId}.`);
  const line = await findEditable(revisionId, lineId);
  const names = await findNames([line]);
  const identity = await identityOfLine(line);
  const { content } = line;
  return {
    revision: { id: revision.id, title: revision.title, writable: isWritable(revision.state) },
    line: {
      id: line.id,
      version: line.version,
      kind: content.kind,
      property: line.property,
      key: line.speciesId ? (names.get(line.speciesId)?.key ?? null) : null,
      phase: identity?.phase ?? null,
    },
    /** What stands in the fields. */
    typed: typedLine(content, line),
    sources: content.kind === "value" ? await findUsableSources(revisionId) : [],
    edition: (await findNewestEdition(database()))?.number ?? 0,
  };
}

export type LineEditPage = Awaited<ReturnType<typeof findLineEdit>>;

function typedLine(content: LineContent, line: LineRow): Record<string, string> {
  switch (content.kind) {
    case "detail":
      return typedDetail(content);
    case "source":
      return Object.fromEntries(Object.entries(typedSource(content)).map(([name, text]) => [`source.${name}`, text]));
    case "withdrawal":
      return { why: content.reason };
    case "value":
      return line.property ? typedValue(content, line.property) : {};
  }
}

/**
 * Writes a line anew as the form says: a value with its conditions and source, what a species is called, a citation, or
 * the reason of a withdrawal. The line gets a new version, and the revision is examined again.
 *
 * @throws NotFound; Refused when the line was edited since, or the revision is not written now; Invalid when nothing
 *   changes
 */
export async function editLine(
  acting: Acting,
  revisionId: number,
  lineId: string,
  typed: Typed,
): Promise<ProposeOutcome> {
  demand(acting, "revision:write");
  const line = await findEditable(revisionId, lineId);
  const trouble = noTrouble();
  const reason = reasonOf(typed, trouble);
  const content = await contentOf(line, typed, trouble);
  if (!content || isTroubled(trouble)) return held(trouble);
  return act(acting, async (scope) => {
    if (content.kind === "detail" && line.content.kind === "detail" && line.speciesId) {
      await lockNaming(scope.trx);
      const identity = await identityOfLine(line);
      const questions = identity
        ? await asksAboutNames(typed, content, identity, line.speciesId, line.content, trouble, scope.trx)
        : null;
      if (isTroubled(trouble)) return held(trouble, questions);
      await refuseTakenKeys([{ speciesId: line.speciesId, content }], scope.trx);
    }
    await writeLine(
      acting,
      { revisionId, lineId: line.id, expectedVersion: Number(typed("version")) || 0, content, reason },
      scope,
    );
    return { ok: true, revisionId };
  });
}

async function contentOf(line: LineRow, typed: Typed, trouble: FormTrouble): Promise<LineContent | null> {
  const { content } = line;
  const identity = await identityOfLine(line);
  switch (content.kind) {
    case "detail":
      return identity && readDetail(typed, identity, trouble);
    case "source": {
      const described = readSourceForm((field) => typed(`source.${field}`));
      if (described.ok) return { kind: "source", ...describedSource(described.source, content.citation) };
      for (const { field, detail } of described.errors) wrong(trouble, `source.${field}`, detail);
      return null;
    }
    case "withdrawal": {
      const why = textOf(typed, "why", 2000, trouble);
      if (why === "") wrong(trouble, "why", "Say why the value is taken out.");
      return { kind: "withdrawal", reason: why };
    }
    case "value": {
      const { property } = line;
      if (!identity || !property) return null;
      const own: Typed = (name) => (/^[a-zA-Z]+\./.test(name) && !name.startsWith(`${property}.`) ? "" : typed(name));
      const [value] = readValues(own, identity, trouble);
      const sources = await findUsableSources(line.revisionId);
      const sourceId = typed("source");
      if (!sources.some((one) => one.id === sourceId)) wrong(trouble, "source", "Choose a source of the list.");
      if (!value) {
        if (!isTroubled(trouble)) wrong(trouble, `${property}.value`, "Write the value.");
        return null;
      }
      return { ...value.content, sourceId };
    }
  }
}
