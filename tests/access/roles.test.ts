import { expect, test } from "vitest";
import { may, type Standing } from "../../app/access/index.ts";

test.each<[Standing, string]>([
  ["owner", "read write own"],
  ["author", "read write"],
  ["referee", "read"],
  ["reader", "read"],
  ["visitor", "read"],
])("%s may %s, and nothing else", (standing, rights) => {
  const all = ["read", "write", "own"] as const;
  expect(all.filter((right) => may(standing, right)).join(" ")).toBe(rights);
});
