import { Ajv2020, type ValidateFunction } from "ajv/dist/2020.js";
import addFormats from "ajv-formats";
import { expect } from "vitest";

/** The parts of an OpenAPI 3.1 document that answers are held against. */
interface OpenApi {
  paths: Record<
    string,
    Record<string, { responses: Record<string, { content?: Record<string, { schema: object }> }> }>
  >;
  components: { schemas: Record<string, object> };
}

/** Holds real answers against the OpenAPI document that the service itself serves. */
export class Contract {
  readonly #document: OpenApi;
  readonly #ajv = new Ajv2020({ strict: false, allErrors: true });
  readonly #compiled = new Map<string, ValidateFunction>();
  /** Operations (method and path) that at least one answer was held against, with the statuses seen. */
  readonly seen = new Map<string, Set<number>>();

  constructor(document: unknown) {
    this.#document = document as OpenApi;
    addFormats.default(this.#ajv);
    this.#ajv.addSchema(this.#document, "contract");
  }

  /** "get /editions/{edition}" for each operation. */
  get operations(): string[] {
    return Object.entries(this.#document.paths).flatMap(([path, methods]) =>
      Object.keys(methods).map((method) => `${method} ${path}`),
    );
  }

  /** Fails unless the status, media type and body of an answer are what the contract says of the operation. */
  async check(operation: string, answer: Response): Promise<unknown> {
    const [method = "", path = ""] = operation.split(" ");
    const status = answer.status;
    const declared = this.#document.paths[path]?.[method]?.responses[String(status)];
    expect(declared, `${operation} does not say that it answers ${status}`).toBeDefined();
    this.seen.set(operation, (this.seen.get(operation) ?? new Set()).add(status));
    const text = await answer.text();
    if (!declared?.content) {
      expect(text).toBe("");
      return undefined;
    }
    const mediaType = (answer.headers.get("Content-Type") ?? "").split(";")[0]?.trim() ?? "";
    expect(Object.keys(declared.content)).toContain(mediaType);
    const body: unknown = /json$/.test(mediaType) ? JSON.parse(text) : text;
    const pointer = ["paths", path, method, "responses", String(status), "content", mediaType, "schema"]
      .map((part) => encodeURIComponent(part.replaceAll("~", "~0").replaceAll("/", "~1")))
      .join("/");
    const validate = this.#compiled.get(pointer) ?? this.#ajv.compile({ $ref: `contract#/${pointer}` });
    this.#compiled.set(pointer, validate);
    validate(body);
    expect(validate.errors ?? [], `${operation} ${status}`).toEqual([]);
    return body;
  }
}
