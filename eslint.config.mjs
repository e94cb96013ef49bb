import path from "node:path"
import { fileURLToPath } from "node:url"
import astro from "eslint-plugin-astro"
import importX from "eslint-plugin-import-x"
import { createTypeScriptImportResolver } from "eslint-import-resolver-typescript"
import jsxA11y from "eslint-plugin-jsx-a11y"
import reactHooks from "eslint-plugin-react-hooks"
import tseslint from "typescript-eslint"

const root = path.dirname(fileURLToPath(import.meta.url))

const edge = ["src/lib/server/db", "src/lib/server/auth", "src/lib/server/http", "src/lib/server/mail"]

/** Which of our folders each layer may import, besides itself; docs/architecture.md explains the table. */
const layers = {
  "src/lib/stats": [],
  "src/lib/tables": ["src/lib/stats"],
  "src/lib/domain": ["src/lib/stats"],
  "figure-specs": ["src/lib/stats", "src/lib/domain"],
  "src/lib/render": ["figure-specs", "src/lib/domain", "src/lib/stats"],
  "src/lib/bundle": ["figure-specs", "src/lib/tables", "src/lib/render", "src/lib/domain", "src/lib/stats"],
  "src/lib/contracts": ["src/lib/domain", "figure-specs"],
  "src/lib/client": ["src/lib/contracts", "figure-specs", "src/lib/domain", "src/lib/stats"],
  "src/components": ["src/lib/client", "src/lib/contracts", "src/lib/domain", "figure-specs"],
  "src/lib/server/db": ["src/lib/domain"],
  "src/lib/server/auth": [...edge, "src/lib/domain", "src/lib/contracts"],
  "src/lib/server/http": [...edge, "src/lib/domain", "src/lib/contracts"],
  "src/lib/server/mail": [...edge, "src/lib/domain", "src/lib/contracts"],
}

/** no-restricted-paths wants one forbidden folder a zone: every known layer that is neither the layer nor allowed. */
const allLayers = [
  ...Object.keys(layers),
  "src/lib/server/services",
  "src/lib/server/jobs",
  "src/layouts",
  "src/pages",
]
const restricted = Object.entries(layers).flatMap(([layer, allowed]) =>
  allLayers
    .filter((other) => other !== layer && !allowed.some((ok) => other === ok || other.startsWith(`${ok}/`)))
    .map((other) => ({
      target: `./${layer}`,
      from: `./${other}`,
      message: `${layer} may not import ${other}: see the layers in docs/architecture.md.`,
    })),
)

export default tseslint.config(
  { ignores: ["dist/", ".astro/", ".data/", ".cache/", "node_modules/", "public/"] },
  ...tseslint.configs.recommended,
  ...astro.configs["flat/recommended"],
  ...astro.configs["flat/jsx-a11y-recommended"],
  {
    plugins: { "import-x": importX },
    settings: {
      "import-x/resolver-next": [
        createTypeScriptImportResolver({ project: path.join(root, "tsconfig.json") }),
      ],
    },
    rules: {
      "import-x/no-restricted-paths": ["error", { basePath: root, zones: restricted }],
      "import-x/no-cycle": ["error", { maxDepth: 6 }],
      "no-empty": ["error", { allowEmptyCatch: false }],
      "@typescript-eslint/no-unused-vars": ["error", { argsIgnorePattern: "^_", varsIgnorePattern: "^_" }],
      eqeqeq: ["error", "always", { null: "ignore" }],
      "no-console": "off",
    },
  },
  {
    files: ["src/components/**/*.{ts,tsx}", "src/lib/client/**/*.{ts,tsx}"],
    plugins: { "react-hooks": reactHooks, "jsx-a11y": jsxA11y },
    rules: { ...reactHooks.configs.recommended.rules, ...jsxA11y.flatConfigs.recommended.rules },
  },
)
