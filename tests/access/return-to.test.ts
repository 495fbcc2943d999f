import { expect, test } from "vitest";
import { safeReturnTo } from "../../app/access/index.ts";

test.each(["/shelf", "/papers/x/galley?print=1#fig", "/", "/a//b"])("%s is ours", (path) => {
  expect(safeReturnTo(path, "/shelf")).toBe(path);
});

test.each([
  "https://evil.test/",
  "//evil.test",
  "/\\evil.test",
  "/\t/evil.test",
  "/%09/../\\evil.test\n//",
  "\\\\evil.test",
  "javascript:alert(1)",
  "shelf",
  "",
  null,
  undefined,
  7,
])("%s leads nowhere but to the shelf", (path) => {
  const safe = safeReturnTo(path, "/shelf");
  const led = new URL(safe, "http://halfline.example");
  expect(led.origin).toBe("http://halfline.example");
  if (typeof path !== "string" || !path.startsWith("/%09")) expect(safe).toBe("/shelf");
});
