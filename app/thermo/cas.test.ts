import { describe, expect, it } from "vitest";
import { readCas } from "./cas.ts";

describe("CAS Registry Numbers", () => {
  // Numbers of common substances, from memory; the check digit confirms them.
  it.each([
    ["7732-18-5", "7732-18-5", "water"],
    ["7647-14-5", "7647-14-5", "sodium chloride"],
    ["124-38-9", "124-38-9", "carbon dioxide"],
    ["7782-42-5", "7782-42-5", "graphite"],
    ["50-00-0", "50-00-0", "formaldehyde, the shortest kind"],
    ["CAS 7732-18-5", "7732-18-5", "with its name"],
    ["CAS RN: 7732-18-5", "7732-18-5", "with its full name"],
    ["[7732-18-5]", "7732-18-5", "in brackets"],
    ["7732–18–5", "7732-18-5", "with dashes"],
    ["7732 - 18 - 5", "7732-18-5", "with spaces"],
    ["7732185", "7732-18-5", "without hyphens"],
    ["0007732-18-5", "7732-18-5", "with leading zeros"],
  ])("%s is %s: %s", (text, expected) => {
    expect(readCas(text)).toMatchObject({ outcome: "read", value: expected });
  });

  it.each([
    ["", "No CAS"],
    ["7732-18-4", "call for 5"],
    ["7732-81-5", "call for"],
    ["7723-18-5", "call for"],
    ["7732-18", "is not a CAS Registry Number"],
    ["7732-18-05", "is not a CAS Registry Number"],
    ["18/05/7732", "is not a CAS Registry Number"],
    ["water", "is not a CAS Registry Number"],
  ])("refuses %j: %s", (text, sentence) => {
    expect(readCas(text)).toMatchObject({ outcome: "refused", sentence: expect.stringContaining(sentence) });
  });
});
