import { readCas } from "#app/thermo/cas.ts";
import { type Formula, readFormula } from "#app/thermo/formula.ts";
import type { Phase } from "#app/thermo/phase.ts";
import { quote } from "#app/thermo/reading.ts";
import { formatKey, isSameSpecies, readKey, type SpeciesIdentity } from "#app/thermo/speciesKey.ts";
import { compareBytes } from "./digest.ts";
import { identityOf, type StoredIdentity } from "./identity.ts";

/*
 * Which species of an edition a program means by a name, a key or a CAS number. A question with two answers is given back
 * with both; nothing is guessed. Pure: the same question about the same species has the same answer.
 */

/** One item of a question with everything that it may be. */
export interface Asked {
  /** As it was asked, without spaces at its ends. */
  readonly text: string;
  /** Species it names outright; several where its formula has two readings. */
  readonly identities: readonly SpeciesIdentity[];
  /** Formulas without a phase. */
  readonly formulas: readonly Formula[];
  /** Why the text has two readings; null where it has one or none. */
  readonly doubt: string | null;
  readonly cas: string | null;
  /** Why it is no CAS number though it looks like one. */
  readonly brokenCas: string | null;
  /** As names are compared. */
  readonly name: string;
}

/** What the edition calls a species, as far as a question needs it. */
export interface NamedSpecies extends StoredIdentity {
  readonly speciesId: string;
  readonly key: string;
  readonly name: string;
  readonly cas: string | null;
  readonly synonyms: readonly string[];
}

/** The species of an edition that any item of a question may mean, and the keys some of them had before. */
export interface Candidates<Species extends NamedSpecies> {
  readonly species: readonly Species[];
  /** Ids of species by a key they had in this edition or an earlier one. */
  readonly formerKeys: ReadonlyMap<string, readonly string[]>;
}

/** What an item came to. */
export type Settled<Species> =
  | { readonly outcome: "found"; readonly species: Species }
  | { readonly outcome: "ambiguous"; readonly candidates: readonly Species[]; readonly sentence: string }
  | { readonly outcome: "unknown"; readonly sentence: string };

/** Names are the same whatever their case and the spaces between their words. */
export function comparableName(name: string): string {
  return name.normalize("NFC").trim().replace(/\s+/g, " ").toLowerCase();
}

/** Everything that an item may be. */
export function readAsked(typed: string): Asked {
  const text = typed.trim();
  const cas = readCas(text);
  const key = readKey(text);
  const formula = key.outcome === "refused" ? readFormula(text) : null;
  return {
    text,
    identities: key.outcome === "read" ? [key.value] : key.outcome === "ambiguous" ? key.candidates : [],
    formulas:
      formula?.outcome === "read" ? [formula.value] : formula?.outcome === "ambiguous" ? formula.candidates : [],
    doubt: key.outcome === "ambiguous" ? key.sentence : formula?.outcome === "ambiguous" ? formula.sentence : null,
    cas: cas.outcome === "read" ? cas.value : null,
    brokenCas: cas.outcome !== "read" && /^\d{2,7}-\d{2}-\d$/.test(text) ? cas.sentence : null,
    name: comparableName(text),
  };
}

/** The keys by which an item may stand in the table. */
export function keysOf({ text, identities }: Asked): string[] {
  return [text, ...identities.map(formatKey)];
}

/** The Hill formulas of everything that an item may be. */
export function hillsOf({ identities, formulas }: Asked): string[] {
  return [...identities.map((one) => one.formula.hill), ...formulas.map((one) => one.hill)];
}

