import { describe, expect, test } from "vitest";
import { reportPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { EMPTY_SHEET, STARTING_POINTS, startingPoint } from "../../app/routes/parts/starts.ts";

describe("a starting point", { timeout: 60_000 }, () => {
  test.each([EMPTY_SHEET, ...STARTING_POINTS])(
    "$id: reads and computes without a problem, under its author's name",
    (start) => {
      const paper = readPaper(start.text("Inês O'Dell: #1"), start.bibliography);
      expect(paper.problems).toEqual([]);
      expect(paper.front.authors).toMatchObject([{ name: "Inês O'Dell: #1" }]);
      const report = reportPaper(paper);
      expect(report.problems).toEqual([]);
      for (const number of report.numbers) expect(number.text, number.formula).not.toBe(undefined);
      for (const cell of Object.values(report.cells)) {
        expect(cell.status).toBe("computed");
        if (cell.status === "computed" && cell.kind === "check") expect(cell.values.verdict).toEqual({ text: "holds" });
      }
    },
  );

  test.each(STARTING_POINTS)("$id: ends of its scales compute too", (start) => {
    const paper = readPaper(start.text("A"), start.bibliography);
    for (const mu of ["1.5", "3"]) expect(reportPaper(paper, { mu }).problems).toEqual([]);
  });

  test("an unknown one is the empty sheet", () => {
    expect(startingPoint("nothing")).toBe(EMPTY_SHEET);
  });
});
