import { fileURLToPath } from "node:url"
import node from "@astrojs/node"
import react from "@astrojs/react"
import auth from "auth-astro"
import tailwindcss from "@tailwindcss/vite"
import { defineConfig } from "astro/config"
import { bundlePrograms } from "./scripts/bundle-programs.mjs"

const here = (folder) => fileURLToPath(new URL(folder, import.meta.url))

export default defineConfig({
  output: "server",
  adapter: node({ mode: "middleware" }),
  integrations: [react(), auth({ injectEndpoints: false }), bundlePrograms()],
  // Ours is in the middleware: it knows the public address, which the adapter does not.
  security: { checkOrigin: false },
  devToolbar: { enabled: false },
  experimental: {
    // Sent as a header with every page. The middleware adds what Astro has no word for: style attributes, which React sets.
    csp: {
      // The one style element that the controls' library adds (how touches scroll).
      styleDirective: { hashes: ["sha256-38RhXrc7EdReTKsOm23ZPOCUgniTUUcjky8QOOrQx6o="] },
      directives: [
        "default-src 'self'",
        "img-src 'self' data: blob:",
        "font-src 'self' data:",
        "connect-src 'self'",
        "worker-src 'self' blob:",
        "object-src 'none'",
        "base-uri 'none'",
        "form-action 'self'",
        "frame-ancestors 'none'",
      ],
    },
  },
  vite: {
    // Astro takes aliases from tsconfig.json, but not for workers.
    resolve: { alias: { "@specs": here("./figure-specs"), "@": here("./src") } },
    plugins: [tailwindcss()],
    // Scripts stay files, so that the policy needs no hash for each of them.
    build: { assetsInlineLimit: 0, chunkSizeWarningLimit: 1500 },
    worker: { format: "es" },
  },
})
