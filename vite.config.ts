import { fileURLToPath } from "node:url";
import { reactRouter } from "@react-router/dev/vite";
import tailwindcss from "@tailwindcss/vite";
import { defineConfig } from "vite";

/** One copy of each in the bundle: two copies of Yjs or of CodeMirror's state do not know each other's classes. */
const SINGLE = [
  "yjs",
  "y-protocols",
  "lib0",
  "@codemirror/state",
  "@codemirror/view",
  "@codemirror/language",
  "@lezer/common",
  "@lezer/highlight",
];

/** Imported lazily by the sheet; found late, each would make the development server reload the page in use. */
const EDITOR = [
  "yjs",
  "y-websocket",
  "y-indexeddb",
  "y-codemirror.next",
  "y-protocols/awareness",
  "y-protocols/sync",
  "lib0/decoding",
  "lib0/encoding",
  "@codemirror/commands",
  "@codemirror/state",
  "@codemirror/view",
  "katex",
  "odex",
  "mathjs/number",
  "yaml",
  "d3-array",
  "d3-shape",
  "unified",
  "remark-parse",
];

export default defineConfig(({ isSsrBuild }) => ({
  plugins: [tailwindcss(), reactRouter()],
  resolve: {
    dedupe: SINGLE,
    alias: {
      // Named character references (&amp;) by table: the browser's variant asks `document`, which workers do not have.
      "decode-named-character-reference": fileURLToPath(
        new URL("./node_modules/decode-named-character-reference/index.js", import.meta.url),
      ),
    },
  },
  optimizeDeps: { include: EDITOR },
  // Hundreds of small modules of which little is used: bundled, as in scripts/build-server.mjs, they load much faster.
  ssr: { noExternal: isSsrBuild ? ["mathjs"] : [] },
  worker: { format: "es" as const },
  build: {
    // Inlined fonts would be `data:` addresses, which the content security policy refuses.
    assetsInlineLimit: 0,
    // The request handler must be bundled with the routes: the contexts it sets are compared by identity.
    ...(isSsrBuild ? { rolldownOptions: { input: "./server/app.ts" } } : {}),
  },
  server: { watch: { ignored: ["**/.local/**", "**/build/**", "**/*.log"] } },
}));
