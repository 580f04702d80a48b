import { PROPERTIES } from "#app/thermo/property.ts";
import { type Policy, POLICY } from "./policy.ts";
import { checks as allChecks } from "./registry.ts";
import type { Check, Finding, FindingDraft, TableView, ViewedSpecies } from "./types.ts";

/**
 * Makes every check on every species that a proposal touches.
 *
 * The order is fixed: species as the proposal has them, checks as the registry has them, then properties as handbooks
 * print them. A check that breaks down becomes a blocking finding, since a check that was not made passes nothing.
 */
export function examine(view: TableView, checks: readonly Check[] = allChecks, policy: Policy = POLICY): Finding[] {
  return view
    .touched()
    .flatMap((species) => checks.flatMap((check) => made(check, species, view, policy).map(finish(check, species))));
}

function made(check: Check, species: ViewedSpecies, view: TableView, policy: Policy): FindingDraft[] {
  try {
    return [...check.run(species, view, policy)].sort((a, b) => propertyOrder(a.property) - propertyOrder(b.property));
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    return [
      {
        severity: "block",
        property: null,
        sentence:
          `The check “${check.title}” could not be made on ${species.key}, so it has not been passed. ` +
          "Tell the administrator; the values may be right.",
        arithmetic: [`What stopped it: ${reason}`],
        data: { reason },
      },
    ];
  }
}

function finish(check: Check, species: ViewedSpecies): (draft: FindingDraft) => Finding {
  return (draft) => ({
    check: check.code,
    severity: draft.severity,
    species: species.key,
    speciesId: species.id,
    property: draft.property,
    lineRef: draft.lineRef === undefined ? lineOf(species, draft) : draft.lineRef,
    sentence: draft.sentence,
    arithmetic: draft.arithmetic ?? [],
    data: draft.data ?? {},
    suggestions: draft.suggestions ?? [],
  });
}

function lineOf(species: ViewedSpecies, { property }: FindingDraft): string | null {
  return property === null ? (species.lineRef ?? null) : (species.values[property]?.lineRef ?? null);
}

function propertyOrder(property: FindingDraft["property"]): number {
  return property === null ? -1 : PROPERTIES.indexOf(property);
}