/** Prepares the candidates once, then settles each item. */
export function settler<Species extends NamedSpecies>(
  edition: number,
  { species, formerKeys }: Candidates<Species>,
  phase: Phase | null,
): (asked: Asked) => Settled<Species> {
  const byId = new Map(species.map((one) => [one.speciesId, one]));
  const byKey = new Map(species.map((one) => [one.key, one]));
  const byHill = grouped(species, (one) => [one.hill]);
  const byCas = grouped(species, (one) => (one.cas === null ? [] : [one.cas]));
  const byName = grouped(species, (one) => [one.name, ...one.synonyms].map(comparableName));
  const ordered = (found: Iterable<Species>): Species[] =>
    [...new Set(found)].sort((a, b) => compareBytes(a.key, b.key));

  const unknown = (sentence: string): Settled<Species> => ({ outcome: "unknown", sentence });
  const one = (found: Species): Settled<Species> =>
    phase === null || found.phase === phase
      ? { outcome: "found", species: found }
      : unknown(`${found.key} stands in edition ${edition}, but the phase asked for is ${phase}.`);
  const ask = (candidates: readonly Species[], sentence: string): Settled<Species> => ({
    outcome: "ambiguous",
    candidates,
    sentence,
  });
  const listed = (found: readonly Species[]): string => found.map((each) => each.key).join(", ");

  return (asked) => {
    const { text, identities, formulas, doubt, cas, brokenCas, name } = asked;
    if (text === "") return unknown("The text is empty. Give a key, a name or a CAS number.");
    const exact = byKey.get(text);
    if (exact) return one(exact);

    const alike = ordered(hillsOf(asked).flatMap((hill) => byHill.get(hill) ?? []));
    const outright = alike.filter((each) => identities.some((identity) => isSameSpecies(identityOf(each), identity)));
    const inAnyPhase = alike.filter((each) =>
      formulas.some((formula) => formula.hill === each.hill && formula.charge === each.charge),
    );
    if (doubt !== null) {
      const meant = ordered([...outright, ...inAnyPhase]);
      if (meant.length === 0) return unknown(`${doubt} Edition ${edition} has none of them.`);
      return ask(meant, `${doubt} Ask again by key: edition ${edition} has ${listed(meant)}.`);
    }
    if (outright.length === 1 && outright[0]) return one(outright[0]);

    const named = [...(cas === null ? [] : (byCas.get(cas) ?? [])), ...(byName.get(name) ?? []), ...inAnyPhase];
    const every = ordered([...outright, ...named]);
    const meant = every.filter((each) => phase === null || each.phase === phase);
    if (meant.length === 1 && meant[0]) return one(meant[0]);
    if (meant.length > 1) {
      const how = phase === null ? "by key or with a phase" : "by key";
      return ask(meant, `${quote(text)} may be any of ${listed(meant)} in edition ${edition}. Ask again ${how}.`);
    }
    if (every.length > 0) {
      return unknown(
        `Edition ${edition} has ${quote(text)} as ${listed(every)}, but not in the phase asked for, ${phase}.`,
      );
    }

    const renamed = ordered((formerKeys.get(text) ?? []).flatMap((id) => byId.get(id) ?? []));
    if (renamed.length === 1 && renamed[0]) return one(renamed[0]);
    if (renamed.length > 1) return ask(renamed, `${quote(text)} was the key of ${listed(renamed)}. Ask again by key.`);

    // A solid named without its form is one of the forms, and which one is for the caller to say.
    const forms = alike.filter((each) =>
      identities.some(
        ({ formula, phase: named, label }) =>
          label === undefined && formula.hill === each.hill && formula.charge === each.charge && named === each.phase,
      ),
    );
    if (forms.length > 0) {
      return ask(forms, `${quote(text)} names no form. Edition ${edition} has ${listed(forms)}. Ask again by key.`);
    }
    if (brokenCas !== null) return unknown(brokenCas);
    const head = `Edition ${edition} has no species ${quote(text)}.`;
    return unknown(
      alike.length > 0
        ? `${head} Of the same atoms it has ${listed(alike.slice(0, 5))}.`
        : `${head} Ask by a key, name or CAS number that stands in it.`,
    );
  };
}

function grouped<Item>(items: readonly Item[], textsOf: (item: Item) => readonly string[]): Map<string, Item[]> {
  const groups = new Map<string, Item[]>();
  for (const item of items) {
    for (const text of new Set(textsOf(item))) {
      const group = groups.get(text);
      if (group) group.push(item);
      // Many species have no name.
      else if (text !== "") groups.set(text, [item]);
    }
  }
  return groups;
}
