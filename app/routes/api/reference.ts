import type { oas31 } from "zod-openapi";

/*
 * The OpenAPI document as the guide prints it: each address with its parameters and answers, each shape with its fields.
 * Everything is taken from the document, so that the guide cannot say something else than the contract. Pure.
 */

/** One member of a shape; those of a shape inside it follow with a dot, "source.doi". */
export interface ReferenceField {
  name: string;
  /** Its type in words, "text", "list of Value", "Uncertainty or null". */
  type: string;
  /** The named shape that the type speaks of. */
  shape: string | null;
  /** May be missing from the answer. */
  optional: boolean;
  description: string;
}

export interface ReferenceParameter {
  name: string;
  where: "path" | "query";
  required: boolean;
  description: string;
  example: string | null;
}

export interface ReferenceAnswer {
  status: number;
  description: string;
  mediaType: string | null;
  fields: readonly ReferenceField[];
  /** Whether it is to be saved as a file. */
  isFile: boolean;
}

/** One form in which a request's body may be sent. */
export interface ReferenceBody {
  mediaType: string;
  fields: readonly ReferenceField[];
}

export interface ReferenceEndpoint {
  id: string;
  method: string;
  path: string;
  summary: string;
  description: string;
  needsKey: boolean;
  parameters: readonly ReferenceParameter[];
  bodies: readonly ReferenceBody[];
  /** A request as it is typed, with the contract's own examples; the key stands in the variable TABLEWRIGHT_KEY. */
  command: string;
  answers: readonly ReferenceAnswer[];
}

export interface ReferenceShape {
  name: string;
  description: string;
  fields: readonly ReferenceField[];
  /** The only values it may have, where it is a text of a fixed list. */
  values: readonly string[];
}

export interface Reference {
  endpoints: readonly ReferenceEndpoint[];
  shapes: readonly ReferenceShape[];
}

type Schema = oas31.SchemaObject | oas31.ReferenceObject;

/** What stands in an example in place of the contract's own: a number or an id that this reader can ask for. */
export type ExampleFacts = Readonly<Record<string, string>>;

const METHODS = ["get", "post", "put", "patch", "delete"] as const;
const TYPE_WORDS: Readonly<Record<string, string>> = {
  string: "text",
  number: "number",
  integer: "whole number",
  boolean: "true or false",
  null: "null",
  object: "object",
};

const isReference = (schema: object): schema is oas31.ReferenceObject => "$ref" in schema;
const shapeName = ({ $ref }: oas31.ReferenceObject): string => $ref.slice($ref.lastIndexOf("/") + 1);

/** A type in words, and the shape it names. */
function typeOf(schema: Schema): { type: string; shape: string | null } {
  if (isReference(schema)) return { type: shapeName(schema), shape: shapeName(schema) };
  if (schema.const !== undefined) return { type: JSON.stringify(schema.const), shape: null };
  if (schema.enum) return { type: schema.enum.map((value) => JSON.stringify(value)).join(", "), shape: null };
  const either = schema.anyOf ?? schema.oneOf;
  if (either) {
    const parts = either.map(typeOf);
    return {
      type: parts.map((part) => part.type).join(" or "),
      shape: parts.find((part) => part.shape)?.shape ?? null,
    };
  }
  const types = [schema.type ?? "object"].flat();
  if (types.includes("array") && schema.items) {
    const { type, shape } = typeOf(schema.items);
    return { type: `list of ${type}${types.includes("null") ? " or null" : ""}`, shape };
  }
  const more = schema.additionalProperties;
  if (types.includes("object") && !schema.properties && typeof more === "object" && Object.keys(more).length > 0) {
    const { type, shape } = typeOf(more);
    return { type: `object of ${type}`, shape };
  }
  return { type: types.map((one) => TYPE_WORDS[one] ?? one).join(" or "), shape: null };
}

/** The members of an inline object, through lists and alternatives; those of several alternatives together. */
function membersOf(schema: Schema): oas31.SchemaObject | null {
  if (isReference(schema)) return null;
  if (schema.properties) return schema;
  if (schema.items) return membersOf(schema.items);
  const inside = (schema.anyOf ?? schema.oneOf ?? []).map(membersOf).filter((one) => one !== null);
  return inside.length > 1 ? inside.reduce(together) : (inside[0] ?? null);
}

/** What either of two shapes has; what the other lacks may be missing, and a fixed word is one of two. */
function together(a: oas31.SchemaObject, b: oas31.SchemaObject): oas31.SchemaObject {
  const properties = { ...a.properties, ...b.properties };
  for (const [name, one] of Object.entries(a.properties ?? {})) {
    const other = b.properties?.[name];
    if (!other || isReference(one) || isReference(other)) continue;
    const words = [...fixedWords(one), ...fixedWords(other)];
    if (words.length > 1) properties[name] = { ...one, const: undefined, enum: words };
  }
  return { properties, required: (a.required ?? []).filter((name) => b.required?.includes(name)) };
}

const fixedWords = (schema: oas31.SchemaObject): unknown[] =>
  schema.const === undefined ? (schema.enum ?? []) : [schema.const];

function fieldsOf(schema: Schema, prefix = ""): ReferenceField[] {
  const members = membersOf(schema);
  return Object.entries(members?.properties ?? {}).flatMap(([name, member]) => [
    {
      name: prefix + name,
      ...typeOf(member),
      optional: !(members?.required ?? []).includes(name),
      description: member.description ?? "",
    },
    ...fieldsOf(member, `${prefix}${name}.`),
  ]);
}

