import { Ajv2020, type ValidateFunction } from "ajv/dist/2020.js";
import addFormats from "ajv-formats";
import { expect } from "vitest";
import { API_BASE } from "#app/http/apiContract.ts";
import { problemKinds } from "#app/http/problem.ts";

interface Described {
  headers?: Record<string, { required?: boolean; schema: object }>;
  content?: Record<string, { schema: object }>;
}

/** The parts of an OpenAPI 3.1 document that answers are held against. */
interface OpenApi {
  paths: Record<string, Record<string, { responses: Record<string, Described> }>>;
  components: { schemas: Record<string, object> };
}

/**
 * Headers that the contract leaves out: what belongs to the connection or to every answer of the service alike
 * (`server/headers.ts`, held by tests/routes/frontDoor.test.ts), and those that OpenAPI describes as media type.
 */
const UNTOLD = new Set([
  ...["connection", "date", "keep-alive", "transfer-encoding", "content-type", "content-length"],
  ...["content-security-policy", "cross-origin-opener-policy", "cross-origin-resource-policy", "permissions-policy"],
  ...["referrer-policy", "strict-transport-security", "x-content-type-options", "x-frame-options"],
]);

const PROBLEM = "application/problem+json";
/** A document a line; the contract describes one line. */
const LINES = "application/x-ndjson";

const pointerTo = (...parts: string[]): string =>
  parts.map((part) => encodeURIComponent(part.replaceAll("~", "~0").replaceAll("/", "~1"))).join("/");

/** Holds real answers against the OpenAPI document that the service itself serves. */
export class Contract {
  readonly #document: OpenApi;
  readonly #ajv = new Ajv2020({ strict: false, allErrors: true });
  readonly #compiled = new Map<string, ValidateFunction>();
  readonly #patterns: readonly { path: string; pattern: RegExp }[];
  /** Each operation and the statuses it was seen to answer. */
  readonly seen = new Map<string, Set<number>>();

