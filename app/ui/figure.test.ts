import { describe, expect, it } from "vitest";
import { concise, signed } from "./concise.ts";
import { count, cutFigure, tailOf } from "./figure.ts";
import { plainAscii } from "./plainCopy.ts";
import { tickLabel, ticks } from "./scale.ts";
import { dateInWords } from "./Time.tsx";
import { digits } from "#app/thermo/digits.ts";

describe("figures", () => {
  it.each([
    ["-285.830(20)", { whole: "−285", fraction: ".830", bracket: "(20)" }, "cut at the point, true minus"],
    ["0", { whole: "0", fraction: "", bracket: "" }, "a whole number has no tail"],
    ["-12345.6", { whole: "−12\u2009345", fraction: ".6", bracket: "" }, "thin spaces from five digits on"],
    ["1675.7(7)", { whole: "1675", fraction: ".7", bracket: "(7)" }, "four digits stay together"],
    ["253.4, u = 0.002", { whole: "253.4, u = 0.002", fraction: "", bracket: "" }, "anything else stays whole"],
  ])("%s: %s", (text, expected) => {
    expect(cutFigure(text)).toEqual(expected);
  });

  it("gives all figures of a column the room of the widest tail, so that the points stand under each other", () => {
    expect(tailOf(["−285.830(20)", "0", "−1675.7(7)"])).toBe(6);
    expect(tailOf(["1", "20"])).toBe(0);
  });

  it("prints an expanded uncertainty as a standard one in brackets and keeps the stated one in words", () => {
    // −285.830 ± 0.040 (k = 2): CODATA Key Values, 1989.
    const printed = concise("-285.830", { digits: digits("0.040"), kind: "expanded", coverageFactor: 2 });
    expect(printed.text).toBe("−285.830(20)");
    expect(printed.words).toContain("± 0.040");
  });

  it("keeps the digits of a value without an uncertainty", () => {
    expect(concise("205.10", null).text).toBe("205.10");
  });

  it("shows text that is not a number as it is", () => {
    expect(concise("n. d.", null).text).toBe("n. d.");
  });

  it("gives a difference its sign, and zero none", () => {
    expect([signed("0.36"), signed("-3.60"), signed("0.00")]).toEqual(["+0.36", "−3.60", "0.00"]);
  });

  it("groups counts", () => {
    expect([count(3842), count(12074)]).toEqual(["3842", "12\u2009074"]);
  });
});

describe("what is copied", () => {
  it("is plain ASCII where the page is typeset", () => {
    expect(plainAscii("−12\u2009345.6 kJ\u00a0mol")).toBe("-12345.6 kJ mol");
  });
});

describe("drawings", () => {
  it("has round ticks inside the stretch, zero without a sign", () => {
    const { values, decimals } = ticks(-4.3, 4.3, 6);
    expect(values.map((value) => tickLabel(value, decimals))).toEqual(["−4", "−2", "0", "2", "4"]);
  });

  it("labels small steps with enough decimals", () => {
    const { values, decimals } = ticks(-46.6, -45.5, 3);
    expect(values.map((value) => tickLabel(value, decimals))).toEqual(["−46.5", "−46.0", "−45.5"]);
  });
});

describe("dates", () => {
  it("are UTC and in words, the same for every reader", () => {
    expect(dateInWords("2026-03-12T23:30:00Z")).toBe("12 March 2026");
    expect(dateInWords("2026-03-12T23:30:00-02:00", true)).toBe("13 March 2026, 01:30 UTC");
  });

  it("says so when there is none", () => {
    expect(dateInWords("soon")).toBe("an unknown date");
  });
});
