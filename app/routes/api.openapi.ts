import { readContract } from "./api/contract.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { openApiDocument } from "./api/document.server.ts";

export const { loader, action } = apiRoute(
  answering(readContract, async ({ request, publicUrl }) =>
    jsonAnswer(request, openApiDocument(publicUrl), { keeping: "asked" }),
  ),
);
