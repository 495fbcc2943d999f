import type { KindDocumentation } from "../kind.ts";

export const FIGURE_DOCUMENTATION: KindDocumentation = {
  name: "figure",
  label: "Figure",
  summary:
    "Curves of formulas, of other cells, or both in one plate; with bands, levels, an inset, or as panels side by side.",
  keys: [
    {
      name: "over",
      meaning:
        "one name and its values: an interval {x: 0 to 4} gives curves, a list {n: [1, 2, 5]} points; a formula that exists at whole numbers only gives points there; a parameter is varied",
      required: false,
      fallback: null,
    },
    {
      name: "curves",
      meaning: "a map of names to formulas, or to cells, whose own curves are drawn: {exact: K, tail: T(n)}",
      required: false,
      fallback: null,
    },
    {
      name: "bands",
      meaning:
        "a map of names to both ends, {simulated: [S.low(n), S.high(n)]}; one with a curve's name is the band of that curve",
      required: false,
      fallback: null,
    },
    {
      name: "levels",
      meaning: "dotted references: a list of formulas, or a map of names to them",
      required: false,
      fallback: null,
    },
    {
      name: "points",
      meaning: "how many points a curve has at most, where `over` gives an interval",
      required: false,
      fallback: "121, or 40 where a parameter is varied",
    },
    {
      name: "inset",
      meaning:
        "a cell whose figure stands small in a free corner, or {cell: P, at: top right}; at is top left, top right, bottom left or bottom right",
      required: false,
      fallback: null,
    },
    {
      name: "panels",
      meaning: "a list of cells whose figures stand side by side, lettered (a), (b), …; in place of curves",
      required: false,
      fallback: null,
    },
  ],
  ownKeys: false,
  values: [],
  callables: [],
  parts: ["figure", "points"],
  shows: ["figure"],
  example: "over: {x_1: 0 to 4}\ncurves:\n  near: exp(-x_1)\n  far: larvae.survival(x_1)\nlevels: [1/2]",
  offered: {
    name: "curves",
    line: "curves of formulas and of cells",
    words: "plot plate graph curve compare draw",
    body: "over: {«dummy»: «from» to «to»}\ncurves:\n  «column»: ‹«curve»›\ncaption: The values of `«curve»`.",
  },
};
