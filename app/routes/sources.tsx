import { redirect } from "react-router";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { may } from "#app/people/permissions.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/sources";

export const meta: Route.MetaFunction = () => [{ title: "Sources · Tablewright" }];

/** Leads to the sources of the newest edition; there is something to say here only while there is none. */
export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const { person } = await requireActing(request, "table:read");
  const newest = await findCurrentEdition();
  if (newest !== null) throw redirect(paths.sourcesIn(newest) + new URL(request.url).search);
  return { writes: may(person.roles, "revision:write") };
});

export default function SourcesPage({ loaderData: { writes } }: Route.ComponentProps) {
  return (
    <Leaf heading="Sources" section="sources" lede="Where the numbers of the table come from.">
      <EmptyPage start={writes && <ButtonLink to={paths.newSource()}>Add a source</ButtonLink>}>
        No edition holds a source yet. A source comes in with the sheet that brings its values, or is added by hand.
      </EmptyPage>
    </Leaf>
  );
}
