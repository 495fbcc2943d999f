/**
 * Who may import whom. The layers are the folders; what a folder may import stands in MAY_IMPORT and nowhere else.
 * A folder is imported through its index alone.
 */
const MAY_IMPORT = {
  "app/solvers": [],
  "app/spelling": [],
  "app/formulas": ["app/spelling"],
  "app/figures": [],
  "app/ui": [],
  "app/paper": ["app/spelling"],
  "app/cells": ["app/spelling", "app/paper", "app/formulas", "app/solvers", "app/figures"],
  "app/print": ["app/paper", "app/cells", "app/formulas"],
  "app/export": ["app/print", "app/paper", "app/cells", "app/figures", "app/formulas"],
  "app/galley": ["app/print", "app/paper", "app/cells", "app/figures", "app/formulas", "app/ui"],
  "app/plate": [
    "app/galley",
    "app/export",
    "app/print",
    "app/paper",
    "app/cells",
    "app/figures",
    "app/formulas",
    "app/ui",
  ],
  "app/manual": ["app/paper", "app/cells", "app/figures", "app/formulas", "app/ui"],
  "app/editor": ["app/paper", "app/cells", "app/figures", "app/formulas", "app/ui"],
  "app/access": ["app/context", "db"],
  "app/routes": [
    "app/context",
    "app/access",
    "app/editor",
    "app/galley",
    "app/plate",
    "app/manual",
    "app/export",
    "app/print",
    "app/cells",
    "app/paper",
    "app/ui",
  ],
  db: [],
  server: ["db", "app/paper", "app/cells", "app/export", "app/access", "app/context", "app/editor"],
};

/** Of these, types alone: the rows of the database come to routes through the context, and their shapes by name. */
const TYPES_ALONE = { "app/routes": ["^db/index\\.server\\.ts$"] };

const folder = (name) => `^${name}(/|\\.tsx?$)`;

const layers = Object.entries(MAY_IMPORT).map(([name, allowed]) => ({
  name: `${name.replace("/", "-")}-imports`,
  comment: `${name} may import ${allowed.length === 0 ? "nothing of ours" : allowed.join(", ")}.`,
  severity: "error",
  from: { path: `^${name}/` },
  to: {
    path: "^(app|server|db|scripts|tests|bench)/",
    pathNot: [folder(name), ...allowed.map(folder), ...(TYPES_ALONE[name] ?? [])],
  },
}));

/**
 * Files by which a folder is entered, beside its index. The protocol is constants alone, for both ends of a socket;
 * mathematics and markup stand apart so that a page without formulas does not load KaTeX.
 */
const ENTRANCES = { "app/editor": ["protocol"], "app/ui": ["math", "markup"] };

/** Every layer but the server, whose own parts keep the same rule among themselves. */
const indexed = Object.keys(MAY_IMPORT)
  .filter((name) => name !== "server" && name !== "app/routes")
  .map((name) => ({
    name: `${name.replace("/", "-")}-through-index`,
    comment: `Import ${name} through its index.`,
    severity: "error",
    from: { pathNot: `^(${name}|tests)/` },
    to: {
      path: `^${name}/`,
      pathNot: [
        `^${name}/(${["index", ...(ENTRANCES[name] ?? [])].join("|")})(\\.server|\\.client)?\\.tsx?$`,
        "\\.css$",
        "\\.worker\\.ts$",
      ],
    },
  }));

/** The server's parts reach each other through their indexes. */
const serverParts = ["compute", "fakes", "http", "sync", "tex"].map((part) => ({
  name: `server-${part}-through-index`,
  comment: `Import server/${part} through its index.`,
  severity: "error",
  from: { path: "^server/", pathNot: `^server/${part}/` },
  to: { path: `^server/${part}/`, pathNot: `^server/${part}/index\\.ts$` },
}));

module.exports = {
  forbidden: [
    {
      name: "no-cycles",
      severity: "error",
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ["type-only"] } },
    },
    {
      name: "no-orphans-of-npm",
      comment: "A package must be in package.json.",
      severity: "error",
      from: { path: "^(app|server|db)/" },
      to: { dependencyTypes: ["npm-no-pkg", "npm-unknown"] },
    },
    {
      name: "no-dev-packages-shipped",
      severity: "error",
      from: { path: "^(app|db)/" },
      to: {
        dependencyTypes: ["npm-dev"],
        dependencyTypesNot: ["type-only", "npm-peer"],
        pathNot: "@react-router/dev|^node_modules/@types/",
      },
    },
    {
      name: "routes-reach-the-database-through-the-context",
      severity: "error",
      from: { path: "^app/routes/" },
      to: { path: "^db/", dependencyTypesNot: ["type-only"] },
    },
    ...layers,
    ...indexed,
    ...serverParts,
  ],
  options: {
    doNotFollow: { path: "node_modules" },
    exclude: { path: "\\+types/" },
    tsConfig: { fileName: "tsconfig.json" },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      extensions: [".ts", ".tsx", ".mjs", ".js", ".json"],
      conditionNames: ["import", "node", "default"],
    },
  },
};
