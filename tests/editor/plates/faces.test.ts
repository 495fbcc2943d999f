import { expect, test } from "vitest";
import { covers } from "../../../app/editor/plates/faces.ts";

test("a face goes with a picture where some letter of its words lies in the face's range", () => {
  expect(covers("U+0000-00FF, U+0131", "x = 4")).toBe(true);
  expect(covers("U+0370-03FF", "x = 4")).toBe(false);
  expect(covers("U+0370-03FF", "μ = 4")).toBe(true);
  expect(covers("U+4??", "ж")).toBe(true);
  expect(covers("", "x")).toBe(true);
  expect(covers("U+0020-007F", "")).toBe(false);
});
