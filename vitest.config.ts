import { defineConfig } from "vitest/config";

/** Three projects: pure parts, parts that need the private database, and the story of the product in Chromium. */
export default defineConfig({
  test: {
    reporters: ["default", "./tests/support/closing-line.ts"],
    projects: [
      {
        test: {
          name: "unit",
          // Every folder but those of the other projects: a new one is not left out in silence.
          include: ["tests/**/*.test.{ts,tsx}"],
          exclude: ["tests/{db,server,access,routes,e2e}/**"],
          setupFiles: ["./tests/support/noise-fails.ts", "./tests/support/fixed-draws.ts"],
          testTimeout: 20_000,
        },
      },
      {
        test: {
          name: "server",
          include: ["tests/{db,server,access,routes}/**/*.test.{ts,tsx}"],
          setupFiles: ["./tests/support/noise-fails.ts", "./tests/support/fixed-draws.ts"],
          globalSetup: ["./tests/support/database.ts"],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.{ts,tsx}"],
          globalSetup: ["./tests/support/database.ts", "./tests/support/application.ts"],
          testTimeout: 180_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
