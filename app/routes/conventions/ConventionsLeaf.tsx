import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { Leaf } from "#app/ui/Leaf.tsx";

/** The pages of the conventions in their order, each with what it answers. */
export const conventionsParts = [
  {
    part: "symbols",
    name: "Symbols",
    to: paths.conventionsSymbols(),
    about: "Each quantity of the table with its symbol, unit, sign and range; the constants used.",
  },
  {
    part: "states",
    name: "States",
    to: paths.conventionsStates(),
    about: "Standard states, phases, species keys, the reference states of the elements, ions, and 1 atm to 1 bar.",
  },
  {
    part: "units",
    name: "Units",
    to: paths.conventionsUnits(),
    about: "The units a sheet may use with their exact factors, and what is refused instead.",
  },
  {
    part: "uncertainty",
    name: "Uncertainty",
    to: paths.conventionsUncertainty(),
    about: "Kinds of uncertainty, figures in brackets, digits, and when two values agree.",
  },
  {
    part: "spellings",
    name: "Spellings",
    to: paths.conventionsSpellings(),
    about: "How numbers, formulas, charges and species are read, and what is asked about.",
  },
  {
    part: "checks",
    name: "Checks",
    to: paths.conventionsChecks(),
    about: "What every proposed value is asked, each check with its formula and source.",
  },
] as const;

interface ConventionsLeafProps {
  /** The page shown; none on the first page. */
  part?: (typeof conventionsParts)[number]["part"];
  heading: React.ReactNode;
  lede?: React.ReactNode;
  children: React.ReactNode;
}

/** The frame of a page of the conventions: a line with all of them stands under the head. */
export function ConventionsLeaf({ part, heading, lede, children }: ConventionsLeafProps) {
  return (
    <Leaf heading={heading} section="conventions" lede={lede}>
      {part && (
        <nav aria-label="Pages of the conventions" className="mb-6 border-b border-rule pb-3">
          <ul className="flex flex-wrap gap-x-6 gap-y-2">
            {conventionsParts.map(({ part: one, name, to }) => (
              <li key={one}>
                <Link
                  to={to}
                  aria-current={one === part ? "page" : undefined}
                  className={one === part ? "font-semibold" : undefined}
                >
                  {name}
                </Link>
              </li>
            ))}
          </ul>
        </nav>
      )}
      {children}
    </Leaf>
  );
}
