import { describe, expect, test } from "vitest";
import { ABSOLUTE_LIMIT, IDLE_LIMIT, isCurrent, pathOfThisSite } from "./session.ts";

describe("isCurrent", () => {
  const begun = new Date("2026-03-02T08:00:00Z");
  const at = (milliseconds: number): Date => new Date(begun.getTime() + milliseconds);
  const times = { seenAt: begun, endsAt: at(ABSOLUTE_LIMIT), endedAt: null };

  test("up to one second before the idle limit, and not one second after it", () => {
    expect(isCurrent(times, at(IDLE_LIMIT - 1000))).toBe(true);
    expect(isCurrent(times, at(IDLE_LIMIT))).toBe(false);
    expect(isCurrent(times, at(IDLE_LIMIT + 1000))).toBe(false);
  });

  test("up to one second before the absolute limit, however lately it was used", () => {
    const used = { ...times, seenAt: at(ABSOLUTE_LIMIT - 5000) };
    expect(isCurrent(used, at(ABSOLUTE_LIMIT - 1000))).toBe(true);
    expect(isCurrent(used, at(ABSOLUTE_LIMIT + 1000))).toBe(false);
  });

  test("not once it was ended", () => {
    expect(isCurrent({ ...times, endedAt: begun }, at(1))).toBe(false);
  });
});

describe("pathOfThisSite", () => {
  test.each([
    ["/revisions/12", "/revisions/12"],
    ["/editions/2/species/H2O(l)?q=a#top", "/editions/2/species/H2O(l)?q=a#top"],
  ])("keeps %s", (to, path) => {
    expect(pathOfThisSite(to)).toBe(path);
  });

  test.each([
    ["//evil.example"],
    ["/\\evil.example"],
    ["\\\\evil.example"],
    ["https://evil.example/"],
    ["javascript:alert(1)"],
    ["/\t/evil.example"],
    ["/.//evil.example"],
    ["/a/..//evil.example"],
    ["data:text/html,x"],
    [" /revisions"],
    [""],
    [null],
    ["/".padEnd(3000, "a")],
  ])("goes home for %j", (to) => {
    expect(pathOfThisSite(to)).toBe("/");
  });
});
