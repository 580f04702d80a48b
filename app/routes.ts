import { index, route, type RouteConfig } from "@react-router/dev/routes";

/**
 * The whole address space, grouped as the site is. Module names follow the address with dots. Every page here has its
 * link function in `app/paths.ts`.
 */
export default [
  // What waits for whom, and what the find box leads to
  index("routes/home.tsx"),
  route("find", "routes/find.tsx"),

  // The table, as of an edition
  route("editions/:edition/table", "routes/table.tsx"),
  route("editions/:edition/species/:key", "routes/species.tsx"),

  // Editions
  route("editions", "routes/editions.tsx"),
  route("editions/:edition", "routes/edition.tsx"),
  route("editions/:edition/table.csv", "routes/table.download.ts"),
  route("editions/:edition/table.csv-metadata.json", "routes/table.description.ts"),
  route("editions/:edition/table/:file", "routes/table.shown.ts"),
  route("editions/:a/compare/:b", "routes/compare.tsx"),

  // Sheets
  route("sheets", "routes/sheets.tsx"),
  route("sheets/new", "routes/sheets.new.tsx"),
  route("sheets/:sheet", "routes/sheet.tsx"),
  route("sheets/:sheet/original", "routes/sheet.original.ts"),
  route("sheets/:sheet/refused.csv", "routes/sheet.findings.ts"),

  // Review
  route("revisions", "routes/revisions.tsx"),
  route("revisions/:revision", "routes/revision.tsx"),
  route("revisions/:revision/lines/:line", "routes/revision.line.tsx"),
  route("revisions/:revision/take-over", "routes/revision.takeOver.tsx"),
  route("propose", "routes/propose.tsx"),
  route("publish", "routes/publish.tsx"),
  route("record", "routes/record.tsx"),

  // Sources and conventions
  route("sources", "routes/sources.tsx"),
  route("sources/new", "routes/sources.new.tsx"),
  route("sources/:source", "routes/source.ts"),
  route("sources/:source/mend", "routes/source.mend.tsx"),
  route("editions/:edition/sources", "routes/edition.sources.tsx"),
  route("editions/:edition/sources/:source", "routes/edition.source.tsx"),
  route("editions/:edition/sources/:source/values.csv", "routes/edition.source.values.ts"),
  route("conventions", "routes/conventions.tsx"),
  route("conventions/symbols", "routes/conventions.symbols.tsx"),
  route("conventions/states", "routes/conventions.states.tsx"),
  route("conventions/units", "routes/conventions.units.tsx"),
  route("conventions/uncertainty", "routes/conventions.uncertainty.tsx"),
  route("conventions/spellings", "routes/conventions.spellings.tsx"),
  route("conventions/checks", "routes/conventions.checks.tsx"),
  route("conventions/checks/:check", "routes/conventions.check.tsx"),

  // People
  route("sign-in", "routes/sign-in.tsx"),
  route("sign-out", "routes/sign-out.tsx"),
  route("forgotten", "routes/forgotten.tsx"),
  route("reset/:token", "routes/reset.tsx"),
  route("invitation/:token", "routes/invitation.tsx"),
  route("address/:token", "routes/address.tsx"),
  route("account", "routes/account.tsx"),
  route("account/keys", "routes/account.keys.tsx"),
  route("people", "routes/people.tsx"),
  route("people/:person", "routes/person.tsx"),
  route("inbox", "routes/inbox.tsx"),

  // For programs: the API and its guide
  route("api", "routes/api.guide.tsx"),
  route("problems/:slug", "routes/problem.tsx"),
  route("api/v1/openapi.json", "routes/api.openapi.ts"),
  route("api/v1/editions", "routes/api.editions.ts"),
  route("api/v1/editions/:edition", "routes/api.edition.ts"),
  route("api/v1/editions/:edition/species", "routes/api.edition.species.ts"),
  route("api/v1/editions/:edition/species/:key", "routes/api.edition.species.key.ts"),
  route("api/v1/editions/:edition/values", "routes/api.edition.values.ts"),
  route("api/v1/editions/:edition/lookup", "routes/api.edition.lookup.ts"),
  route("api/v1/editions/:edition/table.csv", "routes/api.edition.table.ts"),
  route("api/v1/editions/:edition/table.csv-metadata.json", "routes/api.edition.table.description.ts"),
  route("api/v1/editions/:edition/table.json", "routes/api.edition.table.json.ts"),
  route("api/v1/editions/:edition/table.ndjson", "routes/api.edition.table.ndjson.ts"),
  route("api/v1/editions/:a/compare/:b", "routes/api.edition.compare.ts"),
  route("api/v1/changes", "routes/api.changes.ts"),
  route("api/v1/sources/:source", "routes/api.source.ts"),
  route("api/v1/sheets", "routes/api.sheets.ts"),
  route("api/v1/sheets/:sheet", "routes/api.sheet.ts"),
  route("api/v1/sheets/:sheet/rows", "routes/api.sheet.rows.ts"),
  route("api/v1/sheets/:sheet/findings", "routes/api.sheet.findings.ts"),
  route("api/*", "routes/api.unknown.ts"),

  // Resources for pages (session only)
  route("resources/find", "routes/resources.find.ts"),
  route("resources/sheets/:sheet/progress", "routes/resources.sheet.progress.ts"),
  route("resources/sheets/:sheet/repair", "routes/resources.sheet.repair.ts"),
  route("resources/revisions/:revision/act", "routes/resources.revision.act.ts"),
  route("resources/record/export", "routes/resources.record.export.ts"),

  // Development and tests
  route("ui", "routes/ui.tsx"),

  // Anything else
  route("*", "routes/not-found.tsx"),
] satisfies RouteConfig;
