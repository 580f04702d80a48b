import { createHash } from "node:crypto";
import { createConfig, lintFromString } from "@redocly/openapi-core";
import { describe, expect, test } from "vitest";
import { problemKinds } from "#app/http/problem.ts";
import { openApiDocument } from "#app/routes/api/document.server.ts";
import { Contract } from "#tests/support/contract.ts";

const document = openApiDocument("https://tables.calderpoint.example");

/**
 * A public linter’s findings, by the rules its makers recommend: warnings count like errors, and no rule is switched
 * off. One that has to be stands here with its reason.
 */
const lint = async (what: unknown) =>
  lintFromString({ source: JSON.stringify(what), config: await createConfig({ extends: ["recommended"] }) });

test("a public linter finds nothing in the document", async () => {
  const problems = await lint(document);
  expect(problems.map(({ ruleId, message, location }) => [ruleId, message, location[0]?.pointer])).toEqual([]);
});

test("the linter does find what is wrong", async () => {
  const broken = structuredClone(document);
  delete broken.paths?.["/editions"]?.get?.operationId;
  const problems = await lint(broken);
  expect(problems.map(({ ruleId }) => ruleId)).toContain("operation-operationId");
});

describe("an answer that is other than the contract says is found", () => {
  const body = JSON.stringify({ edition: null, editions: [] });
  const sha256 = createHash("sha256").update(body);
  const hash = sha256.digest();
  const right: Record<string, string> = {
    "Content-Type": "application/json",
    "X-Request-Id": "1b671a64-40d5-491e-99b0-da01ff1f3341",
    "Cache-Control": "private, no-cache",
    ETag: `"${hash.toString("hex")}"`,
    "Repr-Digest": `sha-256=:${hash.toString("base64")}:`,
  };
  const without = (name: string): Record<string, string> =>
    Object.fromEntries(Object.entries(right).filter(([one]) => one !== name));
  const check = (status: number, text: string, headers: Record<string, string>, address = "/api/v1/editions") =>
    new Contract(document).check("GET", address, new Response(text, { status, headers }));
  const problem = JSON.stringify({
    type: "https://x.example/problems/not-found",
    title: "Not found",
    status: 404,
    detail: "There is nothing here.",
  });
  const asProblem = { "Content-Type": "application/problem+json" };

  test("as it should be, it passes", async () => {
    await expect(check(200, body, right)).resolves.toBeUndefined();
    await expect(check(404, problem, asProblem, "/api/v1/nothing")).resolves.toBeUndefined();
  });

  test.each<[string, number, string, Record<string, string>, string?]>([
    ["a status that is not told of", 418, body, right],
    ["a missing header", 200, body, without("ETag")],
    ["a header of a wrong form", 200, body, { ...right, ETag: '"abc"' }],
    ["a header that is not told of", 200, body, { ...right, "X-Surprise": "1" }],
    ["another media type", 200, body, { ...right, "Content-Type": "text/html" }],
    ["a member that is missing", 200, JSON.stringify({ edition: null }), right],
    ["a member that is not told of", 200, JSON.stringify({ edition: null, editions: [], more: 1 }), right],
    ["a body that is no JSON", 200, "<!doctype html>", right],
    ["an unknown address that answers", 200, body, right, "/api/v1/nothing"],
    ["an unknown address without a problem document", 404, body, right, "/api/v1/nothing"],
    ["a problem of another status", 404, problem.replace("404", "400"), asProblem, "/api/v1/nothing"],
    ["a problem of another title", 404, problem.replace("Not found", "Gone"), asProblem, "/api/v1/nothing"],
    ["a problem whose page is none", 404, problem.replace("not-found", "lost"), asProblem, "/api/v1/nothing"],
  ])("%s", async (_what, status, text, headers, address) => {
    await expect(check(status, text, headers, address)).rejects.toThrow();
  });
});

test("every status that refuses has a page that explains it", () => {
  const explained = new Set(Object.values(problemKinds).map(({ status }) => status));
  const told = Object.values(document.paths ?? {}).flatMap((item) =>
    Object.values(item as Record<string, { responses?: object }>).flatMap(({ responses }) =>
      Object.keys(responses ?? {}).map(Number),
    ),
  );
  expect(told.filter((status) => status >= 400 && !explained.has(status))).toEqual([]);
});
