import { casCheckDigit } from "./cas-check-digit.ts";
import { casShared } from "./cas-shared.ts";
import { changeBeyondUncertainty } from "./change-beyond-uncertainty.ts";
import { duplicate } from "./duplicate.ts";
import { entropyPositive } from "./entropy-positive.ts";
import { gibbsClosureCheck } from "./gibbs-closure.ts";
import { lessPrecise } from "./less-precise.ts";
import { referenceState } from "./reference-state.ts";
import type { Check } from "./types.ts";
import { uncertaintyDigits } from "./uncertainty-digits.ts";
import { uncertaintyMissing } from "./uncertainty-missing.ts";
import { unitSlip } from "./unit-slip.ts";
import { weakerSource } from "./weaker-source.ts";

/** Every check, in the order in which findings are listed: what a value is, whether it fits, how well it is known. */
export const checks: readonly Check[] = [
  duplicate,
  casCheckDigit,
  casShared,
  referenceState,
  entropyPositive,
  unitSlip,
  gibbsClosureCheck,
  changeBeyondUncertainty,
  lessPrecise,
  weakerSource,
  uncertaintyMissing,
  uncertaintyDigits,
];

/** The check with a code, for its page. */
export function checkOf(code: string): Check | undefined {
  return checks.find((check) => check.code === code);
}
