import { createHash } from "node:crypto";
import type { Severity } from "#app/checks/types.ts";
import { Refused } from "#app/http/errors.ts";

/*
 * The lines of one species in one revision form a set. Where only part of a set is accepted, what would stand is a mixture
 * of new and old values that nobody wrote, and that no examination of the whole revision has seen: a new ΔfH° beside the
 * old ΔfG°. Pure.
 */

/** What a check says of the mixture and the page of the revision does not. */
export interface MixtureFinding {
  severity: Severity;
  species: string;
  title: string;
  sentence: string;
  arithmetic: readonly string[];
  /** SHA-256 over what it says, in hexadecimal. */
  fingerprint: string;
}

/** What a person must answer before a mixture is accepted. */
export interface MixtureQuestion {
  findings: readonly MixtureFinding[];
  /** Names just these findings: the answer to one question is no answer to another. */
  token: string;
  /** Whether one of them blocks, so that it must be set aside with a reason. */
  needsReason: boolean;
}

/** The answer: the question it belongs to, and why what blocks is set aside. */
export interface MixtureAnswer {
  token: string;
  reason: string;
}

/** Refused until the question is answered. */
export class MixtureRefused extends Refused {
  constructor(
    sentence: string,
    readonly question: MixtureQuestion,
  ) {
    super(sentence);
  }
}

/** Asks about these findings; what blocks first. */
export function questionAbout(findings: readonly MixtureFinding[]): MixtureQuestion {
  const sorted = findings.toSorted((a, b) => Number(b.severity === "block") - Number(a.severity === "block"));
  const prints = sorted.map((one) => one.fingerprint).toSorted();
  return {
    findings: sorted,
    token: createHash("sha256").update(prints.join("\n")).digest("hex"),
    needsReason: sorted.some((one) => one.severity === "block"),
  };
}

/**
 * The sentence with which the question is put: how much would stand, and what is against it. `deciding` says what was
 * asked for: "With only these lines accepted".
 */
export function questionInWords(deciding: string, { findings, needsReason }: MixtureQuestion): string {
  const [first] = findings;
  if (!first) return deciding;
  const more = findings.length > 1 ? ` (and ${findings.length - 1} more)` : "";
  return needsReason
    ? `${deciding}, ${first.species} would not pass: ${first.sentence}${more} Decide its lines together, or set this aside with a reason.`
    : `${deciding}, ${first.species} would ask to be looked at: ${first.sentence}${more} Decide its lines together, or confirm that this may stand.`;
}
