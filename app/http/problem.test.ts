import { describe, expect, test } from "vitest";
import * as errors from "./errors.ts";
import { explained, problemFrom, problemKinds, problemOf } from "./problem.ts";

const HOME = "https://tables.calderpoint.example";

/** One of each named error, made as acts throw them. */
const thrown = Object.entries(errors)
  .filter(([name]) => name !== "DomainError")
  .map(([name, NamedError]) => {
    const Concrete = NamedError as new (sentence: string, more?: unknown) => errors.DomainError;
    return [name, new Concrete("A sentence.", name === "TooMany" ? 3 : undefined)] as const;
  });

describe("every named error", () => {
  test("is looked at here", () => {
    expect(thrown.length).toBeGreaterThanOrEqual(9);
  });

  test.each(thrown)("%s has its page, of the same status and title", (_name, error) => {
    expect(problemKinds[error.kind]).toMatchObject({ status: error.status, title: error.title });
    expect(problemFrom(error, HOME)).toMatchObject({
      type: `${HOME}/problems/${error.kind}`,
      status: error.status,
      detail: "A sentence.",
    });
  });
});

test.each(Object.entries(problemKinds))("%s says what it means and what to do, in whole sentences", (_kind, kind) => {
  for (const text of [kind.explanation, kind.cure]) expect(text).toMatch(/^[A-Z].{20,}\.$/);
  expect(explained(kind)).toBe(`${kind.explanation} ${kind.cure}`);
});

test("an unknown kind gives nothing away", () => {
  expect(problemOf("toString", "x", HOME)).toMatchObject({ type: `${HOME}/problems/unexpected`, status: 500 });
});
