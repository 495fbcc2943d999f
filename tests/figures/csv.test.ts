import { describe, expect, it } from "vitest";
import { figureToCsv, tableToCsv } from "../../app/figures/index.ts";
import { deepLaw, figure, series } from "./sample.ts";

describe("points as CSV", () => {
  it("puts series side by side on the abscissas of all, at full precision", () => {
    const two = figure({
      series: [
        series({ name: "a", x: [0, 1], y: [0.1 + 0.2, null] }),
        series({ name: "b", x: [1, 2], y: [5, 6], low: [4, 5], high: [6, 7] }),
      ],
    });
    expect(figureToCsv(two)).toBe("x,a,b,b low,b high\r\n0,0.30000000000000004,,,\r\n1,,5,4,6\r\n2,,6,5,7\r\n");
  });

  it("gives a curve in the plane, panels and an inset abscissas of their own, and a band both its ends", () => {
    const orbit = figure({ series: [series({ name: "orbit", parametric: true, x: [0, 1, 0], y: [1, 0, -1] })] });
    const band = figure({
      series: [series({ name: "b", mark: "band", x: [5, 6], y: [null, null], low: [1, 2], high: [3, 4] })],
    });
    expect(figureToCsv(orbit)).toBe("orbit x,orbit\r\n0,1\r\n1,0\r\n0,-1\r\n");
    const panels = figure({ series: [], panels: [orbit, band].map((one) => ({ title: "", figure: one })) });
    expect(figureToCsv(panels)).toBe(
      "(a) orbit x,(a) orbit,(b) x,(b) b low,(b) b high\r\n0,1,5,1,3\r\n1,0,6,2,4\r\n0,-1,,,\r\n",
    );
    expect(figureToCsv({ ...band, inset: { figure: orbit, corner: null } })).toBe(
      "x,b low,b high,inset orbit x,inset orbit\r\n5,1,3,0,1\r\n6,2,4,1,0\r\n,,,0,-1\r\n",
    );
  });

  it("writes numbers below the double's range with their power of ten", () => {
    expect(figureToCsv(deepLaw).trimEnd().split("\r\n").at(-1)).toBe("1000,1e-741");
  });

  it("quotes what would break a row and disarms what a spreadsheet would take for a formula", () => {
    const entry = (text: string) => ({ text, tex: text, unsupported: "", full: text, error: "" });
    const table = {
      columns: [{ name: "say", head: "say", tex: false }],
      rows: [[entry('two, "three"')], [entry("=1+1")], [entry("-2.5")]],
      remarks: [],
    };
    expect(tableToCsv(table)).toBe('say\r\n"two, ""three"""\r\n\'=1+1\r\n-2.5\r\n');
  });

  it("gives errors a column of their own where there are any", () => {
    const table = {
      columns: [
        { name: "n", head: "n", tex: true },
        { name: "p", head: "p", tex: true },
      ],
      rows: [
        [
          { text: "1", tex: "1", unsupported: "", full: "1", error: "" },
          { text: "0.175", tex: "0.175", unsupported: "", full: "0.17501703", error: "1e-13" },
        ],
      ],
      remarks: [],
    };
    expect(tableToCsv(table)).toBe("n,p,p error\r\n1,0.17501703,1e-13\r\n");
  });
});
