import { describe, expect, test } from "vitest";
import type { BibliographyEntry } from "../../app/paper/index.ts";
import { bibliographyItem, citationText, readPaper } from "../../app/paper/index.ts";

function read(bibtex: string, text = "") {
  const paper = readPaper(text, bibtex);
  return { entries: paper.bibliography, problems: paper.problems };
}

function printed(entry: BibliographyEntry | undefined): string {
  if (entry === undefined) throw new Error("no entry");
  return bibliographyItem(entry)
    .map((run) => (run.emphasis ? `*${run.text}*` : run.math ? `$${run.text}$` : run.text))
    .join("")
    .replaceAll("\u00A0", " ");
}

describe("BibTeX", () => {
  test("abbreviations, months, joined pieces, braces and quotation marks", () => {
    const { entries, problems } = read(`Words between entries are left out.
@comment{ @article{no, title = {x}} }
@string(jap = "Journal of " # {Applied Probability})
@preamble{"\\newcommand{\\x}{y}"}
@Article{ a2000 ,
  Author = "Ann {\\"O}ne and Bob Two",
  title = {The {K}PP "front", {\\'e}t al},
  journal = jap, month = sep # "~3", year = 2000, pages = {1--9},
}
@book(b, title={B}, author={C}, year=1999)
`);
    expect(problems).toEqual([]);
    expect(entries.map((entry) => [entry.key, entry.type])).toEqual([
      ["a2000", "article"],
      ["b", "book"],
    ]);
    expect(entries[0]?.fields).toEqual({
      author: 'Ann {\\"O}ne and Bob Two',
      title: 'The {K}PP "front", {\\\'e}t al',
      journal: "Journal of Applied Probability",
      month: "September~3",
      year: "2000",
      pages: "1--9",
    });
    expect(entries[0]?.span.line).toBe(5);
  });

  test("faults are placed, and reading goes on", () => {
    const bibtex = `@article{a, title = {open, year = 2000
}
@article{b, author = {B}, title = {B} year = 2000}
@article{, title = {C}}
@artcle{d, author = {D}, title = {D}, year = 2000}
@misc{e, author = E, title = {E}, year = 2000}
@misc{d, author = {D}, title = {D}, year = 2000}
@misc{f, title = {F}, title = {G}}
`;
    const { entries, problems } = read(bibtex);
    expect(entries.map((entry) => entry.key)).toEqual(["d", "e", "f"]);
    expect(problems.every((problem) => problem.where === "bibliography")).toBe(true);
    expect(problems.map(({ line, message }) => [line, message])).toEqual([
      [1, "The entry “a” is not closed before the next: a brace is missing."],
      [3, expect.stringContaining("comes a comma")],
      [4, expect.stringContaining("begins with its key")],
      [5, expect.stringContaining("Did you mean “article”?")],
      [6, expect.stringContaining("“E” is no abbreviation")],
      [7, expect.stringContaining("was given in line 5 already")],
      [8, expect.stringContaining("given twice")],
      [8, "The entry “f” has no author, no year."],
    ]);
  });

  test("cited entries are numbered by name, year and title, without regard to accents", () => {
    const bibtex = ["Zoé", "{\\'E}mile", "van der Berg", "Aaron"]
      .map((name, index) => `@misc{k${index}, author={X. ${name}}, title={T}, year={20${index}0}}`)
      .join("\n");
    const { entries } = read(bibtex, ":cite[k0, k1, k2]");
    expect(entries.map((entry) => entry.number)).toEqual([3, 1, 2, null]);
  });
});

describe("entries as printed", () => {
  const { entries } = read(
    `@article{kesten, author={Kesten, Harry}, title={Branching {B}rownian motion with $N_t$ absorbed}, journal={Stochastic Processes and their Applications},
  volume=7, number=1, pages={9--47}, year=1978, doi={https://doi.org/10.1016/0304-4149(78)90035-2}}
@inproceedings{b, author={de la Vall{\\'e}e, Jean-Paul and {The Group} and Knuth, Jr, D. E.}, title={What?}, booktitle={Proc.\\ Conf.}, editor={Ed, A.}, year={1999}, pages={3-4}, publisher={P}}
@phdthesis{c, author={{\\L}ukasz {\\O}. N\\"ame}, title={T}, school={Univ.}, year=2001, eprint={2001.00001}, archiveprefix={arXiv}}
@book{d, editor={A B and C D}, title={Book}, publisher={Pub}, address={Basel}, edition={2nd}, year=1990}`,
    ":cite[kesten, b, c, d]",
  );
  const byKey = (key: string) => entries.find((entry) => entry.key === key);

  test("article, chapter, thesis, book", () => {
    expect(printed(byKey("kesten"))).toBe(
      "H. Kesten. Branching Brownian motion with $N_t$ absorbed. *Stochastic Processes and their Applications* 7(1), 9–47 (1978). doi:10.1016/0304-4149(78)90035-2",
    );
    expect(printed(byKey("b"))).toBe(
      "J.-P. de la Vallée, The Group and D. E. Knuth, Jr. What? In: *Proc. Conf.* (ed. A. Ed), 3–4, P (1999).",
    );
    expect(printed(byKey("c"))).toBe("Ł. Ø. Näme. *T*. PhD thesis, Univ., 2001. arXiv:2001.00001");
    expect(printed(byKey("d"))).toBe("A. B and C. D (eds). *Book*. 2nd ed., Pub, Basel, 1990.");
  });

  test("addresses are web addresses only", () => {
    const { entries: hostile } = read("@misc{x, author={A}, title={T}, year=2000, url={javascript:alert(1)}}");
    expect(printed(hostile[0])).toBe("A. *T*. 2000.");
  });

  test("citations in the text", () => {
    const [kesten, b] = [byKey("kesten"), byKey("b")].map((entry) => (entry === undefined ? [] : [entry]));
    expect(citationText(kesten ?? [], { at: "Theorem 1.2" })).toBe("[3, Theorem 1.2]");
    expect(citationText([...(kesten ?? []), ...(b ?? [])])).toBe("[2, 3]");
    expect(citationText(kesten ?? [], { as: "text", at: "p. 9" })).toBe("Kesten (1978, p. 9)");
    expect(citationText(b ?? [], { as: "text" })).toBe("de la Vallée et al. (1999)");
    expect(citationText([])).toBe("[?]");
  });
});
