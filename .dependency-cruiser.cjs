// Who may import whom in src/. A file may import from its own folder and from every level above its own in this list;
// folders on one level do not know each other. A folder or top-level file that is not listed is a violation too.
const LEVELS = [
  ["units", "numerics"],
  ["potentials", "packets"],
  ["problem"],
  ["grid"],
  ["steppers", "stationary", "analysis"],
  ["propagate.ts"],
  ["studies"],
  ["figures", "design"],
  ["index.ts"],
  ["files"],
  ["node.ts"],
  ["cli"],
];

/** The parts that may use Node: everything else has to run in a browser. */
const NODE_PARTS = ["files", "node.ts", "cli"];

/** Packages that need Node (or weigh too much for a page), hence only for NODE_PARTS. */
const NODE_PACKAGES = [
  "@resvg/resvg-js",
  "cli-progress",
  "commander",
  "csv-stringify",
  "dejavu-fonts-ttf",
  "pngjs",
];

const literally = (text) => text.replace(/[.*+?^${}()|[\]\\/]/g, "\\$&");
/** Matches the files of a part of src/: one file, or everything below a folder. */
const path = (parts) =>
  `^src/(?:${parts.map((part) => (part.endsWith(".ts") ? `${literally(part)}$` : `${part}/`)).join("|")})`;

const layerRules = LEVELS.flatMap((level, depth) =>
  level.map((part) => ({
    name: `layer-${part.replace(/\.ts$/, "")}`,
    comment: `${part} imports only from its own folder and from the levels before it`,
    severity: "error",
    from: { path: path([part]) },
    to: { path: "^src/", pathNot: path([...LEVELS.slice(0, depth).flat(), part]) },
  })),
);

/** @type {import("dependency-cruiser").IConfiguration} */
module.exports = {
  forbidden: [
    ...layerRules,
    {
      name: "known-layer",
      comment: "every file of src/ belongs to a layer of the list above",
      severity: "error",
      from: {},
      to: { path: "^src/", pathNot: path(LEVELS.flat()) },
    },
    {
      name: "known-layer-entry",
      comment: "the same for a file that nothing imports",
      severity: "error",
      from: { path: "^src/", pathNot: path(LEVELS.flat()) },
      to: {},
    },
    {
      name: "witness-independent",
      comment:
        "the stationary witness shares neither grid nor solvers with the steppers that it is a witness of",
      severity: "error",
      from: { path: path(["stationary"]) },
      to: { path: "^src/(?:grid/|numerics/(?:fft|tridiagonal))" },
    },
    {
      name: "browser-safe-core",
      comment: "only files/, cli/ and node.ts may use what Node alone has",
      severity: "error",
      from: { path: "^src/", pathNot: path(NODE_PARTS) },
      to: { dependencyTypes: ["core"] },
    },
    {
      name: "browser-safe-npm",
      comment: "only files/, cli/ and node.ts may use packages that need Node",
      severity: "error",
      from: { path: "^src/", pathNot: path(NODE_PARTS) },
      to: { path: `node_modules/(?:@types/)?(?:${NODE_PACKAGES.map(literally).join("|")})(?:/|$)` },
    },
    {
      name: "declared-packages-only",
      comment: "what the package imports stands in its dependencies",
      severity: "error",
      from: { path: "^src/" },
      to: { dependencyTypes: ["npm-no-pkg", "npm-unknown", "npm-dev"], dependencyTypesNot: ["type-only"] },
    },
    { name: "resolvable", severity: "error", from: {}, to: { couldNotResolve: true } },
    { name: "no-cycles", severity: "error", from: {}, to: { circular: true } },
    {
      name: "no-orphans",
      comment: "a file that nothing imports and that imports nothing",
      severity: "error",
      from: { orphan: true, pathNot: "\\.d\\.ts$" },
      to: {},
    },
  ],
  options: {
    doNotFollow: { path: "node_modules" },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: "tsconfig.json" },
    enhancedResolveOptions: {
      exportsFields: ["exports"],
      conditionNames: ["import", "node", "default", "types"],
    },
  },
};
