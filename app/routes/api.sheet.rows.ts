import { listAnswer, numbersOf, placeOf } from "./api/answer.server.ts";
import { apiPaths, writeCursor } from "./api/shape.ts";
import { listSheetRows } from "./api/sheetContract.ts";
import { apiSheetRow } from "./api/sheetShape.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { numberInPath } from "#app/http/respond.server.ts";
import { followRows } from "#app/intake/programSheet.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

const api = apiRoute(
  answering(listSheetRows, async ({ request, params, query: { outcome, limit, cursor } }) => {
    const acting = await requireKey(request, "sheets:write");
    const sheet = numberInPath(params["sheet"]);
    const [after = 0] = numbersOf(placeOf(cursor, 1));
    const { rows, more, nameOf } = await followRows(acting, sheet, { outcome: outcome ?? null, after, limit });
    const last = rows.at(-1);
    const next = more && last ? writeCursor([String(last.number)]) : null;
    const body = { sheet, rows: rows.map((row) => apiSheetRow(row, nameOf)) };
    return listAnswer(request, body, { next, path: apiPaths.sheetRows(sheet) });
  }),
);

export const loader = api.loader;
export const action = api.action;
