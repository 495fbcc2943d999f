import { describe, expect, it } from "vitest";
import { paperToLatex } from "../../app/export/index.ts";
import { doubtsOf, provenanceLine, setPaper } from "../../app/print/index.ts";
import { computed, shownAs } from "../export/sample.ts";

const PAPER = (mu: number) => `\`\`\`parameters
mu: ${mu}
\`\`\`

\`\`\`process P
drift: mu
rate: 1
\`\`\`

\`\`\`counts K
of: P
start: 1
up_to: 10
\`\`\`

Mean :value[K.mean], decay :value[P.decay], drift :value[mu], in a formula $\\value{K.mean}$.
`;

describe("a paper as it is set", () => {
  const before = computed(PAPER(2));
  const shown = shownAs(before);

  it("has no notes while everything is current, and says how each result came to be", () => {
    const set = setPaper(before.paper, before.plan, before.results, shown);
    expect(set.notes).toEqual([]);
    expect(doubtsOf(set)).toEqual({ outOfDate: 0 });
    const [, , counts] = before.paper.cells;
    expect(counts && provenanceLine(set.cell(counts))).toMatch(/D = 0\.5.* · Inês, 1 Dec 2026, 14:31 UTC$/);
  });

  it("has one note for all that is out of date for the same reason; parameters are never out of date", () => {
    const { paper, plan } = computed(PAPER(2.5));
    const set = setPaper(paper, plan, before.results, shown);
    expect(set.notes).toEqual([{ mark: "†", words: "Set with $\\mu$ = 2; $\\mu$ is now 2.5." }]);
    const [mean, decay, drift] = paper.numbers.map((number) => set.number(number));
    expect(mean?.note?.mark).toBe("†");
    expect(decay?.note?.mark).toBe("†");
    expect(drift?.note).toBe(null);
    expect(drift?.printed?.text).toBe("2.5");
    expect(doubtsOf(set)).toEqual({ outOfDate: 4 });
  });

  it("prints the old number with a dagger and one footnote", () => {
    const { paper, plan } = computed(PAPER(2.5));
    const { files, problems } = paperToLatex(paper, plan, before.results, shown);
    const main = files[0]?.text ?? "";
    expect(problems).toEqual([]);
    expect(main.match(/\\outofdate\{†\}/g)).toHaveLength(1);
    expect(main).toContain("Set with $\\mu$ = 2; $\\mu$ is now 2.5.");
    expect(main).toMatch(/in a formula \$\{\{0\.0329023\}\^\{\\text\{†\}\}\}\$/);
  });

  it("has no value where there is no result, and says so", () => {
    const set = setPaper(before.paper, before.plan, new Map(), {
      cells: new Map(),
      work: new Map(),
      changes: new Map(),
    });
    const [mean] = before.paper.numbers;
    expect(mean && set.number(mean)).toMatchObject({ printed: null, reason: "`K` has no result." });
  });
});
