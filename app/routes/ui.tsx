import { data, useSearchParams } from "react-router";
import { readSorting } from "#app/ui/SortHead.tsx";
import { Specimens } from "#app/ui/Specimens.tsx";

export const meta = () => [{ title: "Specimens · Tablewright" }];

/** Development and tests only: every piece of the design in all its states. */
export function loader() {
  if (process.env["NODE_ENV"] === "production" && process.env["SPECIMENS"] !== "on") {
    throw data({ kind: "not-found", title: "Not found", detail: "Nothing stands at this address." }, { status: 404 });
  }
  return null;
}

export default function SpecimensPage() {
  const [search] = useSearchParams();
  const columns = ["species", "name", "enthalpyOfFormation", "entropy", "gibbsEnergyOfFormation"];
  return (
    <Specimens
      withErrors={search.has("errors")}
      sorting={readSorting(search.get("sort"), columns, { column: "species", direction: "ascending" })}
    />
  );
}
