import { describe, expect, test } from "vitest";
import { paperToLatex } from "../../app/export/index.ts";
import { renderGalley } from "../../app/galley/index.ts";
import { computed, NOTHING_SHOWN } from "../export/sample.ts";

const PAPER = `Before.

\`\`\`check few
that: 1 + 1 > 3
because: it is 100 % so & more
\`\`\`

\`\`\`check
that: 1 < 2
\`\`\`

After.
`;

describe("a check that fails is marked where it stands, one that holds prints nothing", () => {
  test("on the galley", () => {
    const words = renderGalley({ ...computed(PAPER), shown: NOTHING_SHOWN })
      .replace(/<[^>]+>/g, "")
      .replace(/\s+/g, " ");
    expect(words).toMatch(
      /Before\..*‡ Check few: 2 &gt; 3 does not hold\. It should hold because: it is 100 %.*After\./,
    );
    expect(words.match(/‡/g)).toHaveLength(1);
    expect(words).not.toContain("1 &lt; 2");
  });

  test("in LaTeX, its words made safe", () => {
    const { paper, plan, results } = computed(PAPER);
    const latex = paperToLatex(paper, plan, results, NOTHING_SHOWN, { bibliography: "" });
    const main = latex.files[0]?.text ?? "";
    expect(latex.problems).toEqual([]);
    const [before = "", after = ""] = main.split("$\\ddagger$~");
    expect(after).toMatch(
      /^\\emph\{Check few: 2 .{0,20}3 does not hold\. It should hold because: it is 100 \\% so \\& more\}/,
    );
    expect(before).toContain("Before.");
    expect(after).toContain("After.");
    expect(main.match(/ddagger/g)).toHaveLength(1);
  });
});
