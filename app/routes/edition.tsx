import { Link } from "react-router";
import { config } from "#app/config.server.ts";
import { catalogueRecord, citationRecord, citationText } from "#app/editions/editionPage.ts";
import { type EditionPage, findEditionPage } from "#app/editions/editionPage.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findEditionReview } from "#app/review/editionPage.server.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { count } from "#app/ui/figure.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Notice } from "#app/ui/Notice.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Time } from "#app/ui/Time.tsx";
import type { Route } from "./+types/edition";
import { Behind } from "./edition/Behind.tsx";
import { Changes } from "./edition/Changes.tsx";
import { Cite } from "./edition/Cite.tsx";
import { Examined } from "./edition/Examined.tsx";
import { Files } from "./edition/Files.tsx";
import { useEditionFrame, WithdrawnNotice } from "./edition/Frame.tsx";
import { keptByAddress } from "./edition/kept.ts";
import { pinnedEdition } from "./edition/pin.server.ts";

export const meta: Route.MetaFunction = ({ loaderData, params }) => [
  { title: /^\d+$/.test(params.edition) ? `Edition ${params.edition} · Tablewright` : "Edition · Tablewright" },
  ...(loaderData ? [{ "script:ld+json": loaderData.record }] : []),
];

export const loader = forPage(async ({ request, params }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "table:read");
  const edition = await pinnedEdition(request, params.edition);
  const page = await findEditionPage(acting, edition);
  const { number, publishedAt, publisher, licence, speciesCount, valueCount, withdrawn } = page.frame;
  const at = (path: string): string => `${config().publicUrl}${path}`;
  const cited = {
    number,
    publishedAt,
    publisher,
    licence,
    digest: page.digest,
    address: at(paths.edition(number)),
  };
  const record = catalogueRecord({
    ...cited,
    notes: page.notes,
    speciesCount,
    valueCount,
    download: at(paths.tableDownload(number)),
    previous: page.previous === null ? null : at(paths.edition(page.previous)),
    withdrawnBy: withdrawn && at(paths.edition(withdrawn.edition)),
  });
  return {
    page,
    review: await findEditionReview(acting, number),
    cite: { text: citationText(cited), record: JSON.stringify(citationRecord(cited), null, 2) },
    record,
  };
});

export async function clientLoader({ request, serverLoader }: Route.ClientLoaderArgs) {
  return keptByAddress(request, serverLoader);
}

export default function EditionRoute({ loaderData: { page, review, cite } }: Route.ComponentProps) {
  const { frame } = page;
  const { number, publishedAt, publisher } = frame;
  const { bookmark, ribbon } = useEditionFrame(frame);
  return (
    <Leaf
      heading={`Edition ${number}`}
      section="editions"
      bookmark={bookmark}
      ribbon={ribbon}
      lede={
        <>
          {count(frame.valueCount)} values of {count(frame.speciesCount)} species. Published by {publisher},{" "}
          <Time at={publishedAt} withTime />, under the licence {page.licence}.
        </>
      }
    >
      <WithdrawnNotice frame={frame} />
      <Withdraws page={page} />
      <p className="my-4 max-w-[68ch] whitespace-pre-line">
        <Prose text={page.notes} />
      </p>
      <div className="actions">
        <ButtonLink to={paths.table(number)}>Read the table</ButtonLink>
        {page.previous !== null && (
          <Link to={paths.compare(page.previous, number)}>Compare with edition {page.previous}</Link>
        )}
        <Link to={paths.editions()}>All editions</Link>
      </div>
      <Changes page={page} />
      <Behind revisions={review.revisions} frame={frame} />
      <Examined examination={review.examination} number={number} />
      <Cite cite={cite} />
      <Files page={page} />
      <Caution />
    </Leaf>
  );
}

function Withdraws({ page: { withdraws, frame } }: { page: EditionPage }) {
  if (!withdraws) return null;
  return (
    <Notice
      word="withdraws"
      text={`Edition ${frame.number} withdraws edition ${withdraws.edition}: ${withdraws.reason}`}
    >
      <p>
        <Link to={paths.edition(withdraws.edition)}>Edition {withdraws.edition}</Link> stays readable as it was
        published.
      </p>
    </Notice>
  );
}
