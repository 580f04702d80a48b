import boundaries from "eslint-plugin-boundaries";
import hooks from "eslint-plugin-react-hooks";
import tseslint from "typescript-eslint";

/**
 * Which room may import which, as DEVELOPERS.md tells it in words. The rooms not listed in a line are closed to it.
 * `people` is open to every room with acts, because an act asks the table of permissions who may do it.
 */
const rooms = {
  thermo: [],
  checks: ["thermo"],
  species: ["thermo", "db", "people"],
  sources: ["db", "people"],
  editions: ["thermo", "species", "sources", "db", "people"],
  // The lines that a sheet comes to are lines of a revision.
  intake: ["thermo", "checks", "species", "sources", "editions", "review", "db", "people"],
  reactions: ["thermo", "species", "editions", "db", "people"],
  review: ["thermo", "checks", "species", "sources", "editions", "reactions", "db", "people"],
  people: ["db"],
  notify: ["db", "people"],
  audit: ["db", "people"],
};
const roomsWithActs = Object.keys(rooms).filter((room) => rooms[room].includes("db"));
const everyRoom = Object.keys(rooms);

const folders = {
  ...Object.fromEntries(everyRoom.map((room) => [room, `app/${room}`])),
  jobs: "app/jobs",
  db: "app/db",
  http: "app/http",
  ui: "app/ui",
  routes: "app/routes",
  styles: "app/styles",
  server: "server",
  migrations: "db/migrations",
  seeds: "db/seeds",
  tests: "tests",
  scripts: "scripts",
};

/** Single files with a part of their own. The first pattern that fits names the file. */
const files = {
  test: "**/*.test.{ts,tsx}",
  errors: "app/http/errors.ts",
  settings: "app/{config,log}.server.ts",
  paths: "app/paths.ts",
  // The frame: routes.ts, root.tsx and the two entries.
  top: "app/*.{ts,tsx}",
  queries: "app/**/*.queries.server.ts",
  // The enqueuing functions: a room's act hands its letter or its job in with its own transaction.
  enqueue: "app/{jobs/enqueue,notify/letters}.server.ts",
  act: "app/**/*.server.{ts,tsx}",
  pure: "app/**/*.{ts,tsx}",
};

const from = (...types) => ({ element: { types: { anyOf: types } } });
const to = from;
const file = (...categories) => ({ file: { categories: { anyOf: categories } } });

const importPolicies = [
  ...Object.entries({
    ...rooms,
    jobs: [...everyRoom, "db", "http"],
    db: [],
    http: ["thermo"],
    ui: ["thermo", "checks", "http"],
    routes: [...everyRoom, "http", "ui", "jobs"],
    server: [...everyRoom, "http", "db", "jobs", "ui"],
    migrations: [],
    seeds: [...everyRoom, "db", "http", "jobs"],
    tests: [...everyRoom, "db", "http", "ui", "routes", "jobs", "server", "scripts", "seeds", "migrations"],
    scripts: [],
  })
    .filter(([, allowed]) => allowed.length > 0)
    .map(([room, allowed]) => ({ from: from(room), allow: { to: to(...allowed) } })),

  // A named error may be thrown anywhere but in the physics and the checks, which return findings.
  { from: from(...roomsWithActs, "jobs", "db"), allow: { to: file("errors") } },
  // Any room's acts keep the record and hand in letters (whose texts are pure) and jobs.
  { from: { ...from(...roomsWithActs), ...file("act", "enqueue") }, allow: { to: to("audit") } },
  { from: { ...from(...roomsWithActs), ...file("act", "enqueue") }, allow: { to: file("enqueue", "paths") } },
  { from: { ...from(...roomsWithActs), ...file("act") }, allow: { to: { ...to("notify"), ...file("pure") } } },
  { from: { ...from("people"), ...file("act") }, allow: { to: to("notify"), dependency: { kind: "type" } } },
  { from: file("act", "queries", "enqueue", "top"), allow: { to: file("settings") } },
  { from: from("server", "tests", "seeds", "routes"), allow: { to: file("settings", "paths", "top") } },
  { from: from("ui", "notify", "http"), allow: { to: file("paths") } },
  // Each route module takes the types that the framework writes for it (./+types/…), and nothing of another's code.
  { from: from("routes"), allow: { to: to("routes"), dependency: { kind: "type" } } },
  { from: file("top"), allow: { to: to("http", "ui", "styles", ...everyRoom) } },
  { from: file("top", "settings", "test"), allow: { to: file("top", "paths", "settings") } },
  // A test beside its file may use the helpers and the published tables of tests/.
  { from: file("test"), allow: { to: to("tests") } },
];

