import { describe, expect, it } from "vitest";
import {
  type AxesFields,
  type AxesGround,
  askedOf,
  computedEnds,
  fieldsOf,
} from "../../../app/editor/plates/axes-fields.ts";
import type { Figure } from "../../../app/figures/index.ts";

const series = { name: "f", label: "", labelAt: "end", mark: "line", role: "ordinary" } as const;
const FIGURE: Figure = {
  alternative: "",
  x: { label: "x", scale: "linear", range: null },
  y: { label: "w", scale: "linear", range: null },
  series: [{ ...series, x: [0, 1.23456, 4], y: [0.9, 0.5, 0.31] }],
  levels: [],
  remarks: [],
};

const NUMBERS: Readonly<Record<string, number>> = { mu: 1.6, "2*mu": 3.2 };
const ground = (change: Partial<AxesGround> = {}): AxesGround => ({
  figure: FIGURE,
  said: { x: { range: null, scale: null }, y: { range: null, scale: null } },
  numberOf: (source) => NUMBERS[source] ?? (source !== "" && Number.isFinite(Number(source)) ? Number(source) : null),
  ...change,
});

const LINEAR = { from: "", to: "", scale: "linear" } as const;
const fields = (change: Partial<AxesFields>): AxesFields => ({ x: LINEAR, y: LINEAR, ...change });

describe("fields for the axes of a figure", () => {
  it("begin with what the paper says, and show the ends that are computed, rounded outwards", () => {
    expect(fieldsOf(ground())).toEqual({ x: LINEAR, y: LINEAR });
    const said = { x: { range: ["0", "2*mu"] as const, scale: null }, y: { range: null, scale: null } };
    expect(fieldsOf(ground({ said })).x).toEqual({ from: "0", to: "2*mu", scale: "linear" });
    // y from 0: its least value is below 0.4 of its greatest, see app/figures/range.ts.
    expect(computedEnds(ground(), { x: "linear", y: "linear" })).toEqual({ x: ["0", "4"], y: ["0", "0.9"] });
    // On a logarithmic axis what is not positive has no place.
    expect(computedEnds(ground(), { x: "log", y: "log" })).toEqual({ x: ["1.234", "4"], y: ["0.31", "0.5"] });
  });

  it("ask for a range by numbers or formulas; an end left empty is the computed one", () => {
    const asked = askedOf(ground(), fields({ x: { from: "1", to: "2*mu", scale: "linear" } }));
    expect(asked.tried.x).toEqual({ range: [1, 3.2], scale: "linear" });
    expect(asked.said?.x).toEqual({ range: ["1", "2*mu"], scale: null });
    expect(askedOf(ground(), fields({ x: { from: "1", to: " ", scale: "linear" } })).said?.x.range).toEqual(["1", "4"]);
  });

  it("say a scale only where it is not the kind's own, or the author has said it all the same", () => {
    expect(askedOf(ground(), fields({ y: { ...LINEAR, scale: "log" } })).said?.y).toEqual({
      range: null,
      scale: "log",
    });
    const y = { ...FIGURE.y, scale: "linear", otherwise: { scale: "log", range: null } } as const;
    const said = { x: { range: null, scale: null }, y: { range: null, scale: "linear" } } as const;
    const told = ground({ figure: { ...FIGURE, y }, said });
    expect(askedOf(told, fields({ y: { ...LINEAR, scale: "log" } })).said?.y.scale).toBeNull();
    expect(askedOf(told, fields({})).said?.y.scale).toBe("linear");
    const redundant = ground({ said: { ...said, y: { range: null, scale: "linear" } } });
    expect(askedOf(redundant, fields({})).said?.y.scale).toBe("linear");
  });

  it("go back to the kind's own range where the ends are emptied", () => {
    const x = { ...FIGURE.x, range: [1, 2], otherwise: { scale: "linear", range: [0, 8] } } as const;
    const said = { x: { range: ["1", "2"], scale: null }, y: { range: null, scale: null } } as const;
    const asked = askedOf(ground({ figure: { ...FIGURE, x }, said }), fields({}));
    expect(asked.tried.x.range).toEqual([0, 8]);
    expect(asked.said?.x.range).toBeNull();
  });

  it.each([
    [{ from: "abc", to: "", scale: "linear" }, "x from", /^abc is no number/],
    [{ from: "0", to: "2 3", scale: "linear" }, "x to", /^2 3 is no number/],
    [{ from: "3", to: "3", scale: "linear" }, "x to", /has to be above 3/],
    [{ from: "5", to: "", scale: "linear" }, "x from", /has to be below 4/],
    [{ from: "0", to: "4", scale: "log" }, "x from", /begins above 0, and 0 is not/],
  ] as const)("refuse %j at its field, with what would do", (x, field, words) => {
    const asked = askedOf(ground(), fields({ x }));
    expect([...asked.faults.keys()]).toEqual([field]);
    expect(asked.faults.get(field)).toMatch(words);
    expect(asked.said).toBeNull();
    // What is at fault is not tried; the other axis is.
    expect(asked.tried.x).toEqual({ range: null, scale: "linear" });
  });

  it("refuse a logarithmic axis on which nothing would show", () => {
    const figure: Figure = { ...FIGURE, series: [{ ...series, x: [0, 1], y: [-1, 0] }] };
    const asked = askedOf(ground({ figure }), fields({ y: { ...LINEAR, scale: "log" } }));
    expect([...asked.faults.keys()]).toEqual(["y scale"]);
  });

  it("do not offer as an end what a double cannot hold", () => {
    const deep: Figure = {
      ...FIGURE,
      y: { label: "p", scale: "log", range: null },
      series: [{ ...series, x: [0, 1], y: [1, 0], log10y: [0, -741] }],
    };
    expect(computedEnds(ground({ figure: deep }), { x: "linear", y: "log" }).y).toEqual(["", ""]);
    const asked = askedOf(ground({ figure: deep }), fields({ y: { from: "1e-20", to: "", scale: "log" } }));
    expect(asked.faults.get("y to")).toMatch(/cannot be computed/);
  });
});
