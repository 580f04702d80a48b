import { readContract } from "./api/contract.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { openApiDocument } from "./api/document.server.ts";

const api = apiRoute(
  answering(readContract, async ({ request, publicUrl }) =>
    jsonAnswer(request, openApiDocument(publicUrl), { keeping: "asked" }),
  ),
);

export const loader = api.loader;
export const action = api.action;
