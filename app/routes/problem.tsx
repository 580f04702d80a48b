import { Link } from "react-router";
import { NotFound } from "#app/http/errors.ts";
import { problemKinds, problemOf } from "#app/http/problem.ts";
import { config } from "#app/config.server.ts";
import { forPage } from "#app/http/respond.server.ts";
import { paths } from "#app/paths.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import { Section } from "#app/ui/Section.tsx";
import { Shell } from "#app/ui/Shell.tsx";
import type { Route } from "./+types/problem";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.title ?? "No such problem"} · Tablewright` },
];

export const loader = forPage(async ({ params }: Route.LoaderArgs) => {
  const kind = Object.hasOwn(problemKinds, params.slug) ? problemKinds[params.slug] : undefined;
  if (!kind) throw new NotFound(`There is no kind of problem called “${params.slug.slice(0, 80)}”.`);
  const example = problemOf(
    params.slug,
    "The sentence for this one time: what is wrong, where, and what to do.",
    config().publicUrl,
  );
  return {
    slug: params.slug,
    ...kind,
    example: JSON.stringify(example, null, 2),
    others: Object.entries(problemKinds)
      .filter(([slug]) => slug !== params.slug)
      .map(([slug, { status, title }]) => ({ slug, status, title })),
  };
});

/** One kind of problem: the address that a problem document names as its type. */
export default function ProblemPage({ loaderData: problem }: Route.ComponentProps) {
  return (
    <Leaf heading={problem.title} lede={`Status ${problem.status}, problem type “${problem.slug}”.`}>
      <Section head="What it means">
        <p className="max-w-[68ch]">{problem.explanation}</p>
      </Section>
      <Section head="What to do">
        <p className="max-w-[68ch]">{problem.cure}</p>
        <p className="mt-3 max-w-[68ch]">
          Every answer carries an id in the header X-Request-Id. Name it when you ask an administrator: the log has it
          too.
        </p>
      </Section>
      <Section head="How a program sees it">
        <p className="mb-3 max-w-[68ch]">
          The API answers with a problem document (RFC 9457, application/problem+json). Its type is the address of this
          page and never changes; its detail is the sentence for this one time.
        </p>
        <Shell label="A problem document">{problem.example}</Shell>
      </Section>
      <Section head="The other kinds">
        <ul className="space-y-1">
          {problem.others.map((other) => (
            <li key={other.slug}>
              <span className="inline-block w-12 text-soft">{other.status}</span>
              <Link to={paths.problem(other.slug)}>{other.title}</Link>
            </li>
          ))}
        </ul>
      </Section>
      <p className="fine mt-8">
        <Link to={paths.apiGuide()}>For programs</Link>: keys, pinning, limits and every address of the API.
      </p>
    </Leaf>
  );
}
