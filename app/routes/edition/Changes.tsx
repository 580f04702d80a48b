import { Link } from "react-router";
import type { EditionPage } from "#app/editions/editionPage.server.ts";
import type { ListedChange } from "#app/editions/leadingChanges.ts";
import { paths } from "#app/paths.ts";
import { bracketForm } from "#app/thermo/notation.ts";
import { propertyInfo } from "#app/thermo/property.ts";
import { signed } from "#app/ui/concise.ts";
import { type Column, DataTable } from "#app/ui/DataTable.tsx";
import { count, tailOf } from "#app/ui/figure.ts";
import { Lede, Section } from "#app/ui/Section.tsx";
import { SpeciesName } from "#app/ui/SpeciesName.tsx";
import { Symbol } from "#app/ui/Symbol.tsx";
import { UnitText } from "#app/ui/UnitText.tsx";
import { Figures } from "#app/ui/ValueCell.tsx";
import { changesInWords } from "../home/words.ts";

/** What an edition did to the one before it, with its first changes by name. */
export function Changes({ page }: { page: EditionPage }) {
  const { previous, changes, frame, came, changed, went } = page;
  const { number } = frame;
  if (previous === null || !changes) {
    return (
      <Section head="What it changed">
        <Lede>It is the first edition of this table: all its {count(came)} values came in with it.</Lede>
      </Section>
    );
  }
  const { listed, renamed, recited } = changes;
  const all = came + changed + went;
  const others = [
    ...(renamed > 0 ? [`${count(renamed)} species ${renamed === 1 ? "is" : "are"} called otherwise`] : []),
    ...(recited > 0 ? [`${recited === 1 ? "one source is" : `${count(recited)} sources are`} cited otherwise`] : []),
  ];
  const cameOnly = listed.every(({ what }) => what === "came");
  const words = changesInWords({ came, changed, went });
  return (
    <Section head="What it changed">
      <Lede>
        Against edition {previous}, {words}
        {others.length > 0 && `; ${others.join(", ")}`}.
      </Lede>
      {listed.length > 0 && (
        <DataTable
          caption={`Changes of edition ${number} against edition ${previous}`}
          rows={listed}
          columns={columnsFor(previous, number, listed)}
          hidden={cameOnly ? ["what", "before", "difference"] : []}
          rowKey={({ key, property }) => `${key} ${property}`}
          className={cameOnly ? "max-w-[36rem]" : "max-w-[60rem]"}
        />
      )}
      <p className="mt-3">
        {all > listed.length && listed.length > 0 && (
          <span className="text-soft">
            The first {count(listed.length)} of {count(all)}
            {changed > 0 && ", those furthest beyond their uncertainties before the others"}.{" "}
          </span>
        )}
        <Link to={paths.compare(previous, number)}>
          {all > listed.length ? "All of them" : "More about them"} in the comparison with edition {previous}
        </Link>
      </p>
    </Section>
  );
}

const WHAT: Record<ListedChange["what"], string> = { changed: "changed", came: "came", went: "went" };

function columnsFor(previous: number, number: number, listed: readonly ListedChange[]): Column<ListedChange>[] {
  const tail = (side: "before" | "after"): number =>
    tailOf(listed.flatMap((one) => (one[side] ? [bracketForm(one[side].digits, one[side].uncertainty)] : [])));
  const tails = { before: tail("before"), after: tail("after") };
  return [
    {
      id: "species",
      head: "Species",
      rowHead: true,
      cell: ({ key, what }) => (
        <SpeciesName speciesKey={key} to={paths.species(what === "went" ? previous : number, key)} />
      ),
    },
    {
      id: "property",
      head: "Property",
      cell: ({ property }) => (
        <>
          <Symbol of={propertyInfo[property].symbol} />{" "}
          <span className="text-soft">
            <UnitText unit={propertyInfo[property].unit} />
          </span>
        </>
      ),
    },
    { id: "what", head: "What", cell: ({ what }) => WHAT[what] },
    {
      id: "before",
      head: `Edition ${previous}`,
      figure: true,
      cell: ({ before, after }) =>
        before && (after ? <Figures {...before} tail={tails.before} /> : <Struck {...before} tail={tails.before} />),
    },
    {
      id: "after",
      head: `Edition ${number}`,
      figure: true,
      cell: ({ after }) => after && <Figures {...after} tail={tails.after} />,
    },
    {
      id: "difference",
      head: "Difference",
      figure: true,
      cell: ({ difference }) => (difference === null ? null : signed(difference)),
    },
  ];
}

function Struck(figures: React.ComponentProps<typeof Figures>) {
  return (
    <del>
      <Figures {...figures} />
    </del>
  );
}
