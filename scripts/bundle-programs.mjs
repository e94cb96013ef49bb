import { existsSync } from "node:fs"
import path from "node:path"
import { fileURLToPath } from "node:url"
import { build } from "esbuild"

const root = fileURLToPath(new URL("..", import.meta.url))

/** Programs beside the web server: each becomes one file of dist/, its npm packages left where they are. */
export const programs = {
  worker: "src/lib/server/jobs/worker.ts",
  migrate: "src/lib/server/db/migrate.ts",
  "read-table": "src/lib/server/jobs/read-table-process.ts",
  "hdf5-child": "src/lib/tables/hdf5/hdf5-child.ts",
  "compute-figure": "src/lib/server/jobs/compute-figure-process.ts",
  "make-bundle": "src/lib/server/jobs/make-bundle-process.ts",
  local: "src/lib/server/local/local.ts",
  "seed-demo": "scripts/seed-demo.ts",
}

/** Bundles the programs with esbuild once Astro has built the site. */
export function bundlePrograms() {
  return {
    name: "afterquench-programs",
    hooks: {
      "astro:build:done": async () => {
        const present = Object.entries(programs).filter(([, file]) => existsSync(path.join(root, file)))
        await build({
          absWorkingDir: root,
          entryPoints: Object.fromEntries(present),
          outdir: path.join(root, "dist"),
          outExtension: { ".js": ".mjs" },
          bundle: true,
          platform: "node",
          target: "node20",
          format: "esm",
          packages: "external",
          sourcemap: true,
          tsconfig: path.join(root, "tsconfig.json"),
          jsx: "automatic",
          logLevel: "warning",
        })
      },
    },
  }
}
