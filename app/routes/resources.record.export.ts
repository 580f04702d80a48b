import { redirect } from "react-router";
import { exportRecord } from "#app/audit/exportRecord.server.ts";
import { RECORD_FORMATS, RECORD_MEDIA } from "#app/audit/recordFile.ts";
import { readRecordFilter, RECORD_FIELDS, type RecordFields } from "#app/audit/recordPage.ts";
import { streamOf } from "#app/editions/tableFile.server.ts";
import { attachment } from "#app/http/attachment.ts";
import { Invalid } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/resources.record.export";

/** Whoever follows the address by hand is taken to the page. */
export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  await requireActing(request, "record:read");
  return redirect(paths.record());
});

/** The record as a file. A form and no link, because handing it out is an act that goes on record. */
export const action = forPage(async ({ request }: Route.ActionArgs) => {
  const acting = await requireActing(request, "record:read");
  const form = await readForm(request);
  const format = RECORD_FORMATS.find((one) => one === form.get("format"));
  if (!format) throw new Invalid("Choose JSON Lines or CSV for the file of the record.");
  const fields: RecordFields = {};
  for (const name of RECORD_FIELDS) {
    const value = form.get(name);
    if (typeof value === "string") fields[name] = value;
  }
  const { filter, wrong } = readRecordFilter(fields);
  const sentences = Object.values(wrong);
  if (sentences.length > 0) throw new Invalid(sentences.join(" "));
  const { name, bytes } = await exportRecord(acting, filter, format);
  return new Response(streamOf(bytes), {
    headers: {
      "Content-Type": RECORD_MEDIA[format],
      "Content-Disposition": attachment(name),
      "Cache-Control": "private, no-store",
    },
  });
});
