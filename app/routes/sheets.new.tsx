import { data, redirect } from "react-router";
import { Invalid, Refused, TooLarge } from "#app/http/errors.ts";
import { forPage } from "#app/http/respond.server.ts";
import { receiveSheet } from "#app/intake/receiveSheet.server.ts";
import { readUpload } from "#app/intake/upload.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import type { Route } from "./+types/sheets.new";
import { UploadForm } from "./sheet/UploadForm.tsx";

export const meta: Route.MetaFunction = () => [{ title: "Bring a sheet · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  await requireActing(request, "sheet:work");
  return null;
});

export const action = forPage(async ({ request }: Route.ActionArgs) => {
  const acting = await requireActing(request, "sheet:work");
  try {
    return redirect(paths.sheet(await receiveSheet(acting, await readUpload(request))), 303);
  } catch (error) {
    // What a person can put right is said on the form; anything else is a page of its own.
    if (error instanceof Invalid || error instanceof Refused || error instanceof TooLarge) {
      return data({ sentence: error.message }, { status: error.status });
    }
    throw error;
  }
});

export default function NewSheetPage({ actionData }: Route.ComponentProps) {
  return (
    <Leaf
      heading="Bring a sheet"
      section="sheets"
      lede="Send the sheet as it is. What its columns hold is asked before a row is read, and nothing enters the table without a review."
    >
      <UploadForm wrong={actionData?.sentence} />
      <Section head="What can be read">
        <ul className="list-disc pl-5 max-w-[68ch]">
          <li>
            Text in UTF-8, UTF-16 or Windows-1252, columns separated by commas, semicolons or tabs, one row of heads;
            titles may stand above it, a row of units below it, comments behind #.
          </li>
          <li>One species a row with its values side by side, or one value a row.</li>
          <li>
            Numbers with a point or a decimal comma, with an uncertainty in a column of its own, in brackets or after ±.
          </li>
          <li>kJ, J, kcal and cal per mol; entropies and heat capacities in the same per mol and kelvin.</li>
          <li>At most 10 MB, 20 000 rows, 200 columns and 2 000 characters in a cell.</li>
        </ul>
      </Section>
    </Leaf>
  );
}