/** Packages and Node.js are open to everybody, with the exceptions after the first two lines. */
const packagePolicies = [
  { from: from(...Object.keys(folders)), allow: { to: { module: { origin: ["external", "core"] } } } },
  { from: file(...Object.keys(files)), allow: { to: { module: { origin: ["external", "core"] } } } },
  {
    from: { ...from("thermo", "checks"), ...file("pure") },
    disallow: { to: { module: { origin: ["external", "core"] } } },
    message:
      "The physics and the checks are pure: values in, values out. Only the packages for decimals and elements are used here.",
  },
  {
    from: { ...from("thermo"), ...file("pure") },
    allow: { to: { module: { origin: "external", source: ["decimal.js", "chemical-elements", "fraction.js"] } } },
  },
  {
    from: { ...from(...everyRoom), ...file("pure") },
    disallow: { to: { module: { origin: "core" } } },
    message:
      "A file without .server in its name is pure: no clock, no files, no network. Take what it needs as an argument.",
  },
  {
    // A digest is a function of its bytes.
    from: { ...from(...everyRoom), ...file("pure") },
    allow: { to: { module: { origin: "core", source: "node:crypto" } }, dependency: { specifiers: "createHash" } },
  },
  {
    from: { ...from(...everyRoom, "http"), ...file("pure") },
    disallow: { to: file("act", "queries", "enqueue", "settings"), dependency: { kind: "value" } },
    message: "A pure file must not reach a .server file; pass in what it needs.",
  },
  {
    from: { ...from(...everyRoom, "jobs", "http"), ...file("pure", "act") },
    disallow: {
      to: { module: { origin: "external", source: ["pg", "pg-copy-streams"] } },
      dependency: { kind: "value" },
    },
    message: "The driver belongs to app/db; SQL stands in a room's *.queries.server.ts.",
  },
];

export default tseslint.config(
  { ignores: ["build/", ".react-router/", ".data/", "node_modules/", "coverage/", "app/db/types.ts"] },
  ...tseslint.configs.strict,
  {
    files: ["**/*.{ts,tsx}"],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      "@typescript-eslint/no-floating-promises": "error",
      "@typescript-eslint/await-thenable": "error",
      "@typescript-eslint/no-misused-promises": ["error", { checksVoidReturn: { attributes: false } }],
      "@typescript-eslint/switch-exhaustiveness-check": ["error", { considerDefaultExhaustiveForUnions: true }],
    },
  },
  {
    rules: {
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", varsIgnorePattern: "^_" }],
      // The strict set forbids `!`; here it states what an index or a pattern has just proved.
      "@typescript-eslint/no-non-null-assertion": "off",
      "@typescript-eslint/consistent-type-imports": ["error", { fixStyle: "inline-type-imports" }],
      eqeqeq: ["error", "always", { null: "ignore" }],
      "no-restricted-syntax": [
        "error",
        {
          selector: "ExportDefaultDeclaration",
          message: "Export by name; only route modules, the entries and configuration files have a default.",
        },
        {
          selector: "JSXAttribute[name.name='dangerouslySetInnerHTML']",
          message: "Stored text is only ever text; render it as children.",
        },
        {
          selector: "JSXAttribute[name.name='style']",
          message: "The Content-Security-Policy refuses style attributes; use a class.",
        },
      ],
    },
  },
  {
    files: [
      "app/routes/**",
      "app/routes.ts",
      "app/root.tsx",
      "app/entry.*.tsx",
      "*.config.{js,ts}",
      "tests/support/globalSetup.ts",
    ],
    rules: { "no-restricted-syntax": "off" },
  },
  {
    files: ["app/**/*.{ts,tsx}"],
    plugins: { "react-hooks": hooks },
    rules: { "react-hooks/rules-of-hooks": "error", "react-hooks/exhaustive-deps": "error" },
  },
  {
    files: ["{app,server,db,tests}/**/*.{ts,tsx}"],
    plugins: { boundaries },
    settings: {
      "import/resolver": {
        typescript: { project: "./tsconfig.json" },
        node: { extensions: [".mjs", ".js", ".ts", ".tsx"] },
      },
      "boundaries/elements": Object.entries(folders).map(([type, pattern]) => ({ type, pattern })),
      "boundaries/files": Object.entries(files).map(([category, pattern]) => ({ category, pattern })),
      "boundaries/files-single-match": true,
      "boundaries/legacy-templates": false,
    },
    rules: {
      "boundaries/dependencies": [
        "error",
        { default: "disallow", checkAllOrigins: true, policies: [...importPolicies, ...packagePolicies] },
      ],
    },
  },
);
