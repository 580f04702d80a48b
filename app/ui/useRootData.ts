import { createContext, useContext } from "react";
import { useRouteLoaderData } from "react-router";

/** A section of the site as its head names it. */
export type SectionName =
  "table" | "sheets" | "revisions" | "editions" | "sources" | "conventions" | "people" | "record" | "account";

/** What every page knows: who reads it, which sections are open to them, and which edition is the newest. */
export interface RootData {
  visitor: { name: string; roles: readonly string[] } | null;
  /** Sections of the site this person may open, in no order. */
  opens: readonly SectionName[];
  /** Number of the newest edition; null before the first. */
  currentEdition: number | null;
  /** The demonstration, which has a page for its letters. */
  demo: boolean;
}

const nobody: RootData = { visitor: null, opens: ["conventions"], currentEdition: null, demo: false };

/** Takes the place of the root loader's answer, for specimens that show what a signed-in person sees. */
export const RootDataContext = createContext<RootData | null>(null);

/** The root loader's answer; on an error page, where it may be missing, a stranger's. */
export function useRootData(): RootData {
  const given = useContext(RootDataContext);
  const data: unknown = useRouteLoaderData("root");
  return given ?? (isRootData(data) ? data : nobody);
}

function isRootData(data: unknown): data is RootData {
  return typeof data === "object" && data !== null && "opens" in data && "visitor" in data;
}
