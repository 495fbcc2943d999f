import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";

const folder = new URL("../../app/solvers/", import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith(".ts"));
const text = (name: string) => readFileSync(new URL(name, folder), "utf8");

/** Functions that the folder's index hands on, with their file. */
const published = [...text("index.ts").matchAll(/export \{([^}]*)\} from "\.\/([a-z-]+\.ts)"/g)].flatMap((match) =>
  (match[1] ?? "")
    .split(",")
    .map((name) => name.trim())
    .filter((name) => /^[a-z]/.test(name))
    .map((name) => [name, match[2] ?? ""] as const),
);

/** The comment that ends where the function begins. */
function docstring(name: string, file: string): string {
  const source = text(file);
  const at = source.indexOf(`export function ${name}(`);
  const before = source.slice(0, at).trimEnd();
  return before.endsWith("*/") ? before.slice(before.lastIndexOf("/**")) : "";
}

describe("the solvers' own papers", () => {
  test("something is published", () => {
    expect(published.length).toBeGreaterThan(8);
  });

  test.each(published)("%s names the source of its formula", (name, file) => {
    expect(docstring(name, file)).toContain("Source:");
  });

  test.each(published)("%s says what it throws, where it throws", (name, file) => {
    const body = text(file).split(`export function ${name}(`)[1]?.split("\n}\n")[0] ?? "";
    if (/throw new|require[A-Z]/.test(body)) expect(docstring(name, file)).toContain("@throws");
  });

  test.each(files)("%s keeps to one idea's length", (name) => {
    expect(text(name).split("\n").length).toBeLessThan(300);
  });
});
