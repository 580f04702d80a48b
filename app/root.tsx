import { isRouteErrorResponse, Links, Meta, Outlet, Scripts, ScrollRestoration } from "react-router";
import { config } from "#app/config.server.ts";
import { findCurrentEdition } from "#app/editions/editions.server.ts";
import { useNonce } from "#app/http/nonce.ts";
import { requestContext } from "#app/http/requestContext.server.ts";
import { may, type Permission } from "#app/people/permissions.ts";
import { findVisitor } from "#app/people/visitor.server.ts";
import type { Route } from "./+types/root";
import { Announcer } from "./ui/Announcer.tsx";
import { CopyPlain } from "./ui/CopyPlain.tsx";
import { ErrorPage, statusWords } from "./ui/ErrorPage.tsx";
import type { RootData, SectionName } from "./ui/useRootData.ts";
import "./styles/tablewright.css";

// Two strong rules and a hairline, as on every table. Drawn here because the project ships no image files.
const icon =
  "data:image/svg+xml," +
  encodeURIComponent(
    '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 16 16"><path fill="#fbfaf5" d="M0 0h16v16H0z"/>' +
      '<path fill="#13262b" d="M5 2h10v2H5zm0 4h10v1H5zm0 6h10v2H5z"/><path fill="#17655a" d="M1 0h3v9L2.500 7.500 1 9z"/></svg>',
  );

/** What a person must be allowed in order to see a section in the head of the page. */
const sections: readonly (readonly [SectionName, Permission])[] = [
  ["table", "table:read"],
  ["sheets", "sheet:read"],
  ["revisions", "revision:read"],
  ["editions", "table:read"],
  ["sources", "table:read"],
  ["people", "people:manage"],
  ["record", "record:read"],
];

/** What the frame of every page shows. A stranger learns nothing of the table, not even how many editions it has. */
export async function loader({ request }: Route.LoaderArgs): Promise<RootData> {
  const { demo } = config();
  const visitor = await findVisitor(request);
  if (!visitor) return { visitor: null, opens: ["conventions"], currentEdition: null, demo };
  const { name, roles } = visitor;
  const opens = sections.filter(([, permission]) => may(roles, permission)).map(([section]) => section);
  return {
    visitor: { name, roles },
    opens: [...opens, "conventions"],
    currentEdition: await findCurrentEdition(),
    demo,
  };
}

/** Names the reader in the log. The API answers keys only and names their owner itself. */
export const middleware: Route.MiddlewareFunction[] = [
  async ({ request, context }, next) => {
    if (!new URL(request.url).pathname.startsWith("/api/")) {
      context.get(requestContext).actor = (await findVisitor(request))?.id ?? null;
    }
    return next();
  },
];

export const links: Route.LinksFunction = () => [{ rel: "icon", href: icon, type: "image/svg+xml" }];

export function Layout({ children }: { children: React.ReactNode }) {
  const nonce = useNonce();
  return (
    <html lang="en">
      <head>
        <meta charSet="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <Meta />
        {/* Files of our own need no nonce; an empty one keeps the framework from adding it, which hydration would miss. */}
        <Links nonce="" />
      </head>
      <body>
        {children}
        <Announcer />
        <CopyPlain />
        <ScrollRestoration nonce={nonce} />
        <Scripts nonce={nonce} />
      </body>
    </html>
  );
}

export default function Root() {
  return <Outlet />;
}

/** The one boundary: every error of a page ends here, with the sentence of a refusal when there is one. */
export function ErrorBoundary({ error }: Route.ErrorBoundaryProps) {
  const status = isRouteErrorResponse(error) ? error.status : 500;
  const { head } = statusWords(status);
  return (
    <>
      <title>{`${head} · Tablewright`}</title>
      <ErrorPage status={status} sentence={isRouteErrorResponse(error) ? sentenceOf(error.data) : undefined} />
    </>
  );
}

function sentenceOf(data: unknown): string | undefined {
  if (typeof data !== "object" || data === null || !("detail" in data)) return undefined;
  return typeof data.detail === "string" ? data.detail : undefined;
}
