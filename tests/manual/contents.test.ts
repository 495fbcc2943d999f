import { createElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { createMemoryRouter, RouterProvider } from "react-router";
import { describe, expect, it } from "vitest";
import { KINDS } from "../../app/cells/index.ts";
import { FUNCTIONS } from "../../app/formulas/index.ts";
import { manualContents } from "../../app/manual/index.server.ts";
import { ManualPage } from "../../app/manual/index.ts";

const contents = manualContents();

describe("the manual", () => {
  it("has pages on every kind, with every key, value and callable that the program knows", () => {
    expect(contents.kinds.map(({ name }) => name)).toEqual([...KINDS.keys()]);
    for (const { name, keys, values, callables } of contents.kinds) {
      const documentation = KINDS.get(name)?.documentation;
      expect(keys.map(({ term }) => term)).toEqual(documentation?.keys.map((key) => key.name));
      expect(values).toHaveLength(documentation?.values.length ?? -1);
      expect(callables).toHaveLength(documentation?.callables.length ?? -1);
    }
  });

  it("has every function of the formulas, and says something of each", () => {
    expect(contents.functions).toHaveLength(FUNCTIONS.length);
    for (const { meaning } of [...contents.functions, ...contents.numbers, ...contents.presentation])
      expect(meaning.length).toBeGreaterThan(3);
  });

  it("shows the figure that an example computes", () => {
    const drawn = contents.kinds.filter(({ plate }) => plate !== "").map(({ name }) => name);
    expect(drawn).toEqual(expect.arrayContaining(["profile", "counts", "tail"]));
    for (const { plate } of contents.kinds) expect(plate).not.toContain("NaN");
  });

  it("is a page whose contents lead to sections that are there", () => {
    const router = createMemoryRouter([{ path: "/", element: createElement(ManualPage, { home: "/", contents }) }]);
    const html = renderToStaticMarkup(createElement(RouterProvider, { router }));
    const places = new Set([...html.matchAll(/ id="([^"]+)"/g)].map((match) => match[1]));
    const links = [...html.matchAll(/ href="#([^"]+)"/g)].map((match) => match[1] ?? "");
    expect(links.length).toBeGreaterThan(KINDS.size);
    for (const link of links) expect(places).toContain(link);
  });
});
