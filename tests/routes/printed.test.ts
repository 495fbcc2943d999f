import { describe, expect, it } from "vitest";
import { fileName, refusePrint } from "../../app/routes/parts/printed.server.ts";

const asked = (accept: string) => new Request("http://localhost/papers/p/paper.pdf", { headers: { Accept: accept } });
const problems = [
  { line: 35, message: "`T.s0` has no value: <b>nothing</b>" },
  { line: null, message: "TeX stopped." },
];

describe("a paper that cannot be printed", () => {
  it("is refused to a program as JSON, with the lines", async () => {
    const response = refusePrint(asked("*/*"), "p", problems);
    expect(response.status).toBe(422);
    expect(await response.json()).toEqual({ problems });
  });

  it("is refused to a person as a page that leads back, and nothing of the paper becomes markup", async () => {
    const response = refusePrint(asked("text/html,application/xhtml+xml"), "p", problems);
    expect(response.status).toBe(422);
    const page = await response.text();
    expect(page).toContain("<li>Line 35: `T.s0` has no value: &lt;b&gt;nothing&lt;/b&gt;</li><li>TeX stopped.</li>");
    expect(page).toContain('href="/papers/p/galley"');
  });
});

describe("the name of what is taken away", () => {
  it.each([
    ["How many reach the shore?", "how-many-reach-the-shore.pdf"],
    ["Über Σ", "uber.pdf"],
    ['"; filename=x', "filename-x.pdf"],
    ["Σ", "paper.pdf"],
    ["a".repeat(200), `${"a".repeat(60)}.pdf`],
  ])("%s: %s", (title, name) => {
    expect(fileName(title, "pdf")).toBe(name);
  });
});
