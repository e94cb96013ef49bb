import { fileURLToPath } from "node:url"
import { defineConfig } from "vitest/config"

const path = (relative: string) => fileURLToPath(new URL(relative, import.meta.url))
const alias = { "@specs": path("./figure-specs"), "@tests": path("./tests"), "@": path("./src") }

/**
 * Three projects. `unit` is pure and needs nothing; `db` and `api` need the PostgreSQL that scripts/test.mjs starts
 * (TEST_DATABASE_URL); `e2e` needs the built application and Debian's Chromium besides.
 */
export default defineConfig({
  resolve: { alias },
  test: {
    projects: [
      {
        resolve: { alias },
        test: {
          name: "unit",
          include: [
            "src/**/*.test.{ts,tsx}",
            "figure-specs/**/*.test.ts",
            "tests/reference/**/*.test.ts",
            "scripts/**/*.test.{ts,mjs}",
          ],
          testTimeout: 60_000,
        },
      },
      {
        resolve: { alias },
        test: {
          name: "server",
          include: ["tests/db/**/*.test.ts", "tests/api/**/*.test.ts"],
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        resolve: { alias },
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          testTimeout: 300_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
})
