import { Link } from "react-router";
import { paths } from "#app/paths.ts";
import { Bookmark, editionBookmark, type BookmarkProps } from "./Bookmark.tsx";
import { Ribbon } from "./EditionLine.tsx";
import { FindBox } from "./FindBox.tsx";
import { useRootData, type SectionName } from "./useRootData.ts";

interface LeafProps {
  /** The page's one h1. */
  heading: React.ReactNode;
  /** "species" sets it larger: for a formula. */
  headingKind?: "species" | undefined;
  /** One or two soft sentences under it. */
  lede?: React.ReactNode;
  /** Which section of the site this is. */
  section?: SectionName | undefined;
  /** The bookmark; without one, the newest edition's. */
  bookmark?: BookmarkProps | undefined;
  /** The line under the head: `<EditionLine>` or `<Ribbon>`. Without one, a line naming the newest edition. */
  ribbon?: React.ReactNode;
  children: React.ReactNode;
}

const sections: readonly (readonly [SectionName, string, string])[] = [
  ["table", "Table", paths.table()],
  ["sheets", "Sheets", paths.sheets()],
  ["revisions", "Revisions", paths.revisions()],
  ["editions", "Editions", paths.editions()],
  ["sources", "Sources", paths.sources()],
  ["conventions", "Conventions", paths.conventions()],
  ["people", "People", paths.people()],
  ["record", "Record", paths.record()],
];

/** The frame of every page: the ruled margin with its bookmark, the head, the ribbon, and one column of text. */
export function Leaf({ heading, headingKind, lede, section, bookmark, ribbon, children }: LeafProps) {
  const { visitor, opens, currentEdition, demo } = useRootData();
  const mark = bookmark ?? usualBookmark(visitor !== null, currentEdition);
  return (
    <div className="leaf">
      <a className="skip" href="#text">
        Skip to the text
      </a>
      <nav className="leaf-margin" aria-label="Bookmark">
        <Bookmark {...mark} />
      </nav>
      <div className="leaf-text">
        <header>
          <div className="leaf-head">
            <Link className="leaf-mark" to={paths.home()}>
              Tablewright
            </Link>
            <nav className="leaf-nav" aria-label="Sections">
              <ul>
                {sections
                  .filter(([name]) => opens.includes(name))
                  .map(([name, label, to]) => (
                    <li key={name}>
                      <Link to={to} aria-current={name === section ? "page" : undefined}>
                        {label}
                      </Link>
                    </li>
                  ))}
              </ul>
            </nav>
            {opens.includes("table") && <FindBox />}
            {visitor ? (
              <Link
                className="leaf-person"
                to={paths.account()}
                aria-current={section === "account" ? "page" : undefined}
              >
                {visitor.name}
              </Link>
            ) : (
              <Link className="leaf-person" to={paths.signIn()}>
                Sign in
              </Link>
            )}
          </div>
          {ribbon ?? <DefaultRibbon currentEdition={currentEdition} />}
        </header>
        <main id="text" tabIndex={-1}>
          <h1 className={`leaf-title${headingKind === "species" ? " species-title" : ""}`} tabIndex={-1}>
            {heading}
          </h1>
          {lede && <p className="lede">{lede}</p>}
          {children}
        </main>
        <footer className="leaf-foot">
          298.15 K and 100 kPa unless a value says otherwise · <Link to={paths.conventions()}>conventions</Link> ·{" "}
          <Link to={paths.apiGuide()}>for programs</Link>
          {demo && (
            <>
              {" "}
              · a demonstration with invented in-house numbers; its <Link to={paths.inbox()}>letters</Link> stay here
            </>
          )}
        </footer>
      </div>
    </div>
  );
}

function usualBookmark(known: boolean, currentEdition: number | null): BookmarkProps {
  if (currentEdition !== null) return editionBookmark(currentEdition, currentEdition);
  // A stranger has no edition to be told of, and a new laboratory has none yet.
  return known
    ? { kind: "draft", label: "Draft of", mark: 1 }
    : { kind: "plain", label: "Home", mark: "°", to: paths.home() };
}

function DefaultRibbon({ currentEdition }: { currentEdition: number | null }) {
  const { visitor } = useRootData();
  if (!visitor) return <Ribbon>Standard formation properties of substances, in numbered editions</Ribbon>;
  return (
    <Ribbon>
      {currentEdition === null ? (
        <span>No edition is published yet.</span>
      ) : (
        <span>
          <b>Edition {currentEdition}</b> stands
        </span>
      )}
    </Ribbon>
  );
}
