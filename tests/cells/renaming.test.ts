import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { nameAt, planPaper, type Renaming, renames } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

const TEXT = `---
title: How $\\value{mu}$ acts
abstract: At :value[mu] it is :value[K.mean], see :ref[K].
---

\`\`\`parameters setup
beta: 1
mu: {value: 1.6 + 0*beta, min: 1.45, max: 2*beta + 4, symbol: \\mu, note: mu is the drift}
\`\`\`

# Model of mu {#model}

From $\\mu = \\value[digits=3]{mu}$ and :value[sum(K(mu), mu_1, 0, 3) + setup.mu]{digits=2} mu follows, as in :ref[model].

:::theorem[On mu]{#shift}
It holds.
:::

$$ w = \\value{K(2)} \\label{kpp} $$

By :ref[shift], :ref[kpp], :ref[K] and :ref[t].

\`\`\`process larvae
drift: mu
rate: "beta"
\`\`\`

\`\`\`counts K
of: larvae
start: 1 + 0*mu
up_to: 6
caption: The law of $K$ at $\\mu = \\value{mu}$, :value[K.mean], :ref[shift].
\`\`\`

\`\`\`table t
rows: {mu: [1.5, mu_2]}
columns:
  mean: K.mean
  twice: {formula: '2*K(1)', head: 'twice $\\value{K(1)}$'}
\`\`\`

\`\`\`formula f
mu_3: t.mu(1) + t.mean(1)
K_mean: K.mean
\`\`\`

\`\`\`parameters
mu_2: 1.7
\`\`\`
`;

function renamed(text: string, from: string, to: string): { text: string; renaming: Renaming } {
  const renaming = renames(readPaper(text, ""), "", from, to);
  if ("problem" in renaming) throw new Error(renaming.problem);
  let made = text;
  for (const edit of [...renaming.edits].reverse()) made = made.slice(0, edit.from) + edit.insert + made.slice(edit.to);
  return { text: made, renaming };
}

const problemOf = (text: string, from: string, to: string) => {
  const renaming = renames(readPaper(text, ""), "", from, to);
  return "problem" in renaming ? renaming.problem : `${renaming.edits.length} edits`;
};

const faults = (text: string) => [...readPaper(text, "").problems, ...planPaper(readPaper(text, "")).problems];

