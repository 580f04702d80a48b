import { expect, test } from "vitest";
import { readDescription } from "./description.ts";

const nothing = { label: null, name: null, remark: null };

// Descriptions as printed in the NBS tables (fixtures/nbs-1982-excerpt.csv), and their like.
test.each([
  ["diamond", "cr", { label: "diamond" }],
  ["hematite", "cr", { label: "hematite" }],
  ["aragonite", "cr", { label: "aragonite" }],
  ["α", "cr", { label: "alpha" }],
  ["alpha quartz", "cr", { label: "alpha-quartz" }],
  ["II", "cr", { label: "II" }],
  ["red", "cr", { label: "red" }],
  ["insoluble, anhydrite", "cr", { label: "anhydrite", remark: "insoluble, anhydrite" }],
  ["ammonium nitrate", "cr", { name: "ammonium nitrate" }],
  // Ends like a mineral, but names an anion.
  ["nitrite", "cr", { name: "nitrite" }],
  ["methanol", "l", { name: "methanol" }],
  ["carbonyl chloride", "g", { name: "carbonyl chloride" }],
  // A mineral's name is no form of a gas or a solute.
  ["selenite", "aq", { name: "selenite" }],
  ["cis", "g", { label: "cis" }],
  [
    "G-H-S constraint has been relaxed; see Introduction",
    "cr",
    { remark: "G-H-S constraint has been relaxed; see Introduction" },
  ],
  ["estimated", "g", { remark: "estimated" }],
  ["  ", "cr", {}],
] as const)("%j of a %s", (text, phase, expected) => {
  expect(readDescription(text, phase)).toEqual({ ...nothing, ...expected });
});
