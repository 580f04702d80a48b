import { closureArithmetic, type GibbsClosure, gibbsClosure } from "#app/thermo/closure.ts";
import { showDigits, showNumber } from "#app/thermo/notation.ts";
import {
  CLOSURE_PROPERTIES,
  type ClosureValues,
  closureInput,
  closureSettings,
  closureValues,
  withValue,
} from "./closureOf.ts";
import { explainClosure, suspectProperty } from "./explainClosure.ts";
import type { Policy } from "./policy.ts";
import type { Check, FindingDraft, TableView, ViewedSpecies } from "./types.ts";
import { listed, shownSigned, symbolOf } from "./words.ts";

export const gibbsClosureCheck: Check = {
  code: "gibbs-closure",
  version: 1,
  title: "Gibbs closure",
  severities: ["block", "look", "remark"],
  appliesTo:
    "Every species with ΔfH°, S° and ΔfG°. Ions in the gas follow other conventions and are left alone unless the table can close them.",
  formula: [
    "ΔfS° = S° − Σ ν S°(elements) + (z/2) S°(H2)",
    "r = ΔfG° − (ΔfH° − TΔfS°), T = 298.15 K",
    "d = δ(ΔfG°) + δ(ΔfH°) + (T/1000) (δ(S°) + Σ |n| δ(S° of the elements)), δ half a unit of the last printed place",
    "e = (T/1000) Σ |n| U(S° of the elements), left out when the sheet brings its own element rows",
    "c = 0.05 kJ/mol · √(N + 1) for N atoms",
    "one source: t = 2d + c + e; several: t = the larger of that and 2u",
    "|r| ≤ t closes; up to the larger of 5t and 3 kJ/mol a look; above, it blocks",
  ],
  source:
    "Definition of the Gibbs energy; ions by the convention for H+(aq) (IUPAC Green Book, 3rd ed., 2007). The tolerance was tried on two published handbooks.",
  explanation: [
    "ΔfG° is nearly always worked out from the ΔfH° and S° beside it. The three must therefore fit together to their printed digits, however uncertain they are; where they do not, one of them was misread, mistyped, converted wrongly or taken from another source.",
    "The element entropies come from the sheet itself where it has them, else from the table. If one is missing the closure is not made, and the finding says which one; it has then not been passed either.",
    "Where the source itself says that it relaxed the constraint, a failing closure is only a look. A closure alone cannot tell a misread digit of ΔfH° from one of ΔfG°: equally good explanations are shown as equal.",
  ],
  example: {
    given: "NH3(g) with ΔfH° −49.54, S° 192.77 and ΔfG° −16.41",
    sentence: "Gibbs closure is off by +3.60 kJ/mol, tolerance 0.14.",
  },
  run: (species, view, policy) => {
    const values = closureValues(species.values);
    if (values === undefined) return [];
    const closure = gibbsClosure(closureInput(species, values, view), closureSettings(policy));
    switch (closure.verdict) {
      case "closes":
        return [];
      case "notMade":
        return [notMade(species, closure)];
      case "look":
      case "block":
        return [failing(species, values, view, closure, policy)];
    }
  },
};

function notMade(species: ViewedSpecies, closure: GibbsClosure): FindingDraft {
  const property = "gibbsEnergyOfFormation" as const;
  if (closure.missing.length === 0) {
    return { severity: "remark", property, sentence: closure.sentence, data: {} };
  }
  return {
    severity: "remark",
    property,
    sentence: `Gibbs closure of ${species.key} is not made: S° of ${listed(closure.missing)} is not in the table.`,
    data: { missing: closure.missing.join(" ") },
  };
}

function failing(
  species: ViewedSpecies,
  values: ClosureValues,
  view: TableView,
  closure: GibbsClosure,
  policy: Policy,
): FindingDraft {
  const input = closureInput(species, values, view);
  const { residual = 0, tolerance = 0 } = closure;
  const suggestions = explainClosure(species, values, view, closure, policy);
  const off = `Gibbs closure is off by ${shownSigned(residual ?? 0, 2)} kJ/mol, tolerance ${showNumber(tolerance ?? 0, 2)}.`;
  const relaxed = input.constraintRelaxed === true ? " The source says that it relaxed the constraint." : "";
  const unexplained =
    suggestions.length === 0 && closure.verdict === "block"
      ? " No single slip explains it; compare ΔfH°, S° and ΔfG° with the source."
      : "";
  return {
    severity: closure.verdict === "block" ? "block" : "look",
    property: suspectProperty(values, suggestions),
    sentence: `${off}${relaxed}${unexplained}`,
    arithmetic: [...closureArithmetic(closure), ...withWhatStands(species, values, view, policy)],
    data: {
      residual: (residual ?? 0).toFixed(3),
      tolerance: (tolerance ?? 0).toFixed(3),
      enthalpyOfFormation: values.enthalpyOfFormation.digits,
      entropy: values.entropy.digits,
      gibbsEnergyOfFormation: values.gibbsEnergyOfFormation.digits,
    },
    suggestions,
  };
}

/** Which single value, put back to what stands, would make it close: the mark of a row revised only in part. */
function withWhatStands(species: ViewedSpecies, values: ClosureValues, view: TableView, policy: Policy): string[] {
  return CLOSURE_PROPERTIES.flatMap((property) => {
    const standing = species.standing[property];
    const value = values[property];
    if (standing === undefined || value.lineRef === null || standing.digits === value.digits) return [];
    const restored = gibbsClosure(
      withValue(closureInput(species, values, view), property, { digits: standing.digits, given: standing.given }),
      closureSettings(policy),
    );
    if (restored.verdict !== "closes" || restored.residual === null) return [];
    return [
      `With the ${symbolOf(property)} that stands, ${showDigits(standing.digits)}, it closes (${shownSigned(restored.residual, 2)}).`,
    ];
  });
}
