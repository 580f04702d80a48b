import { forPage } from "#app/http/respond.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/find";

export const meta: Route.MetaFunction = () => [{ title: "Find · Tablewright" }];

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  return null;
});

export default function FindPage() {
  return <Leaf heading="Find">{null}</Leaf>;
}
