import { readSheet } from "./api/sheetContract.ts";
import { apiSheet } from "./api/sheetShape.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { jsonAnswer } from "#app/http/caching.server.ts";
import { numberInPath } from "#app/http/respond.server.ts";
import { followSheet } from "#app/intake/programSheet.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(readSheet, async ({ request, params, publicUrl }) => {
    const acting = await requireKey(request, "sheets:write");
    const followed = await followSheet(acting, numberInPath(params["sheet"]));
    return jsonAnswer(request, apiSheet(followed, publicUrl), { keeping: "asked" });
  }),
);

export const loader = api.loader;
export const action = api.action;
