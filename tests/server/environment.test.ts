import { expect, test } from "vitest";
import { EnvironmentError, readEnvironment } from "../../server/env.server.ts";

const DEMO = { HALFLINE_MODE: "demo", DATABASE_URL: "postgres://localhost/halfline" };
const PRODUCTION = {
  HALFLINE_MODE: "production",
  DATABASE_URL: "postgres://db.example/halfline",
  SESSION_SECRET: "q8Zt3vLw1Xy7Kd0Rb5Nc9Hs2Fj4Gm6Pa",
  GITHUB_CLIENT_ID: "id",
  GITHUB_CLIENT_SECRET: "secret",
  PUBLIC_URL: "https://halfline.example/",
};

function faults(variables: Record<string, string | undefined>): readonly string[] {
  try {
    readEnvironment(variables);
  } catch (error) {
    if (error instanceof EnvironmentError) return error.faults;
    throw error;
  }
  return [];
}

test("a demo needs its mode and its database", () => {
  expect(readEnvironment(DEMO)).toMatchObject({ mode: "demo", host: "127.0.0.1", port: 4180, publicUrl: null });
  expect(readEnvironment({ ...DEMO, PORT: "", HOST: "" })).toMatchObject({ host: "127.0.0.1", port: 4180 });
});

test("all faults are told at once, each with its variable", () => {
  expect(faults({})).toEqual([
    "HALFLINE_MODE is not set. It is one of: demo, test, production",
    "DATABASE_URL is not set",
  ]);
  const bare = faults({ HALFLINE_MODE: "production", DATABASE_URL: "postgres://db/x", NODE_ENV: "development" });
  expect(bare.map((fault) => fault.split(" ")[0])).toEqual([
    "NODE_ENV",
    "SESSION_SECRET",
    "GITHUB_CLIENT_ID",
    "GITHUB_CLIENT_SECRET",
    "PUBLIC_URL",
  ]);
});

test.each(["demo", "test"])("%s mode stays on loopback, since anybody may sign in as anybody", (mode) => {
  expect(faults({ ...DEMO, HALFLINE_MODE: mode, HOST: "0.0.0.0" })[0]).toContain('HOST is "0.0.0.0"');
  expect(faults({ ...DEMO, HALFLINE_MODE: mode, PUBLIC_URL: "https://halfline.example" })[0]).toContain("PUBLIC_URL");
  expect(faults({ ...DEMO, HALFLINE_MODE: mode, HOST: "localhost" })).toEqual([]);
});

test("production is content with real secrets and https, and only with them", () => {
  expect(readEnvironment(PRODUCTION)).toMatchObject({ publicUrl: "https://halfline.example", logLevel: "info" });
  expect(faults({ ...PRODUCTION, PUBLIC_URL: "http://halfline.example" })[0]).toContain("only https:// is accepted");
  expect(faults({ ...PRODUCTION, PUBLIC_URL: "http://localhost:4180" })).toEqual([]);
  for (const weak of ["secret", "aaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaaa"]) {
    expect(faults({ ...PRODUCTION, SESSION_SECRET: weak })[0]).toContain("too easy to guess");
  }
});

test.each([
  ["PORT", "many"],
  ["PORT", "70000"],
  ["DATABASE_URL", "mysql://x"],
  ["HALFLINE_MODE", "staging"],
  ["LOG_LEVEL", "loud"],
  ["PUBLIC_URL", "halfline"],
])("%s = %s is refused", (name, value) => {
  expect(faults({ ...DEMO, [name]: value })[0]).toMatch(new RegExp(`^${name}`));
});