function parameterOf(parameter: oas31.ParameterObject): ReferenceParameter {
  const schema = parameter.schema && !isReference(parameter.schema) ? parameter.schema : undefined;
  const example: unknown = parameter.example ?? schema?.example;
  return {
    name: parameter.name,
    where: parameter.in === "path" ? "path" : "query",
    required: parameter.required ?? false,
    description: parameter.description ?? schema?.description ?? "",
    example: example === undefined ? null : String(example),
  };
}

function answerOf(status: string, answer: oas31.ResponseObject): ReferenceAnswer {
  const [content] = Object.entries(answer.content ?? {});
  const schema = content?.[1].schema;
  return {
    status: Number(status),
    description: answer.description,
    mediaType: content?.[0] ?? null,
    isFile: Number(status) < 300 && answer.headers?.["Content-Disposition"] !== undefined,
    // Problem documents have one shape, which is printed once.
    fields: schema && Number(status) < 400 ? fieldsOf(schema) : [],
  };
}

/** Text as one word of a shell. */
const quoted = (text: string): string => `'${text.replaceAll("'", "'\\''")}'`;

/** A value in an address; what needs no escape there is left readable. */
const inAddress = (text: string): string => encodeURIComponent(text).replaceAll("%2C", ",");

/** The request that the contract's examples make. */
function commandOf(
  { method, path, needsKey, parameters, answers }: Omit<ReferenceEndpoint, "command">,
  body: oas31.RequestBodyObject | undefined,
  base: string,
  facts: ExampleFacts,
): string {
  const exampleOf = ({ name, example }: ReferenceParameter): string | null => facts[name] ?? example;
  const address = path.replace(/\{(\w+)\}/g, (_whole, name: string) => {
    const parameter = parameters.find((one) => one.where === "path" && one.name === name);
    return inAddress((parameter && exampleOf(parameter)) ?? name);
  });
  const query = parameters.flatMap((one) =>
    one.where === "query" && one.example !== null ? [`${one.name}=${inAddress(exampleOf(one) ?? "")}`] : [],
  );
  const [sent] = Object.entries(body?.content ?? {});
  const isFile = answers.some((answer) => answer.isFile);
  const options = [
    ...(isFile ? ["-OJ"] : []),
    ...(needsKey ? ['-H "Authorization: Bearer $TABLEWRIGHT_KEY"'] : []),
    ...(sent ? [`-H ${quoted(`Content-Type: ${sent[0]}`)}`, `--data-binary ${dataOf(sent)}`] : []),
    // A body makes it a POST by itself.
    ...(method !== "GET" && !sent ? [`-X ${method}`] : []),
  ];
  const whole = `${base}${address}${query.length > 0 ? `?${query.join("&")}` : ""}`;
  return `curl ${[...options, quoted(whole)].join(" \\\n  ")}`;
}

/** JSON is typed; anything else is sent from a file. */
function dataOf([mediaType, { example }]: [string, oas31.MediaTypeObject]): string {
  return /json$/.test(mediaType) ? quoted(JSON.stringify(example)) : "@calorimeter.csv";
}

function endpointOf(
  path: string,
  method: string,
  operation: oas31.OperationObject,
  shapes: Readonly<Record<string, Schema>>,
  base: string,
  facts: ExampleFacts,
): ReferenceEndpoint {
  const body = operation.requestBody && !isReference(operation.requestBody) ? operation.requestBody : undefined;
  const parameters = (operation.parameters ?? []).filter(
    (parameter): parameter is oas31.ParameterObject => !isReference(parameter),
  );
  const endpoint = {
    id: operation.operationId ?? `${method} ${path}`,
    method: method.toUpperCase(),
    path,
    summary: operation.summary ?? "",
    description: operation.description ?? "",
    needsKey: operation.security?.length !== 0,
    parameters: parameters.map(parameterOf),
    bodies: Object.entries(body?.content ?? {}).map(([mediaType, { schema }]) => ({
      mediaType,
      fields: schema ? fieldsOf(isReference(schema) ? (shapes[shapeName(schema)] ?? {}) : schema) : [],
    })),
    answers: Object.entries(operation.responses ?? {}).flatMap(([status, answer]) =>
      isReference(answer) ? [] : [answerOf(status, answer)],
    ),
  };
  return { ...endpoint, command: commandOf(endpoint, body, base, facts) };
}

/** What the guide prints of the contract. */
export function referenceOf(document: oas31.OpenAPIObject, facts: ExampleFacts = {}): Reference {
  const base = document.servers?.[0]?.url ?? "";
  const schemas = document.components?.schemas ?? {};
  return {
    endpoints: Object.entries(document.paths ?? {}).flatMap(([path, item]) =>
      METHODS.flatMap((method) => {
        const operation = item[method];
        return operation ? [endpointOf(path, method, operation, schemas, base, facts)] : [];
      }),
    ),
    shapes: Object.entries(schemas).map(([name, schema]) => ({
      name,
      description: schema.description ?? "",
      fields: fieldsOf(schema),
      values: isReference(schema) ? [] : (schema.enum ?? []).map(String),
    })),
  };
}
