import { describe, expect, it } from "vitest";
import { codata } from "#tests/published/publishedTables.ts";
import { foundBy, published, type Row } from "#tests/support/view.ts";
import { lessPrecise } from "./less-precise.ts";

// CODATA Key Values (1989): ZnO(cr) −350.46 ± 0.27.
const found = (key: string, values: Row["values"]) => foundBy(lessPrecise, [{ key, values }], published(codata));

describe("Less precise than what stands", () => {
  it("passes as many digits with as narrow an uncertainty", () => {
    expect(found("ZnO(cr)", { enthalpyOfFormation: "-350.52 ± 0.30" })).toEqual([]);
  });

  it("asks to look at fewer digits and a wider uncertainty, and says that the two agree", () => {
    const [finding] = found("ZnO(cr)", { enthalpyOfFormation: "-350.1 ± 0.5" });
    expect(finding).toMatchObject({ severity: "look", sentence: lessPrecise.example.sentence });
  });

  it("asks to look where an uncertainty gets lost", () => {
    expect(found("ZnO(cr)", { enthalpyOfFormation: "-350.46" })[0]?.sentence).toBe(
      "No uncertainty is stated for ΔfH° of ZnO(cr), where −350.46 ± 0.27 kJ/mol stands. The number is the same.",
    );
    expect(found("ZnO(cr)", { enthalpyOfFormation: "-350.5" })[0]?.sentence).toBe(
      "Fewer digits than what stands for ΔfH° of ZnO(cr), −350.46 ± 0.27 kJ/mol, and no uncertainty.",
    );
  });

  it("does not say that two values agree when they do not", () => {
    expect(found("ZnO(cr)", { enthalpyOfFormation: "-340.1 ± 0.5" })[0]?.sentence).not.toContain("Agrees");
  });

  it("does not apply to new values and to zeros by convention", () => {
    expect(found("SiH4(g)", { enthalpyOfFormation: "34" })).toEqual([]);
    expect(found("O2(g)", { enthalpyOfFormation: "0" })).toEqual([]);
  });
});
