import { Link } from "react-router";
import { findFrames } from "#app/editions/editionPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { EmptyPage } from "#app/ui/EmptyPage.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/editions";

export const meta: Route.MetaFunction = () => [{ title: "Editions · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  return { editions: await findFrames() };
});

export default function EditionsPage({ loaderData: { editions } }: Route.ComponentProps) {
  return (
    <Leaf heading="Editions" section="editions">
      {editions.length === 0 && <EmptyPage>No edition is published yet.</EmptyPage>}
      <ul>
        {editions.map(({ number }) => (
          <li key={number}>
            <Link to={paths.edition(number)}>Edition {number}</Link>
          </li>
        ))}
      </ul>
    </Leaf>
  );
}
