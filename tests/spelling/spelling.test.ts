import { describe, expect, test } from "vitest";
import { nearestSpelling } from "../../app/spelling/index.ts";

describe("the nearest spelling", () => {
  test.each([
    ["sqr", "sqrt"],
    ["drfit", "drift"],
    ["Sqrt", "sqrt"],
    ["zzzzzz", null],
    ["", null],
    // Two changes are too many for five letters, and not for eight.
    ["dirfx", null],
    ["diffuzjon", "diffusion"],
  ])("of %s is %s", (word, nearest) => {
    expect(nearestSpelling(word, ["sqrt", "drift", "exp", "diffusion"])).toBe(nearest);
  });

  test("of equally near words the one with the same first letter, else the first", () => {
    expect(nearestSpelling("rate", ["late", "rats"])).toBe("rats");
    expect(nearestSpelling("cat", ["bat", "hat"])).toBe("bat");
  });

  test("words too long to be compared have none", () => {
    expect(nearestSpelling("a".repeat(41), ["a".repeat(41)])).toBeNull();
  });
});
