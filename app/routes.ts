import { route, type RouteConfig } from "@react-router/dev/routes";

/**
 * The whole address space, grouped as the site is. Module names follow the address with dots. Every page here has its
 * link function in `app/paths.ts`.
 */
export default [
  // The table, as of an edition

  // Sheets

  // Review
  route("revisions", "routes/revisions.tsx"),
  route("revisions/:revision", "routes/revision.tsx"),
  route("publish", "routes/publish.tsx"),
  route("record", "routes/record.tsx"),

  // Sources and conventions
  route("conventions", "routes/conventions.tsx"),
  route("conventions/checks/:check", "routes/conventions.check.tsx"),

  // People
  route("sign-in", "routes/sign-in.tsx"),
  route("sign-out", "routes/sign-out.tsx"),
  route("forgotten", "routes/forgotten.tsx"),
  route("reset/:token", "routes/reset.tsx"),
  route("invitation/:token", "routes/invitation.tsx"),
  route("account", "routes/account.tsx"),
  route("account/keys", "routes/account.keys.tsx"),
  route("people", "routes/people.tsx"),
  route("inbox", "routes/inbox.tsx"),

  // For programs: the API and its guide

  // Resources for pages (session only)
  route("resources/revisions/:revision/act", "routes/resources.revision.act.ts"),

  // Development and tests
  route("ui", "routes/ui.tsx"),

  // Anything else
  route("*", "routes/not-found.tsx"),
] satisfies RouteConfig;
