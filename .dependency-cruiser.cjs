// The laws of the house (DEVELOPERS.md says them in words). `$1` is the folder that the `from` pattern captured.

const outsideServices = "(^|node_modules/)(@types/)?(stripe|meilisearch|nodemailer|bullmq|ioredis)(/|$)";

// An import that leads nowhere breaks a law of its own, so the others leave it alone: `couldNotResolve: false`.

const shared = [
  {
    name: "shared-stands-alone",
    comment: "shared/ is pure: it imports zod and itself, nothing else.",
    from: { path: "^shared/" },
    to: { pathNot: "^(shared|node_modules/zod)/", couldNotResolve: false },
  },
  {
    name: "circuits-stay-apart",
    comment: "A circuit imports bias/, never another circuit nor the registry that lists them.",
    from: { path: "^shared/bias/circuits/([^/]+)/" },
    to: { path: "^shared/bias/circuits/([^/]+/|registry)", pathNot: "^shared/bias/circuits/$1/" },
  },
];

const api = [
  {
    name: "api-stands-alone",
    comment: "api/ imports itself, shared/ and packages.",
    from: { path: "^api/" },
    to: { pathNot: "^(api|shared|node_modules)/", couldNotResolve: false, dependencyTypesNot: ["core"] },
  },
  {
    name: "routes-call-services",
    comment: "A routes file does HTTP only: its way to the data is the feature's service.",
    from: { path: "^api/features/[^/]+/routes" },
    to: { path: "^api/(db|services|ranking)/|^api/features/[^/]+/queries" },
  },
  {
    name: "services-know-no-http",
    comment: "A service or query throws typed problems and never sees a request.",
    from: { path: "^api/features/[^/]+/(service|queries)" },
    to: { path: "^node_modules/(@types/)?express/|^api/features/[^/]+/routes" },
  },
  {
    name: "services-ask-queries",
    comment: "Only queries name tables and columns.",
    from: { path: "^api/features/[^/]+/service" },
    to: { path: "^api/db/schema/" },
  },
  {
    name: "queries-call-nobody",
    comment: "Queries are the last hop before the database.",
    from: { path: "^api/features/[^/]+/queries" },
    to: { path: "^api/features/[^/]+/service|^api/(services|ranking)/" },
  },
  {
    name: "db-knows-no-feature",
    comment: "The database layer lies under everything else in api/.",
    from: { path: "^api/db/" },
    to: { path: "^api/(features|services|ranking|app|main)" },
  },
  {
    name: "api-features-meet-in-services",
    comment: "A feature reaches another through its service alone.",
    from: { path: "^api/features/([^/]+)/" },
    to: { path: "^api/features/", pathNot: "^api/features/($1/|[^/]+/service)" },
  },
  {
    name: "sdk-only-in-services",
    comment: "Only api/services/ knows an outside system's SDK.",
    from: { path: "^api/", pathNot: "^api/services/" },
    to: { path: outsideServices },
  },
  {
    name: "environment-only-in-env",
    comment: "Only api/env.ts reads the environment.",
    from: { path: "^api/", pathNot: "^api/env\\.ts$" },
    to: { path: "^(node:)?process$" },
  },
];

const web = [
  {
    name: "web-stands-alone",
    comment: "web/ imports itself, shared/ and packages.",
    from: { path: "^web/" },
    to: { pathNot: "^(web|shared|node_modules)/", couldNotResolve: false },
  },
  {
    name: "primitives-know-no-feature",
    comment: "ui/ and figures/ know no feature, no route and no fetch.",
    from: { path: "^web/(ui|figures)/" },
    to: { path: "^web/(features/|routes|main|lib/api)|^node_modules/(@tanstack/react-query|react-router)" },
  },
  {
    name: "lib-knows-no-feature",
    comment: "lib/ is under the features.",
    from: { path: "^web/lib/" },
    to: { path: "^web/(features/|routes|main)" },
  },
  {
    name: "web-features-stay-apart",
    comment: "A feature reaches another through a link or through lib/.",
    from: { path: "^web/features/([^/]+)/" },
    to: { path: "^web/(features/|routes|main)", pathNot: "^web/features/$1/" },
  },
];

const everywhere = [
  {
    name: "no-circles",
    comment: "No module imports itself by a detour.",
    from: {},
    to: { circular: true },
  },
  {
    name: "no-barrels",
    comment: "Import from the file that has it.",
    from: {},
    to: { path: "(^|/)index\\.(ts|tsx|mjs)$", pathNot: "node_modules" },
  },
  {
    name: "imports-resolve",
    comment: "An import that leads nowhere could hide a violation.",
    from: {},
    to: { couldNotResolve: true },
  },
  {
    name: "scripts-need-no-package",
    comment: "scripts/ run before anything is installed.",
    from: { path: "^scripts/" },
    to: { pathNot: "^scripts/", couldNotResolve: false, dependencyTypesNot: ["core"] },
  },
  {
    name: "seeds-know-no-interface",
    comment: "seeds/ fill the database: they import api/, shared/ and packages.",
    from: { path: "^seeds/" },
    to: {
      pathNot: "^(seeds|api|shared|node_modules)/",
      couldNotResolve: false,
      dependencyTypesNot: ["core"],
    },
  },
];

/** @type {import("dependency-cruiser").IConfiguration} */
module.exports = {
  forbidden: [...shared, ...api, ...web, ...everywhere].map((rule) => ({ severity: "error", ...rule })),
  options: {
    doNotFollow: { path: "node_modules" },
    // Imports of types count: a type from the wrong side is a dependency too.
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ["exports"],
      conditionNames: ["import", "require", "node", "default", "types", "style"],
      mainFields: ["module", "main", "types", "style"],
      extensions: [".ts", ".tsx", ".mjs", ".cjs", ".js", ".json", ".css", ".d.ts"],
    },
  },
};
