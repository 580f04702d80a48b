import { data } from "react-router";
import { problemKinds } from "#app/http/problem.ts";
import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/problem";

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.title ?? "No such problem"} · Tablewright` },
];

export function loader({ params }: Route.LoaderArgs) {
  const problem = Object.hasOwn(problemKinds, params.slug) ? problemKinds[params.slug] : undefined;
  if (!problem) {
    const detail = `There is no kind of problem called “${params.slug}”.`;
    throw data({ kind: "not-found", title: "Not found", detail }, { status: 404 });
  }
  return problem;
}

export default function ProblemPage({ loaderData: { title, explanation } }: Route.ComponentProps) {
  return <Leaf heading={title}>{explanation}</Leaf>;
}
