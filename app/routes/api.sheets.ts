import { handInSheet as contract } from "./api/sheetContract.ts";
import { apiPaths } from "./api/shape.ts";
import { apiSheet } from "./api/sheetShape.ts";
import { answering, apiRoute } from "#app/http/api.server.ts";
import { mediaTypeOf, readBytes } from "#app/http/body.server.ts";
import { sentAnswer } from "#app/http/caching.server.ts";
import { Invalid, UnsupportedMedia } from "#app/http/errors.ts";
import { SHEET_LIMITS, tooManyBytes } from "#app/intake/decode.ts";
import { followSheet, handInSheet } from "#app/intake/programSheet.server.ts";
import type { UploadedSheet } from "#app/intake/receiveSheet.server.ts";
import { readUpload } from "#app/intake/upload.server.ts";
import { requireKey } from "#app/people/apiKey.server.ts";

/** The sheet in the body, by its media type. */
async function sheetIn(request: Request, name: string | undefined): Promise<UploadedSheet> {
  switch (mediaTypeOf(request)) {
    case "multipart/form-data": {
      const upload = await readUpload(request);
      return name === undefined ? upload : { ...upload, name };
    }
    case "text/csv": {
      if (name === undefined) {
        const detail = "Say what the sheet is called: ?name=calorimeter.csv.";
        throw new Invalid(detail, [{ pointer: "/name", detail }]);
      }
      return { name, bytes: await readBytes(request, SHEET_LIMITS.bytes, tooManyBytes()) };
    }
    default:
      throw new UnsupportedMedia(
        "Send the sheet as multipart/form-data in the field sheet, or as text/csv with ?name=.",
      );
  }
}

const api = apiRoute(
  answering(contract, async ({ request, query: { name, plan, source }, publicUrl }) => {
    const acting = await requireKey(request, "sheets:write");
    const upload = await sheetIn(request, name);
    const { id, isNew } = await handInSheet(acting, { upload, plan: plan ?? null, source: source ?? null });
    const body = apiSheet(await followSheet(acting, id), publicUrl);
    return isNew ? sentAnswer(body, 201, { Location: apiPaths.sheet(id) }) : sentAnswer(body, 200);
  }),
);

export const loader = api.loader;
export const action = api.action;
