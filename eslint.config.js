import { readdirSync } from "node:fs";
import { createTypeScriptImportResolver } from "eslint-import-resolver-typescript";
import { importX } from "eslint-plugin-import-x";
import reactHooks from "eslint-plugin-react-hooks";
import tanstackQuery from "@tanstack/eslint-plugin-query";
import { defineConfig, globalIgnores } from "eslint/config";
import tseslint from "typescript-eslint";

// Who may import whom. Read "target may not import from". Everything not listed is allowed.
const features = readdirSync("src/features");
const zones = [
  { target: "shared", from: ["server", "src", "tests"], message: "shared/ is pure and imports nothing above it." },
  { target: "src", from: ["server", "tests"], message: "The client talks to the server through shared/api only." },
  { target: "server", from: ["src", "tests"], message: "The server never imports the client." },
  { target: "src/features", from: "src/app", message: "Pages compose features, not the other way round." },
  {
    target: ["src/components", "src/map", "src/workers", "src/api"],
    from: ["src/features", "src/app"],
    message: "Building blocks know no feature.",
  },
  {
    target: "server/db",
    from: ["server/services", "server/routes", "server/http"],
    message: "db/ is the bottom of the server.",
  },
  {
    target: "server/services",
    from: ["server/routes", "server/http", "server/presenters"],
    message: "Services know no HTTP.",
  },
  { target: "server/routes", from: "server/db", message: "Routes call services; services call db/." },
  ...features.map((name) => ({
    target: `src/features/${name}`,
    from: "src/features",
    except: [`./${name}`],
    message: "Features do not import each other; compose them in src/app.",
  })),
  // The pure core, lowest first: each may use those before it.
  ...["units", "projection", "geometry", "area", "frame", "draw", "field", "counts", "estimate", "plan"].map(
    (name, i, all) => ({
      target: `shared/${name}`,
      from: [...all.slice(i + 1), "record", "exchange", "access", "api"].map((n) => `shared/${n}`),
      message: "The core goes one way: geometry, frame, draw, counts, estimate.",
    }),
  ),
];

const noClock = {
  selector: "NewExpression[callee.name='Date'][arguments.length=0]",
  message: "Take the time as an argument.",
};

export default defineConfig(
  globalIgnores(["dist", "data", "drizzle", "*.config.js", "*.config.ts", "tests/reference"]),
  ...tseslint.configs.strictTypeChecked,
  { languageOptions: { parserOptions: { projectService: true } } },
  reactHooks.configs.flat.recommended,
  ...tanstackQuery.configs["flat/recommended"],
  {
    plugins: { "import-x": importX },
    settings: {
      "import-x/extensions": [".ts", ".tsx"],
      "import-x/parsers": { "@typescript-eslint/parser": [".ts", ".tsx"] },
      "import-x/resolver-next": [
        createTypeScriptImportResolver({
          project: ["shared", "server", "src", "tests"],
          noWarnOnMultipleProjects: true,
        }),
      ],
    },
    rules: {
      "import-x/no-restricted-paths": ["error", { zones }],
      "import-x/no-cycle": "error",
      "import-x/no-default-export": "error",
      "max-lines": ["error", { max: 250, skipBlankLines: true, skipComments: true }],
      "max-lines-per-function": ["error", { max: 80, skipBlankLines: true, skipComments: true }],
      "no-console": "error",
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", ignoreRestSiblings: true }],
      "@typescript-eslint/no-confusing-void-expression": ["error", { ignoreArrowShorthand: true }],
      "@typescript-eslint/consistent-type-imports": "error",
      "@typescript-eslint/switch-exhaustiveness-check": "error",
      "@typescript-eslint/restrict-template-expressions": ["error", { allowNumber: true }],
    },
  },
  {
    files: ["shared/**"],
    rules: {
      "no-restricted-properties": [
        "error",
        { object: "Math", property: "random", message: "Take a seeded generator as an argument." },
        { object: "Date", property: "now", message: "Take the time as an argument." },
      ],
      "no-restricted-syntax": ["error", noClock],
    },
  },
  {
    files: ["shared/{geometry,frame,draw}/**"],
    rules: {
      "no-restricted-syntax": [
        "error",
        noClock,
        {
          selector:
            "MemberExpression[object.name='Math'][property.name=/^(sin|cos|tan|a?sinh?|a?cosh?|atan2?|exp|expm1|log|log2|log10|log1p|pow|sqrt|cbrt|hypot)$/]",
          message: "May differ between engines in the last bit; hashed and drawn values must be exact.",
        },
        { selector: "BinaryExpression[operator='**']", message: "As Math.pow." },
      ],
    },
  },
  {
    files: ["src/**"],
    ignores: ["src/map/**"],
    rules: {
      "no-restricted-imports": ["error", { paths: [{ name: "leaflet", message: "Only src/map talks to Leaflet." }] }],
    },
  },
  {
    files: ["src/**"],
    ignores: ["src/api/**"],
    rules: { "no-restricted-globals": ["error", { name: "fetch", message: "Use call() from src/api." }] },
  },
  {
    files: ["server/**"],
    ignores: ["server/db/**"],
    rules: {
      "no-restricted-imports": [
        "error",
        { patterns: [{ group: ["drizzle-orm*", "better-sqlite3"], message: "SQL lives in server/db." }] },
      ],
    },
  },
  // A suite is one describe block, and a walk through the product is long; Vitest wants a default export of its set-up.
  { files: ["tests/**"], rules: { "max-lines-per-function": "off", "max-lines": "off" } },
  { files: ["tests/e2e/**"], rules: { "no-console": "off" } },
  // The virtual list hands out functions that change; its hook says "use no memo" itself.
  { files: ["src/components/ui/use-visible-lines.ts"], rules: { "react-hooks/incompatible-library": "off" } },
  { files: ["tests/e2e/global.ts"], rules: { "import-x/no-default-export": "off" } },
  { files: ["server/http/problems.ts"], rules: { "no-console": "off" } },
  {
    files: ["**/*.mjs"],
    extends: [tseslint.configs.disableTypeChecked],
    languageOptions: { parserOptions: { projectService: false } },
    rules: { "no-console": "off" },
  },
);
