import { data, Link, redirect } from "react-router";
import { BadRequest } from "#app/http/errors.ts";
import { readForm } from "#app/http/forms.server.ts";
import { forPage, readQuery } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { requireActing } from "#app/people/visitor.server.ts";
import { findNewSpeciesPage, findProposePage, type ProposePage } from "#app/review/proposePage.server.ts";
import { isProperty } from "#app/thermo/property.ts";
import { draftBookmark } from "#app/ui/Bookmark.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import type { Route } from "./+types/propose";
import { proposeFrom } from "./propose/act.server.ts";
import { NamesForm } from "./propose/Names.tsx";
import { NewSpeciesForm } from "./propose/NewSpecies.tsx";
import { OtherForm } from "./propose/Other.tsx";
import { PROPOSALS, type Proposal, proposalWords } from "./propose/outcome.ts";
import { ValuesForm } from "./propose/Values.tsx";
import { WithdrawalForm } from "./propose/Withdrawal.tsx";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  {
    title: `${loaderData?.page ? `Propose a change of ${loaderData.page.species.key}` : "Propose a species"} · Tablewright`,
  },
];

/** What the address asks for: a species and the kind of change, or neither for a species that is new. */
function asked(request: Request) {
  const query = readQuery(request, ["species", "what", "property", "revision"]);
  const { species, what = "values", property = null, revision = null } = query;
  const proposal = PROPOSALS.find((one): one is Proposal => one === what);
  if (!proposal) throw new BadRequest("This address does not say what to propose.");
  if (property !== null && !isProperty(property)) throw new BadRequest(`The table has no property "${property}".`);
  if (revision !== null && !/^[1-9]\d{0,8}$/.test(revision)) {
    throw new BadRequest("The revision in this address is not a number.");
  }
  return { species: species ?? null, proposal, property, revision: revision === null ? null : Number(revision) };
}

export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const acting = await requireActing(request, "revision:write");
  const { species, ...rest } = asked(request);
  if (species === null) return { ...rest, page: null, fresh: await findNewSpeciesPage(acting, rest.revision) };
  return { ...rest, page: await findProposePage(acting, species, rest.revision), fresh: null };
});

export const action = forPage(async ({ request }: Route.ActionArgs) => {
  const acting = await requireActing(request, "revision:write");
  const { species } = asked(request);
  const answer = await proposeFrom(acting, species, await readForm(request));
  if ("revisionId" in answer) return redirect(paths.revision(answer.revisionId), 303);
  return data(answer.reply, { status: answer.status });
});

export default function ProposeRoute({ loaderData, actionData: reply }: Route.ComponentProps) {
  const { page, fresh, proposal, property, revision } = loaderData;
  if (!page) {
    return (
      <Leaf
        heading="Propose a species"
        lede="A species that the table does not have. What it may be the same as is asked before anything is written."
        section="revisions"
        bookmark={draftBookmark(fresh.edition || null)}
      >
        <NewSpeciesForm page={fresh} revision={revision} reply={reply} />
      </Leaf>
    );
  }
  const given = { page, revision, reply: reply?.intent === proposal ? reply : undefined };
  return (
    <Leaf
      heading={
        <>
          Propose a change of <SpeciesName speciesKey={page.species.key} printed={page.species.detail.printed} />
        </>
      }
      lede={[page.species.detail.name, page.species.detail.cas && `CAS ${page.species.detail.cas}`]
        .filter(Boolean)
        .join(" · ")}
      section="revisions"
      bookmark={draftBookmark(page.edition || null)}
    >
      <Kinds page={page} proposal={proposal} revision={revision} />
      <AlsoProposed page={page} />
      {proposal === "values" && <ValuesForm {...given} property={property} />}
      {proposal === "withdrawal" && <WithdrawalForm {...given} />}
      {proposal === "names" && <NamesForm {...given} />}
      {proposal === "other" && <OtherForm {...given} />}
    </Leaf>
  );
}

/** The kinds of change, the one shown marked. */
function Kinds({ page, proposal, revision }: { page: ProposePage; proposal: Proposal; revision: number | null }) {
  return (
    <nav aria-label="What to propose" className="mb-4">
      <ul className="flex flex-wrap gap-x-5 gap-y-1">
        {PROPOSALS.map((what) => (
          <li key={what}>
            {what === proposal ? (
              <b aria-current="page">{proposalWords[what]}</b>
            ) : (
              <Link to={paths.propose({ species: page.species.key, what, revision })}>{proposalWords[what]}</Link>
            )}
          </li>
        ))}
      </ul>
    </nav>
  );
}

/** What others propose for the same species and nobody decided yet. */
function AlsoProposed({ page }: { page: ProposePage }) {
  if (page.proposed.length === 0) return null;
  return (
    <p className="fine mb-6">
      Proposed already and not decided:{" "}
      {page.proposed.map((line, index) => (
        <span key={`${line.revisionId} ${line.what}`}>
          {index > 0 && "; "}
          <Prose text={`${line.what} (${line.says})`} /> in{" "}
          <Link to={paths.revision(line.revisionId)}>revision {line.revisionId}</Link>
        </span>
      ))}
      .
    </p>
  );
}
