import { z } from "zod";
import { createDocument, type ZodOpenApiPathsObject, type ZodOpenApiResponsesObject } from "zod-openapi";
import { readingOperations } from "./contract.ts";
import { API_BASE, type ApiOperation } from "#app/http/apiContract.ts";
import { PROBLEM_TYPE } from "#app/http/problem.ts";

/** Every operation of the API; a test compares this list with the addresses in `app/routes.ts`. */
export const operations: readonly ApiOperation[] = [...readingOperations];

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
  400: "A parameter is unknown or given twice, or the request cannot be read.",
  401: "The key is missing, unknown, withdrawn or past its time.",
  403: "The key does not hold the scope.",
  404: "There is no such edition or species.",
  405: "Another method; Allow lists those that are answered.",
  422: "The value of a parameter cannot be accepted.",
};

function responsesOf(operation: ApiOperation): ZodOpenApiResponsesObject {
  const { answer, otherStatuses, open } = operation;
  const responses: ZodOpenApiResponsesObject = {
    "200": { description: answer.description, content: { [answer.mediaType]: { schema: answer.schema } } },
  };
  for (const status of [...otherStatuses, ...(open ? [] : [401, 403]), 405].sort((a, b) => a - b)) {
    const description = statusWords[status] ?? "";
    responses[`${status}` as "400"] =
      status < 400 ? { description } : { description, content: { [PROBLEM_TYPE]: { schema: problem } } };
  }
  return responses;
}

/** The OpenAPI 3.1 document, from the same schemas that read requests and type answers. */
export function openApiDocument(publicUrl: string) {
  const paths: ZodOpenApiPathsObject = {};
  for (const operation of operations) {
    paths[operation.path] = {
      ...paths[operation.path],
      [operation.method]: {
        operationId: operation.id,
        summary: operation.summary,
        description: operation.description,
        requestParams: { path: operation.parameters, query: operation.query },
        responses: responsesOf(operation),
        ...(operation.open ? { security: [] } : {}),
      },
    };
  }
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
    security: [{ key: [] }],
    components: {
      securitySchemes: {
        key: {
          type: "http",
          scheme: "bearer",
          description: "An API key with the scope read: Authorization: Bearer twk_…",
        },
      },
    },
    paths,
  });
}
