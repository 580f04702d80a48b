import { attachment } from "#app/http/attachment.ts";
import { forPage, numberInPath } from "#app/http/respond.server.ts";
import { findFindings } from "#app/intake/sheetPage.server.ts";
import { findingsAsCsv } from "#app/intake/findingsFile.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/sheet.findings";

/** What is wrong with the rows of a sheet, as a file for whoever made it. */
export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "sheet:read");
  const { name, findings } = await findFindings(acting, numberInPath(params.sheet));
  return new Response(findingsAsCsv(findings), {
    headers: {
      "Content-Type": "text/csv; charset=utf-8",
      "Content-Disposition": attachment(`refused rows of ${name.replace(/\.\w{1,4}$/, "")}.csv`),
      "Cache-Control": "private, no-store",
    },
  });
});