describe("a new name follows every use", () => {
  test("the paper of this test is sound", () => {
    expect(faults(TEXT)).toEqual([]);
  });

  test("of a parameter: its declaration, formulas, numbers, captions, what varies it and its values there", () => {
    const { text, renaming } = renamed(TEXT, "mu", "nu");
    expect(renaming.what).toBe("parameter");
    expect(text).toContain("title: How $\\value{nu}$ acts");
    expect(text).toContain("abstract: At :value[nu] it is");
    expect(text).toContain(
      "\nnu: {value: 1.6 + 0*beta, min: 1.45, max: 2*beta + 4, symbol: \\mu, note: mu is the drift}",
    );
    expect(text).toContain("# Model of mu {#model}");
    expect(text).toContain(
      "From $\\mu = \\value[digits=3]{nu}$ and :value[sum(K(nu), mu_1, 0, 3) + setup.nu]{digits=2} mu follows",
    );
    expect(text).toContain("drift: nu\n");
    expect(text).toContain("start: 1 + 0*nu");
    expect(text).toContain("$\\mu = \\value{nu}$");
    expect(text).toContain("rows: {nu: [1.5, mu_2]}");
    expect(text).toContain("mu_3: t.nu(1) + t.mean(1)");
    expect(faults(text)).toEqual([]);
  });

  test("of a parameter that quotes, or the end of an interval, hold", () => {
    const { text } = renamed(TEXT, "beta", "b");
    expect(text).toContain('rate: "b"');
    expect(text).toContain("value: 1.6 + 0*b,");
    expect(text).toContain("max: 2*b + 4");
  });

  test("of a cell: its fence, references, numbers, keys that name it; not of values that are called alike", () => {
    const { text, renaming } = renamed(TEXT, "K", "law");
    expect(renaming.what).toBe("cell");
    expect(text).toContain("```counts law\n");
    expect(text).toContain(":value[law.mean], see :ref[law]");
    expect(text).toContain("\\value{law(2)}");
    expect(text).toContain("formula: '2*law(1)', head: 'twice $\\value{law(1)}$'");
    expect(text).toContain("The law of $K$ at");
    expect(text).toContain("K_mean: law.mean");
    expect(faults(text)).toEqual([]);
    const process = renamed(TEXT, "larvae", "brood").text;
    expect(process).toContain("```process brood\n");
    expect(process).toContain("of: brood\n");
  });

  test("of a label of a section, an environment, a display", () => {
    const section = renamed(TEXT, "model", "the-model").text;
    expect(section).toContain("# Model of mu {#the-model}");
    expect(section).toContain("as in :ref[the-model]");
    const theorem = renamed(TEXT, "shift", "thm:1").text;
    expect(theorem).toContain(":::theorem[On mu]{#thm:1}");
    expect(theorem.match(/:ref\[thm:1\]/g)).toHaveLength(2);
    const display = renamed(TEXT, "kpp", "wave").text;
    expect(display).toContain("\\label{wave}");
    expect(display).toContain(":ref[wave]");
  });

  test("nothing that is computed changes, and the name put back gives the text as it was", () => {
    // A parameters cell computes nothing: its key is of what it declares, names and all.
    const keys = (text: string) =>
      planPaper(readPaper(text, "")).cells.flatMap(({ kind, key }) => (kind === "parameters" ? [] : [key]));
    const letter = fc.constantFrom(..."abcdwxyzMQ");
    const name = fc
      .tuple(letter, fc.string({ unit: fc.constantFrom(..."abz19_"), maxLength: 6 }))
      .map((two) => two.join(""));
    fc.assert(
      fc.property(fc.constantFrom("beta", "mu_2", "K", "larvae", "f"), name, (from, to) => {
        const renaming = renames(readPaper(TEXT, ""), "", from, to);
        if ("problem" in renaming) return;
        const { text } = renamed(TEXT, from, to);
        expect(keys(text)).toEqual(keys(TEXT));
        expect(renamed(text, to, from).text).toBe(TEXT);
      }),
      { numRuns: 25 },
    );
  });
});

describe("what cannot be", () => {
  test("names that are taken, reserved, or no names", () => {
    expect(problemOf(TEXT, "mu", "K")).toBe("K is the name of a cell already; another name would do.");
    expect(problemOf(TEXT, "K", "beta")).toBe("beta is the name of a parameter already; another name would do.");
    expect(problemOf(TEXT, "mu", "pi")).toContain("meaning of its own");
    expect(problemOf(TEXT, "mu", "2mu")).toContain("starting with a letter");
    expect(problemOf(TEXT, "model", "a b")).toContain("A label is");
    expect(problemOf(TEXT, "larva", "x1")).toContain("Nothing in this paper is named larva");
    expect(problemOf(TEXT, "mu", "mu")).toContain("already");
  });

  test("a dummy, a column or a sum's variable of the new name would hide it", () => {
    expect(problemOf(TEXT, "mu", "mu_1")).toBe(
      "mu_1 means something else in places where mu is used; another name would do.",
    );
    expect(problemOf(TEXT, "K", "mean")).toMatch(/^With this name, line \d+: /);
    expect(problemOf(TEXT, "beta", "mu_3")).toMatch(/^With this name, line \d+: /);
  });
});

describe("the name at a place", () => {
  const at = (words: string, off = 0) => nameAt(readPaper(TEXT, ""), TEXT.indexOf(words) + off);

  test("where it is given or used", () => {
    expect(at("mu: {value", 1)).toBe("mu");
    expect(at("K.mean", 0)).toBe("K");
    expect(at("{#shift}", 3)).toBe("shift");
    expect(at(":ref[kpp]", 6)).toBe("kpp");
    expect(at("of: larvae", 6)).toBe("larvae");
  });

  test("not in words that only look like it", () => {
    expect(at("mu is the drift", 1)).toBeNull();
    expect(at("Model of mu", 10)).toBeNull();
    expect(at("K.mean", 4)).toBeNull();
  });
});
