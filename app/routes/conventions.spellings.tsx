import { type Notation, notationName, READ } from "#app/thermo/spellings.ts";
import { Section } from "#app/ui/Section.tsx";
import type { Route } from "./+types/conventions.spellings";
import { ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";
import { ReadTable, UnreadTable } from "./conventions/Spellings.tsx";
import { toldBy } from "./conventions/unread.ts";

export const meta = () => [{ title: "Spellings · Conventions · Tablewright" }];

/** Units and phases have pages of their own. */
const HERE: readonly Notation[] = ["number", "quantity", "formula", "key"];

/** The spellings that a test asks the readers for, one by one. */
export function loader() {
  return {
    parts: HERE.map((notation) => ({
      notation,
      name: notationName[notation],
      read: READ[notation],
      unread: toldBy(notation),
    })),
  };
}

/** How numbers, formulas, charges and species are read. Readable by everybody. */
export default function SpellingsPage({ loaderData }: Route.ComponentProps) {
  return (
    <ConventionsLeaf
      part="spellings"
      heading="Spellings"
      lede="Sheets come from typewriters, web pages and spreadsheets. What has one reading is read, with a note where something was taken for granted; what has two is asked about; the rest is refused with a sentence. The text of the sheet is always kept."
    >
      <nav aria-label="On this page" className="fine">
        {loaderData.parts.map(({ notation, name }, index) => (
          <span key={notation}>
            {index > 0 && " · "}
            <a href={`#${notation}`}>{name}</a>
          </span>
        ))}
      </nav>
      {loaderData.parts.map(({ notation, name, read, unread }) => (
        <Section key={notation} head={name} id={notation}>
          <ReadTable caption={`${name}: spellings that are read`} groups={read} />
          <div className="mt-8">
            <UnreadTable caption={`${name}: spellings that are refused or asked about`} groups={unread} />
          </div>
        </Section>
      ))}
    </ConventionsLeaf>
  );
}
