import { route, type RouteConfig } from "@react-router/dev/routes";

/**
 * The whole address space, grouped as the site is. Module names follow the address with dots. Every page here has its
 * link function in `app/paths.ts`.
 */
export default [
  // The table, as of an edition

  // Sheets

  // Review

  // Sources and conventions
  route("conventions", "routes/conventions.tsx"),
  route("conventions/checks/:check", "routes/conventions.check.tsx"),

  // People

  // For programs: the API and its guide

  // Resources for pages (session only)

  // Development and tests
  route("ui", "routes/ui.tsx"),

  // Anything else
  route("*", "routes/not-found.tsx"),
] satisfies RouteConfig;
