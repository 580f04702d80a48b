import { Link } from "react-router";
import { config } from "#app/config.server.ts";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { findSources } from "#app/editions/read.server.ts";
import { API_BASE } from "#app/http/apiContract.ts";
import { problemKinds } from "#app/http/problem.ts";
import { forPage } from "#app/http/respond.server.ts";
import { findNewestOwnSheet } from "#app/intake/programSheet.server.ts";
import { paths } from "#app/paths.ts";
import { LONGEST_KEY_DAYS, MOST_KEYS } from "#app/people/key.ts";
import { may } from "#app/people/permissions.ts";
import { findVisitor, type Visitor } from "#app/people/visitor.server.ts";
import { ButtonLink } from "#app/ui/Button.tsx";
import { Caution } from "#app/ui/Caution.tsx";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Shell } from "#app/ui/Shell.tsx";
import type { Route } from "./+types/api.guide";
import { LONGEST_PAGE } from "./api/contract.ts";
import { openApiDocument } from "./api/document.server.ts";
import { examplesFor } from "./api/examples.ts";
import { type ExampleFacts, referenceOf } from "./api/reference.ts";
import { ReferenceSection } from "./api/ReferenceSection.tsx";

export const meta: Route.MetaFunction = () => [{ title: "For programs · Tablewright" }];

/** Statuses that the API can answer with a problem document, with the page that explains each. */
const problems = Object.entries(problemKinds).map(([slug, { status, title }]) => ({ slug, status, title }));

/** Open to everybody, as the contract is. A stranger is shown edition 1 in the examples, and learns of no other. */
export const loader = forPage(async ({ request }: Route.LoaderArgs) => {
  const visitor = await findVisitor(request);
  const { publicUrl } = config();
  const reads = visitor !== null && may(visitor.roles, "table:read");
  const edition = (reads ? await findCurrentEdition() : null) ?? 1;
  return {
    publicUrl,
    examples: examplesFor(publicUrl, edition),
    mayMakeKeys: visitor !== null && may(visitor.roles, "key:own"),
    reference: referenceOf(openApiDocument(publicUrl), await factsFor(visitor, edition)),
  };
});

/** A source and a sheet that this reader can ask for, so that the examples answer as they stand. */
async function factsFor(visitor: Visitor | null, edition: number): Promise<ExampleFacts> {
  const [source] = visitor && may(visitor.roles, "table:read") ? (await findSources(edition)).keys() : [];
  const sheet =
    visitor && may(visitor.roles, "sheet:work")
      ? await findNewestOwnSheet({ person: visitor, apiKeyId: null, requestId: null })
      : null;
  return { edition: String(edition), ...(source ? { source } : {}), ...(sheet ? { sheet: String(sheet) } : {}) };
}

/** A shortened answer: the value of water as CODATA Key Values (Cox, Wagman, Medvedev, 1989) print it. */
const ANSWER = `{ "edition": 1, "key": "H2O(l)", "name": "water", …
  "values": [
    { "property": "enthalpyOfFormation", "value": -285.83, "digits": "-285.830",
      "unit": "kJ/mol",
      "uncertainty": { "value": 0.04, "digits": "0.040", "kind": "expanded", "coverageFactor": 2 },
      "source": { "id": "…", "citation": "…", "doi": null }, "since": 1, … }, … ] }`;

