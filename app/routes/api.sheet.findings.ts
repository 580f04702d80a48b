import { listAnswer, numbersOf, placeOf } from "./api/answer.server.ts";
import { apiPaths, writeCursor } from "./api/shape.ts";
import { listSheetFindings } from "./api/sheetContract.ts";
import { apiSheetFinding } from "./api/sheetShape.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { numberInPath } from "#app/http/respond.server.ts";
import { type FindingPlace, followFindings } from "#app/intake/programSheet.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

/** A cursor holds row and index of a problem, or no row and the number of a finding. */
function findingPlace(cursor: string | undefined): FindingPlace {
  const [row = 0, index = 0] = numbersOf(placeOf(cursor, 2));
  return cursor !== undefined && row === 0
    ? { after: "examined", id: String(index) }
    : { after: "problem", row, index };
}

const api = apiRoute(
  answering(listSheetFindings, async ({ request, params, query: { limit, cursor } }) => {
    const acting = await requireKey(request, "sheets:write");
    const sheet = numberInPath(params["sheet"]);
    const { findings, more, nameOf } = await followFindings(acting, sheet, { place: findingPlace(cursor), limit });
    const last = findings.at(-1);
    const place = last && (last.kind === "problem" ? [String(last.row), String(last.index)] : ["0", last.id]);
    const next = more && place ? writeCursor(place) : null;
    const body = { sheet, findings: findings.map((finding) => apiSheetFinding(finding, nameOf)) };
    return listAnswer(request, body, { next, path: apiPaths.sheetFindings(sheet) });
  }),
);

export const loader = api.loader;
export const action = api.action;
