import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/api.guide";

export const meta: Route.MetaFunction = () => [{ title: "For programs · Tablewright" }];

export default function ApiGuidePage() {
  return <Leaf heading="For programs">{null}</Leaf>;
}
