import { describe, expect, test } from "vitest";
import { openApiDocument } from "./document.server.ts";
import { referenceOf } from "./reference.ts";

const document = openApiDocument("https://tables.calderpoint.example");
const { endpoints, shapes } = referenceOf(document);
const endpoint = (id: string) => endpoints.find((one) => one.id === id);
const shape = (name: string) => shapes.find((one) => one.name === name);

describe("the reference in the guide", () => {
  test("has every operation and every named shape of the contract", () => {
    expect(endpoints.map((one) => one.path)).toEqual(Object.keys(document.paths ?? {}));
    expect(shapes.map((one) => one.name)).toEqual(Object.keys(document.components?.schemas ?? {}));
  });

  test("says of every parameter what it is for", () => {
    const silent = endpoints.flatMap((one) =>
      one.parameters
        .filter((parameter) => parameter.description === "")
        .map((parameter) => `${one.id} ${parameter.name}`),
    );
    expect(silent, "describe it in app/routes/api/contract.ts").toEqual([]);
  });

  test("says which addresses need a key", () => {
    expect(endpoints.filter((one) => !one.needsKey).map((one) => one.id)).toEqual(["readContract"]);
  });

  test("names where a parameter stands and an example of it", () => {
    expect(endpoint("readSpecies")?.parameters).toMatchObject([
      { name: "edition", where: "path", required: true, example: "1" },
      { name: "key", where: "path", required: true, example: "H2O(l)" },
    ]);
    expect(endpoint("listSpecies")?.parameters.find((one) => one.name === "limit")).toMatchObject({
      where: "query",
      required: false,
      example: "100",
    });
  });

  test("prints the fields of an answer, with the shapes they hold", () => {
    const [ok] = endpoint("listSpecies")?.answers ?? [];
    expect(ok).toMatchObject({ status: 200, mediaType: "application/json" });
    expect(ok?.fields.find((one) => one.name === "species")).toMatchObject({
      type: "list of Species",
      shape: "Species",
    });
    expect(ok?.fields.find((one) => one.name === "next")).toMatchObject({ type: "text or null", shape: null });
  });

  test("prints members inside members, alternatives and lists of fixed words", () => {
    const fields = shape("Value")?.fields ?? [];
    expect(fields.find((one) => one.name === "source.doi")).toMatchObject({ type: "text or null", optional: false });
    expect(fields.find((one) => one.name === "uncertainty")).toMatchObject({
      type: "Uncertainty or null",
      shape: "Uncertainty",
    });
    expect(fields.find((one) => one.name === "origin")).toMatchObject({ type: '"stated", "derived"' });
    expect(fields.find((one) => one.name === "given")).toMatchObject({ optional: true });
    expect(shape("Phase")?.values).toContain("aq");
  });

  test("every shape that a field names is printed", () => {
    const named = [
      ...shapes.flatMap((one) => one.fields),
      ...endpoints.flatMap((one) => one.answers.flatMap((a) => a.fields)),
    ];
    for (const { name, shape: of } of named) if (of !== null) expect(shape(of), name).toBeDefined();
  });
});

describe("the example of each operation", () => {
  const commandOf = (id: string, facts = {}) => {
    const found = referenceOf(document, facts).endpoints.find((one) => one.id === id);
    return found?.command.replace(/ \\\n {2}/g, " ");
  };

  test("is typed with the contract's own examples", () => {
    expect(commandOf("readSpecies")).toBe(
      `curl -H "Authorization: Bearer $TABLEWRIGHT_KEY" 'https://tables.calderpoint.example/api/v1/editions/1/species/H2O(l)'`,
    );
    expect(commandOf("readContract")).toBe("curl 'https://tables.calderpoint.example/api/v1/openapi.json'");
  });

  test("names what its reader can ask for", () => {
    expect(commandOf("readSource", { source: "src_a/b" })).toContain("/sources/src_a%2Fb'");
    expect(commandOf("listSpecies", { edition: "7" })).toContain("/editions/7/species?element=H&phase=g&limit=100'");
  });

  test("sends a body where one is read, and saves what is a file", () => {
    expect(commandOf("lookUpSpecies")).toMatch(/-H 'Content-Type: application\/json' --data-binary '\{"species":\[/);
    expect(commandOf("handInSheet")).toContain("--data-binary @calorimeter.csv");
    expect(commandOf("downloadTableJson")).toContain("curl -OJ ");
  });

  test("leaves no parameter of an address open", () => {
    for (const { command } of endpoints) expect(command).not.toMatch(/\{\w+\}'|\/undefined|=undefined/);
  });
});

test("a shape of several forms shows what each of them has", () => {
  const fields = shape("LookupEntry")?.fields ?? [];
  expect(fields.find((one) => one.name === "outcome")?.type).toBe('"found", "ambiguous", "unknown"');
  expect(fields.find((one) => one.name === "asked")?.optional).toBe(false);
  expect(fields.find((one) => one.name === "candidates")?.optional).toBe(true);
});
