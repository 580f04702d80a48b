import type { Scope } from "./key.ts";
import type { Permission } from "./permissions.ts";

/**
 * Who may come through a route: anybody, whoever holds a permission, or a program with a key of this scope. `null` where
 * there is nothing to come through: a page without a form answers no POST.
 */
export type Door = "public" | Permission | { scope: Scope } | null;

/** One route's two doors: for reading it, and for what is posted to it. */
export interface RouteDoors {
  read: Door;
  change: Door;
  /** Where one address takes several forms: what each needs beyond the door, by the form's `intent`. */
  intents?: Readonly<Record<string, Permission>>;
}

const reads = (read: Door): RouteDoors => ({ read, change: null });
const both = (permission: Door): RouteDoors => ({ read: permission, change: permission });

const revisionForms: RouteDoors = {
  ...both("revision:read"),
  intents: {
    accept: "revision:decide",
    "accept-clean": "revision:decide",
    decline: "revision:decide",
    "set-aside": "revision:decide",
    return: "revision:decide",
    close: "revision:decide",
    comment: "revision:comment",
    answer: "revision:comment",
    rewrite: "revision:write",
    "take-suggestion": "revision:write",
    "take-out": "revision:write",
    describe: "revision:write",
    send: "revision:write",
    restate: "revision:write",
    withdraw: "revision:write",
  },
};

/**
 * The doors of every route of `app/routes.ts`, by its pattern. Each loader and action checks by itself; this table is what
 * `tests/routes/access.test.ts` holds them against, as nobody, as each role and with keys.
 */
export const routePermissions: Readonly<Record<string, RouteDoors>> = {
  // What waits for whom, and what the find box leads to
  "/": reads("public"),
  "/find": reads("table:read"),
  "/resources/find": reads("table:read"),

  // The table, as of an edition
  "/editions/:edition/table": reads("table:read"),
  "/editions/:edition/species/:key": reads("table:read"),

  // Editions
  "/editions": reads("table:read"),
  "/editions/:edition": reads("table:read"),
  "/editions/:edition/table.csv": reads("table:read"),
  "/editions/:edition/table/:file": reads("table:read"),
  "/editions/:a/compare/:b": reads("table:read"),
  "/editions/:edition/table.csv-metadata.json": reads("table:read"),

  // Sheets
  "/sheets": reads("sheet:read"),
  "/sheets/new": both("sheet:work"),
  "/sheets/:sheet": { read: "sheet:read", change: "sheet:work" },
  "/sheets/:sheet/original": reads("sheet:read"),
  "/sheets/:sheet/refused.csv": reads("sheet:read"),
  "/resources/sheets/:sheet/progress": reads("sheet:read"),
  "/resources/sheets/:sheet/repair": { read: "sheet:read", change: "sheet:work" },

  // Review
  "/revisions": reads("revision:read"),
  "/revisions/:revision": revisionForms,
  "/revisions/:revision/lines/:line": both("revision:write"),
  "/revisions/:revision/take-over": both("revision:write"),
  "/propose": both("revision:write"),
  "/resources/revisions/:revision/act": revisionForms,
  "/publish": both("edition:publish"),
  "/record": reads("record:read"),
  "/resources/record/export": both("record:read"),

  // Sources and conventions
  "/sources": reads("table:read"),
  "/sources/new": both("revision:write"),
  "/sources/:source": reads("table:read"),
  "/sources/:source/mend": both("revision:write"),
  "/editions/:edition/sources": reads("table:read"),
  "/editions/:edition/sources/:source": reads("table:read"),
  "/editions/:edition/sources/:source/values.csv": reads("table:read"),
  "/conventions": reads("public"),
  "/conventions/symbols": reads("public"),
  "/conventions/states": reads("public"),
  "/conventions/units": reads("public"),
  "/conventions/uncertainty": reads("public"),
  "/conventions/spellings": reads("public"),
  "/conventions/checks": reads("public"),
  "/conventions/checks/:check": reads("public"),

  // People
  "/sign-in": both("public"),
  "/sign-out": both("public"),
  "/forgotten": both("public"),
  "/reset/:token": both("public"),
  "/invitation/:token": both("public"),
  "/address/:token": both("public"),
  "/account": both("account:own"),
  "/account/keys": both("key:own"),
  "/people": both("people:manage"),
  "/people/:person": both("people:manage"),
  // The demo's only; anywhere else there is nothing at its address.
  "/inbox": reads("public"),

  // For programs: the API and its guide
  "/api": reads("public"),
  "/problems/:slug": reads("public"),
  "/api/v1/openapi.json": reads("public"),
  "/api/v1/editions": reads({ scope: "read" }),
  "/api/v1/editions/:edition": reads({ scope: "read" }),
  "/api/v1/editions/:edition/species": reads({ scope: "read" }),
  "/api/v1/editions/:edition/species/:key": reads({ scope: "read" }),
  "/api/v1/editions/:edition/values": reads({ scope: "read" }),
  "/api/v1/editions/:edition/lookup": { read: null, change: { scope: "read" } },
  "/api/v1/editions/:edition/table.csv": reads({ scope: "read" }),
  "/api/v1/editions/:edition/table.csv-metadata.json": reads({ scope: "read" }),
  "/api/v1/editions/:edition/table.json": reads({ scope: "read" }),
  "/api/v1/editions/:edition/table.ndjson": reads({ scope: "read" }),
  "/api/v1/editions/:a/compare/:b": reads({ scope: "read" }),
  "/api/v1/changes": reads({ scope: "read" }),
  "/api/v1/sources/:source": reads({ scope: "read" }),
  "/api/v1/sheets": { read: null, change: { scope: "sheets:write" } },
  "/api/v1/sheets/:sheet": reads({ scope: "sheets:write" }),
  "/api/v1/sheets/:sheet/rows": reads({ scope: "sheets:write" }),
  "/api/v1/sheets/:sheet/findings": reads({ scope: "sheets:write" }),
  // Says only that there is nothing.
  "/api/*": both("public"),

  // Development and tests
  "/ui": reads("public"),

  // Anything else
  "/*": reads("public"),
};
