import { data, Link } from "react-router";
import { checkOf } from "#app/checks/registry.ts";
import { paths } from "#app/paths.ts";
import { InlineMark } from "#app/ui/MarginMark.tsx";
import { Prose } from "#app/ui/Prose.tsx";
import { Section } from "#app/ui/Section.tsx";
import { markWords } from "#app/ui/Signs.tsx";
import type { Route } from "./+types/conventions.check";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.title ?? "No such check"} · Conventions · Tablewright` },
];

export function loader({ params }: Route.LoaderArgs) {
  const check = checkOf(params.check);
  if (!check) {
    const detail = `There is no check called “${params.check}”. The page “What is checked” lists them all.`;
    throw data({ kind: "not-found", title: "Not found", detail }, { status: 404 });
  }
  const { run: _run, ...entry } = check;
  return entry;
}

const meanings = {
  block: "stops the line until it is mended, or a reviewer sets the finding aside with a reason",
  look: "asks a person to look; the line can be accepted",
  remark: "says something worth knowing",
};

/** One check: what it asks, its rule, where the rule comes from, and how to read a finding. Every finding leads here. */
export default function CheckPage({ loaderData: check }: Route.ComponentProps) {
  return (
    <ConventionsLeaf part="checks" heading={<Prose text={check.title} />} lede={<Prose text={check.appliesTo} />}>
      <Section head="The rule">
        <div className="border-l border-rule pl-4">
          {check.formula.map((line) => (
            <p key={line} className="my-1">
              <Prose text={line} />
            </p>
          ))}
        </div>
        <p className="fine mt-3">
          <Prose text={check.source} />
        </p>
      </Section>
      <Section head="Why, and how to read it">
        {check.explanation.map((paragraph) => (
          <p key={paragraph} className="mb-2 max-w-[72ch]">
            <Prose text={paragraph} />
          </p>
        ))}
      </Section>
      <Section head="What a finding does">
        <ul>
          {check.severities.map((severity) => (
            <li key={severity} className="my-1">
              <InlineMark kind={severity}>{markWords[severity]}</InlineMark>: {meanings[severity]}
            </li>
          ))}
        </ul>
      </Section>
      <Section head="An example">
        <p className="text-soft">
          <Prose text={check.example.given} />
        </p>
        <div className={`note is-${check.severities[0] ?? "remark"}`}>
          <p>
            <Prose text={check.example.sentence} />
          </p>
        </div>
      </Section>
      <p className="fine mt-8">
        Code <code className="font-sans">{check.code}</code>, version {check.version} ·{" "}
        <Link to={paths.conventionsChecks()}>all checks</Link>
      </p>
    </ConventionsLeaf>
  );
}