export default function ApiGuidePage({ loaderData }: Route.ComponentProps) {
  const { publicUrl, examples, mayMakeKeys, reference } = loaderData;
  return (
    <Leaf
      heading="For programs"
      lede="Everything that stands in the table can be read by a program, as JSON or CSV, from an edition that never changes under it."
    >
      <nav aria-label="On this page" className="actions">
        <a href="#first">The first value</a>
        <a href="#pinning">Pinning</a>
        <a href="#more">More requests</a>
        <a href="#errors">Errors</a>
        <a href="#limits">Limits</a>
        <a href="#reference">Reference</a>
      </nav>

      <Section head="From a key to the first value" id="first">
        <ol className="max-w-[76ch] list-decimal space-y-4 pl-5">
          <li>
            <p>Make a key for the program. It reads the table as you, is shown once, and can be withdrawn by itself.</p>
            {mayMakeKeys ? (
              <p className="mt-3">
                <ButtonLink to={paths.keys()}>Make a key</ButtonLink>
              </p>
            ) : (
              <p className="mt-1">
                <Link to={paths.signIn(paths.keys())}>Sign in</Link>, then Account, API keys.
              </p>
            )}
          </li>
          <li>
            <p>Keep it where the program finds it, and nowhere else: not in the address, not in the source.</p>
            <Shell label="The key in a variable">{"export TABLEWRIGHT_KEY='twk_…'"}</Shell>
          </li>
          <li>
            <p>Ask which edition is the newest. The answer names its number.</p>
            <Shell label={examples.newest.says}>{examples.newest.command}</Shell>
          </li>
          <li>
            <p>Read a species from that edition, by its number.</p>
            <Shell label={examples.first.says}>{examples.first.command}</Shell>
            <p>
              The answer, shortened. <b>digits</b> is the number as it is printed, for people and for keeping;{" "}
              <b>value</b> is the nearest double, for computing.
            </p>
            <Shell label="The answer, shortened">{ANSWER}</Shell>
          </li>
        </ol>
      </Section>

      <Section head="Pinning an edition" id="pinning">
        <div className="max-w-[68ch] space-y-3">
          <p>
            Write the number of the edition into the program, next to the results it computes. Under a number, species,
            values and tables are the same bytes for ever: they carry an ETag and may be kept without asking again.
          </p>
          <p>
            The word current stands for the newest edition. Its answer names the numbered address in Content-Location;
            ask it when you want to know of news, not in the middle of a computation.
          </p>
          <p>
            What is said of an edition, its successor or its withdrawal, can change: send the ETag back in
            If-None-Match, and nothing new answers 304 without a body. To move a program to a newer edition, compare the
            two first.
          </p>
        </div>
      </Section>

      <Section head="More requests" id="more">
        {examples.more.map(({ id, says, command }) => (
          <div key={id}>
            <p>{says}.</p>
            <Shell label={says}>{command}</Shell>
          </div>
        ))}
        <p className="max-w-[68ch]">
          A species is named by its key, H2O(l) or SO4-2(aq). In a list, commas between brackets belong to the key. A
          slash in a key is %2F in a path, or use ?key=. A usual variant of a key, and one that the species had in an
          earlier edition, is sent on (308) to the key of that edition: let the program follow redirects (curl -L).
        </p>
      </Section>

      <Section head="Errors" id="errors">
        <p className="mb-3 max-w-[68ch]">
          Every refusal is a problem document (RFC 9457, application/problem+json): type is the address of a page here
          that explains the kind, detail says what is wrong this time and what to do, errors names each value that
          cannot be accepted. Decide by the status or the type; the sentences are for people. Nothing is ever left out
          silently: a species that the edition does not have is a 404 that names it.
        </p>
        <ul className="space-y-1">
          {problems.map(({ slug, status, title }) => (
            <li key={slug}>
              <span className="inline-block w-12 text-soft">{status}</span>
              <Link to={paths.problem(slug)}>{title}</Link>
            </li>
          ))}
        </ul>
      </Section>

      <Section head="Limits" id="limits">
        <ul className="max-w-[68ch] list-disc space-y-1 pl-5">
          <li>
            A page of a list holds at most {LONGEST_PAGE} entries; next, and the Link header, lead to the one after.
          </li>
          <li>
            A key is good for at most {LONGEST_KEY_DAYS} days, and a person holds at most {MOST_KEYS} in use. Past its
            time, or withdrawn, it answers 401.
          </li>
          <li>
            A parameter given twice, and one that an address does not know, is 400 and not passed over: a typing mistake
            in a filter must not widen the answer.
          </li>
          <li>
            For the whole of an edition fetch table.csv, table.json or table.ndjson once, and keep it; do not walk the
            species one by one.
          </li>
        </ul>
      </Section>

      <Section head="Reference" id="reference">
        <p className="max-w-[68ch]">
          Made from the contract itself, <a href={paths.api("openapi.json")}>openapi.json</a> (OpenAPI 3.1), which needs
          no key. Every address below stands under{" "}
          <span className="break-all">
            {publicUrl}
            {API_BASE}
          </span>
          .
        </p>
        <ReferenceSection reference={reference} />
      </Section>
      <Caution />
    </Leaf>
  );
}
