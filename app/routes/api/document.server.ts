import { z } from "zod";
import { createDocument, type ZodOpenApiPathsObject, type ZodOpenApiResponsesObject } from "zod-openapi";
import { readingOperations } from "./contract.ts";
import { headersOf } from "./headers.ts";
import { sheetOperations } from "./sheetContract.ts";
import { API_BASE, API_GROUPS, type ApiOperation } from "#app/http/apiContract.ts";
import { PROBLEM_TYPE } from "#app/http/problem.ts";

/** Every operation of the API; a test compares this list with the addresses in `app/routes.ts`. */
export const operations: readonly ApiOperation[] = [...readingOperations, ...sheetOperations];

const problem = z
  .object({
    type: z.url().meta({ description: "Address of a page that explains this kind of problem." }),
    title: z.string(),
    status: z.int(),
    detail: z.string().meta({ description: "What is wrong here, and what to do." }),
    instance: z.string().optional().meta({ description: "Names the request, for asking an administrator about it." }),
    errors: z
      .array(z.object({ pointer: z.string(), detail: z.string() }))
      .optional()
      .meta({ description: "Each value that cannot be accepted: a JSON Pointer (RFC 6901) and a sentence." }),
  })
  .meta({ id: "Problem", description: "A problem document (RFC 9457)." });

const statusWords: Readonly<Record<number, string>> = {
  304: "Not changed since the answer whose ETag was sent with If-None-Match.",
  308: "The canonical address, in Location.",
  400: "A parameter is unknown or given twice, or the request or its body cannot be read.",
  401: "The key is missing, unknown, withdrawn or past its time.",
  403: "The key does not hold the scope.",
  404: "There is nothing of this name here, or it is not the key owner's to see.",
  405: "Another method; Allow lists those that are answered.",
  409: "What was asked contradicts how things stand now.",
  413: "The body is larger than the limit.",
  415: "The body is in a form that this address does not read.",
  422: "A value cannot be accepted; errors points at each.",
};

function responsesOf(operation: ApiOperation): ZodOpenApiResponsesObject {
  const { answer, otherStatuses, scope } = operation;
  const content = Object.fromEntries(
    Object.entries({ [answer.mediaType]: answer.schema, ...answer.others }).map(([type, schema]) => [type, { schema }]),
  );
  const responses: ZodOpenApiResponsesObject = {
    "200": { description: answer.description, headers: headersOf(operation, 200), content },
  };
  if (answer.created) {
    responses["201"] = { description: answer.created, headers: headersOf(operation, 201), content };
  }
  for (const status of [...otherStatuses, ...(scope ? [401, 403] : []), 405].sort((a, b) => a - b)) {
    const described = { description: statusWords[status] ?? "", headers: headersOf(operation, status) };
    responses[`${status}` as "400"] =
      status < 400 ? described : { ...described, content: { [PROBLEM_TYPE]: { schema: problem } } };
  }
  return responses;
}

/** The OpenAPI 3.1 document, from the same schemas that read requests and type answers. */
export function openApiDocument(publicUrl: string) {
  const paths: ZodOpenApiPathsObject = {};
  for (const operation of operations) {
    const { body } = operation;
    paths[operation.path] = {
      ...paths[operation.path],
      [operation.method]: {
        operationId: operation.id,
        tags: [operation.group],
        summary: operation.summary,
        description: operation.description,
        requestParams: { path: operation.parameters, query: operation.query },
        ...(body ? { requestBody: { description: body.description, required: true, content: body.content } } : {}),
        responses: responsesOf(operation),
        ...(operation.scope ? {} : { security: [] }),
      },
    };
  }
  const used = new Set(operations.map((operation) => operation.group));
  return createDocument({
    openapi: "3.1.0",
    info: {
      title: "Tablewright",
      version: "1.0.0",
      description:
        "Values of a laboratory's table of thermochemical properties. Under a numbered edition every answer is the same for ever; " +
        "pin the number and compute the same result next year. Standard-state tables describe equilibrium of pure substances, " +
        "not speed, not real mixtures, not safety.",
      license: { name: "As each edition states it", url: `${publicUrl}/editions` },
    },
    servers: [{ url: `${publicUrl}${API_BASE}` }],
    tags: Object.entries(API_GROUPS)
      .filter(([name]) => used.has(name as keyof typeof API_GROUPS))
      .map(([name, description]) => ({ name, description })),
    security: [{ key: [] }],
    components: {
      securitySchemes: {
        key: {
          type: "http",
          scheme: "bearer",
          description: "An API key: Authorization: Bearer twk_…. It holds the scope read, sheets:write, or both.",
        },
      },
    },
    paths,
  });
}
