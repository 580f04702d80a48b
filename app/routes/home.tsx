import { Leaf } from "#app/ui/Leaf.tsx";
import type { Route } from "./+types/home";

export const meta: Route.MetaFunction = () => [{ title: "Home · Tablewright" }];

export default function HomePage() {
  return <Leaf heading="Tablewright">{null}</Leaf>;
}
