import { findFrame } from "#app/editions/frame.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/edition";
import { useEditionFrame, WithdrawnNotice } from "./edition/Frame.tsx";
import { pinnedEdition } from "./edition/pin.server.ts";

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Edition ${params.edition} · Tablewright` }];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  await requireActing(request, "table:read");
  return { frame: await findFrame(await pinnedEdition(request, params.edition)) };
});

export default function EditionPage({ loaderData: { frame } }: Route.ComponentProps) {
  return (
    <Leaf heading={`Edition ${frame.number}`} section="editions" {...useEditionFrame(frame, { counts: true })}>
      <WithdrawnNotice frame={frame} />
    </Leaf>
  );
}
