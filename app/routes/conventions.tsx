import { Link } from "react-router";
import { Caution } from "#app/ui/Caution.tsx";
import { Section } from "#app/ui/Section.tsx";
import { conventionsParts, ConventionsLeaf } from "./conventions/ConventionsLeaf.tsx";

export const meta = () => [{ title: "Conventions · Tablewright" }];

/** What the numbers of the table mean and how they are examined: the first page of the handbook. Readable by everybody. */
export default function ConventionsPage() {
  return (
    <ConventionsLeaf
      heading="Conventions"
      lede="What the numbers mean, how they are printed, how sheets are read, and what every proposed value is asked before it may stand."
    >
      <dl className="grid gap-x-8 gap-y-3 sm:grid-cols-[8rem_minmax(0,1fr)]">
        {conventionsParts.map(({ part, name, to, about }) => (
          <div key={part} className="contents">
            <dt className="font-semibold">
              <Link to={to}>{name}</Link>
            </dt>
            <dd className="max-w-[62ch]">{about}</dd>
          </div>
        ))}
      </dl>
      <Section head="In short">
        <ul className="max-w-[72ch] list-disc space-y-1.5 pl-5">
          <li>All values are molar, at 298.15 K, in the standard state at 100 kPa (1 bar).</li>
          <li>
            Formation counts from the elements in their reference states; ions in solution from H<sup>+</sup>(aq).
          </li>
          <li>Brackets hold the standard uncertainty in the last digits. Digits are data: 205.10 is not 205.1.</li>
          <li>A spelling with two readings is asked about, never guessed; what cannot be read says why.</li>
          <li>
            No check changes a number. A repair is a suggestion with its arithmetic, taken or left by the steward.
          </li>
        </ul>
      </Section>
      <Caution />
    </ConventionsLeaf>
  );
}