  constructor(document: unknown) {
    this.#document = document as OpenApi;
    addFormats.default(this.#ajv);
    this.#ajv.addSchema(this.#document, "contract");
    // Addresses without a parameter come first: "/editions/current" is no other address, but "/openapi.json" is.
    this.#patterns = Object.keys(this.#document.paths)
      .sort((a, b) => a.split("{").length - b.split("{").length)
      .map((path) => {
        const pattern = path
          .split(/\{\w+\}/)
          .map((fixed) => fixed.replace(/[.*+?^${}()|[\]\\]/g, "\\$&"))
          .join("[^/]+");
        return { path, pattern: new RegExp(`^${pattern}$`) };
      });
  }

  /** "get /editions/{edition}" for each operation. */
  get operations(): string[] {
    return Object.entries(this.#document.paths).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method} ${path}`),
    );
  }

  /** The media types that an operation answers with, by status. */
  mediaTypesOf(operation: string, status: number): string[] {
    const [method = "", path = ""] = operation.split(" ");
    return Object.keys(this.#document.paths[path]?.[method]?.responses[String(status)]?.content ?? {});
  }

  /**
   * Fails unless an answer is what the contract says of its address and method: status, headers, media type and body. An
   * address that the contract does not know must answer with a problem document; so must a method that it does not know,
   * which is held against any operation of the address.
   *
   * @param address path and query as they were sent
   */
  async check(method: string, address: string, answer: Response): Promise<void> {
    const pathname = address.replace(/[?#].*$/s, "");
    const known = pathname.startsWith(`${API_BASE}/`)
      ? this.#patterns.find(({ pattern }) => pattern.test(pathname.slice(API_BASE.length)))
      : undefined;
    const where = `${method} ${pathname} (${answer.status})`;
    const text = await answer.text();
    if (!known) {
      expect(answer.status, where).toBeGreaterThanOrEqual(400);
      this.#checkBody(where, method, answer, text, { content: { [PROBLEM]: { schema: {} } } }, `${PROBLEM_SHAPE}`);
      return;
    }
    const methods = this.#document.paths[known.path] ?? {};
    const allowed = Object.keys(methods).flatMap((one) => (one === "get" ? ["GET", "HEAD"] : [one.toUpperCase()]));
    if (method === "OPTIONS" && answer.status === 204) {
      expect(answer.headers.get("Allow"), where).toBe([...allowed, "OPTIONS"].join(", "));
      expect(text, where).toBe("");
      return;
    }
    const own = method === "HEAD" ? "get" : method.toLowerCase();
    const told = methods[own] ? own : (Object.keys(methods)[0] ?? "");
    if (!methods[own] && answer.status === 405) {
      expect(answer.headers.get("Allow"), where).toBe([...allowed, "OPTIONS"].join(", "));
    }
    const operation = `${told} ${known.path}`;
    const declared = methods[told]?.responses[String(answer.status)];
    expect(declared, `${where}: the contract does not say that ${operation} answers ${answer.status}`).toBeDefined();
    if (!declared) return;
    this.seen.set(operation, (this.seen.get(operation) ?? new Set()).add(answer.status));
    const at = ["paths", known.path, told, "responses", String(answer.status)];
    this.#checkHeaders(where, answer, declared, at);
    this.#checkBody(where, method, answer, text, declared, pointerTo(...at, "content"));
  }

  #checkHeaders(where: string, answer: Response, declared: Described, at: string[]): void {
    const told = declared.headers ?? {};
    for (const [name, { required }] of Object.entries(told)) {
      const value = answer.headers.get(name);
      if (value === null) {
        expect(required ?? false, `${where}: the header ${name} is missing`).toBe(false);
        continue;
      }
      const errors = this.#errorsOf(pointerTo(...at, "headers", name, "schema"), value);
      expect(errors, `${where}: the header ${name} is "${value}"`).toEqual([]);
    }
    const names = new Set(Object.keys(told).map((name) => name.toLowerCase()));
    const untold = [...answer.headers.keys()].filter((name) => !names.has(name) && !UNTOLD.has(name));
    expect(untold, `${where}: headers that the contract does not tell of`).toEqual([]);
  }

  #checkBody(where: string, method: string, answer: Response, text: string, declared: Described, at: string): void {
    if (method === "HEAD" || !declared.content) {
      expect(text, where).toBe("");
      return;
    }
    const mediaType = (answer.headers.get("Content-Type") ?? "").split(";")[0]?.trim() ?? "";
    expect(Object.keys(declared.content), where).toContain(mediaType);
    const schema = at === PROBLEM_SHAPE ? at : `${at}/${pointerTo(mediaType, "schema")}`;
    if (mediaType === LINES) {
      expect(text.endsWith("\n"), where).toBe(true);
      for (const line of text.slice(0, -1).split("\n")) {
        expect(this.#errorsOf(schema, JSON.parse(line)), `${where}: ${line}`).toEqual([]);
      }
      return;
    }
    const body: unknown = /json$/.test(mediaType) ? JSON.parse(text) : text;
    expect(this.#errorsOf(schema, body), where).toEqual([]);
    if (mediaType === PROBLEM) {
      // The page that explains this kind of problem, under the same title.
      const { type, title, status } = body as { type: string; title: string; status: number };
      const kind = problemKinds[/\/problems\/([a-z-]+)$/.exec(type)?.[1] ?? ""];
      expect({ title, status }, where).toEqual({ title: kind?.title, status: answer.status });
      expect(kind?.status, where).toBe(answer.status);
    }
  }

  #errorsOf(pointer: string, value: unknown): unknown[] {
    const validate = this.#compiled.get(pointer) ?? this.#ajv.compile({ $ref: `contract#/${pointer}` });
    this.#compiled.set(pointer, validate);
    validate(value);
    return validate.errors ?? [];
  }
}

const PROBLEM_SHAPE = "components/schemas/Problem";
