import { execFile } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Report, ReportedCell, ReportedValue } from "../../app/cells/index.ts";

const run = promisify(execFile);
const root = join(import.meta.dirname, "../..");

const PAPER = `---
title: A small paper
---

\`\`\`parameters
beta: 1
mu: {value: 2, min: 1.45, max: 4}
\`\`\`

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`counts K
of: larvae
start: 1
up_to: 100
\`\`\`

\`\`\`tail T
of: larvae
start: 1
\`\`\`

\`\`\`table t
rows: {n: [1, 1000]}
columns: {p: K(n), law: T(n)}
\`\`\`

In the mean :value[K.mean]{digits=4} arrive; $s_0=\\value{T.s0}$ and the law is :value[K(1000)]{digits=3}.
It is :value[larvae.regime].
`;

interface Answer {
  readonly status: number;
  readonly out: string;
  readonly err: string;
}

const SCRIPT = ["node", "--import", "tsx", "scripts/compute.ts"];

async function compute(...args: string[]): Promise<Answer> {
  return answerOf([...SCRIPT, ...args]);
}

async function answerOf(command: readonly string[]): Promise<Answer> {
  const [program = "", ...args] = command;
  try {
    const { stdout, stderr } = await run(program, args, { cwd: root });
    return { status: 0, out: stdout, err: stderr };
  } catch (error) {
    if (!(error instanceof Error && "code" in error && typeof error.code === "number")) throw error;
    const { stdout, stderr, code } = error as Error & { code: number; stdout: string; stderr: string };
    return { status: code, out: stdout, err: stderr };
  }
}

async function report(...args: string[]): Promise<{ status: number; report: Report }> {
  const { status, out } = await compute(...args, "--json");
  return { status, report: JSON.parse(out) as Report };
}

function valuesOf(cell: ReportedCell | undefined): Readonly<Record<string, ReportedValue>> {
  if (cell?.status !== "computed") throw new Error(`not computed: ${JSON.stringify(cell)}`);
  return cell.values;
}

function numberOf(value: ReportedValue | undefined): { readonly value: number; readonly error: number } {
  if (value === undefined || !("value" in value)) throw new Error(`not a number: ${JSON.stringify(value)}`);
  return value;
}

let folder = "";
const file = (name: string, text: string): string => {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
};

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "halfline-compute-"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe("npm run compute", { timeout: 120_000 }, () => {
  test("--json prints one object and nothing else, with values, errors, numbers and lines", async () => {
    const { status, out } = await answerOf(["npm", "run", "compute", "--", file("small.md", PAPER), "--json"]);
    const answer = JSON.parse(out) as Report;
    expect(status).toBe(0);
    expect(answer.problems).toEqual([]);
    expect(Object.entries(answer.cells).map(([name, { kind, line, status: s }]) => [name, kind, line, s])).toEqual([
      ["parameters@5", "parameters", 5, "computed"],
      ["larvae", "process", 10, "computed"],
      ["K", "counts", 15, "computed"],
      ["T", "tail", 21, "computed"],
      ["t", "table", 26, "computed"],
    ]);
    const larvae = valuesOf(answer.cells.larvae);
    const counts = valuesOf(answer.cells.K);
    const tail = valuesOf(answer.cells.T);
    // Closed forms: decay = mu + sqrt(mu² - 2), E K = exp(-decay), for D = 1/2, binary branching at rate 1, x = 1.
    const decay = 2 + Math.sqrt(2);
    expect(numberOf(larvae.decay).value).toBeCloseTo(decay, 14);
    expect(larvae.regime).toEqual({ text: "away" });
    expect(Math.abs(numberOf(counts.mean).value - Math.exp(-decay))).toBeLessThan(1e-15);
    // s0 and C computed by an independent method: high-precision series and phase plane, 30 digits, rounded here.
    expect(Math.abs(numberOf(tail.s0).value - 5.436877834061205)).toBeLessThan(2e-14);
    expect(Math.abs(numberOf(tail.constant).value - 0.18235318537970058)).toBeLessThan(2e-14);
    for (const value of Object.values(counts)) expect(numberOf(value).error).toBeLessThan(1e-14);
    const [mean, s0, far, regime] = answer.numbers;
    expect(mean).toMatchObject({ line: 31, formula: "K.mean", text: "0.03290" });
    expect(s0).toMatchObject({ line: 31, formula: "T.s0", text: "5.43688" });
    expect(far).toMatchObject({ formula: "K(1000)", value: 0, text: "2.58×10⁻⁷⁴¹" });
    expect(far).toHaveProperty("log10");
    expect(regime).toEqual({ line: 32, formula: "larvae.regime", text: "away" });
  });

  test("--set overrides parameters", async () => {
    const { report: answer } = await report(file("set.md", PAPER), "--set", "mu=3", "--set", "beta=1/2");
    // decay = mu + sqrt(mu² - 2 beta) for D = 1/2.
    expect(numberOf(valuesOf(answer.cells.larvae).decay).value).toBeCloseTo(3 + Math.sqrt(8), 13);
  });

  test("an unknown parameter is an error, and the rest is printed all the same", async () => {
    const { status, report: answer } = await report(file("unknown.md", PAPER), "--set", "nu=3");
    expect(status).toBe(1);
    expect(answer.problems).toHaveLength(1);
    expect(answer.problems[0]?.message).toContain("`nu` is not a parameter of this paper");
    expect(answer.cells.K?.status).toBe("computed");
  });

  test("a cell that fails, those that wait for it, and numbers without a value are told by line", async () => {
    const broken = PAPER.replace("start: 1\nup_to", "start: -1\nup_to").replace("counts K", "counts K");
    const { status, report: answer } = await report(file("broken.md", broken));
    expect(status).toBe(1);
    expect(answer.cells.K).toMatchObject({ status: "failed", line: 15 });
    expect(answer.cells.t).toEqual({ kind: "table", line: 26, status: "waiting", needs: ["K"] });
    expect(answer.cells.T?.status).toBe("computed");
    expect(answer.problems.map(({ line }) => line)).toEqual([17, 31, 31]);
    expect(answer.numbers[0]).toMatchObject({ formula: "K.mean", refused: expect.any(String) });
  });

  test("without --json a table is printed for reading", async () => {
    const { status, out } = await compute(file("table.md", PAPER));
    expect(status).toBe(0);
    expect(out).toMatch(/^ +15 +K +counts +computed/m);
    expect(out).toMatch(/^ +31 +T\.s0 +5\.43688 +5\.43687783/m);
    expect(out.trimEnd().split("\n").at(-1)).toBe("5 of 5 cells computed, 4 numbers in the prose, no problems.");
  });

  test("the bibliography is found beside the paper", async () => {
    file(
      "cited.bib",
      "@book{harris1963, author={Harris, T. E.}, title={Branching processes}, publisher={Springer}, year={1963}}",
    );
    const { report: answer } = await report(file("cited.md", "As :cite[harris1963] says, :cite[nobody2000].\n"));
    expect(answer.problems.map(({ message }) => message)).toEqual([expect.stringContaining("nobody2000")]);
  });

  test.each([
    [["nowhere.md"], "There is no file nowhere.md."],
    [[], "One paper is computed at a time."],
  ])("%j is refused in words", async (args, words) => {
    const { status, out, err } = await compute(...args);
    expect([status, out]).toEqual([1, ""]);
    expect(err).toContain(words);
  });
});
