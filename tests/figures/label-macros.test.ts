import { describe, expect, it } from "vitest";
import { labelText } from "../../app/figures/index.ts";
import { figureWithoutMacros, withoutMacros } from "../../app/figures/label-macros.ts";
import { GALLERY } from "./gallery.ts";

const MACROS = { "\\E": "\\mathbb{E}", "\\Ex": "\\E_{#1}[#2]", "\\mu": "\\nu", "\\loop": "x\\loop", "\\d": "\\delta" };

describe("macros of a paper in labels", () => {
  it("unfold, one within another, with their arguments", () => {
    expect(withoutMacros("\\E K", MACROS)).toBe("\\mathbb{E} K");
    expect(withoutMacros("\\Ex{x_0}{s^{K}} + \\Ex yK", MACROS)).toBe("\\mathbb{E}_{x_0}[s^{K}] + \\mathbb{E}_{y}[K]");
    expect(withoutMacros("\\mu_\\E", MACROS)).toBe("\\nu_\\mathbb{E}");
    expect(labelText(withoutMacros("\\Ex{x}{K}", MACROS))).toBe("𝔼_x[K]");
  });

  it("leave other commands, words and longer names alone", () => {
    for (const label of ["tail law", "\\Expected", "\\mathbb{P}", "\\\\E", "", "\\"]) {
      expect(withoutMacros(label, MACROS)).toBe(label === "\\\\E" ? "\\\\E" : label);
    }
    expect(withoutMacros("\\d x", MACROS)).toBe("\\delta x");
    expect(withoutMacros("\\d{x}", MACROS)).toBe("\\delta{x}");
  });

  it("end, whatever they unfold to", () => {
    expect(withoutMacros("\\loop", MACROS).length).toBeLessThan(3000);
    const doubling = { "\\a": "\\a\\a" };
    expect(withoutMacros("\\a", doubling).length).toBeLessThan(3000);
    expect(withoutMacros("\\Ex{x", MACROS)).toContain("\\mathbb{E}");
  });

  it("unfold everywhere in a figure, and nowhere else in it", () => {
    for (const [name, figure] of Object.entries(GALLERY)) {
      expect(figureWithoutMacros(figure, {}), name).toBe(figure);
      const marked = JSON.parse(
        JSON.stringify(figure, (key, value: unknown) =>
          (key === "label" || key === "title") && typeof value === "string" ? `\\E ${value}` : value,
        ),
      );
      const told = JSON.stringify(figureWithoutMacros(marked, { "\\E": "e" }));
      expect(told, name).not.toContain("\\\\E ");
      const plain: unknown = JSON.parse(
        told.replaceAll('"label":"e ', '"label":"').replaceAll('"title":"e ', '"title":"'),
      );
      expect(plain, name).toEqual(JSON.parse(JSON.stringify(figure)));
    }
  });
});
