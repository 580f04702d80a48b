import { attachment } from "#app/http/attachment.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { findOriginal } from "#app/intake/sheetPage.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/sheet.original";

/** The uploaded file as it came, byte for byte. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "sheet:read");
  const { name, bytes } = await findOriginal(acting, numberInPath(params.sheet));
  return new Response(new Uint8Array(bytes), {
    headers: {
      // Never shown in the browser, whatever the bytes are; nosniff is on every answer of the server.
      "Content-Type": "application/octet-stream",
      "Content-Disposition": attachment(name),
      "Content-Length": String(bytes.length),
      "Cache-Control": "private, no-store",
    },
  });
});
