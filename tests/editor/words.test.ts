import { describe, expect, test } from "vitest";
import { type CellState, type CellWork, costWords, type ShownCell } from "../../app/cells/index.ts";
import { closingOf } from "../../app/editor/live/connection.ts";
import type { CellFace, Erratum, Run } from "../../app/editor/model/types.ts";
import { plainBlocks } from "../../app/editor/parts/sheet-preface.tsx";
import { errataWords, isUnderWay, keptWords } from "../../app/editor/parts/sheet-tail.tsx";
import { aboutSeconds } from "../../app/editor/parts/words.ts";
import { CLOSE } from "../../app/editor/protocol.ts";
import { moment, stateWords } from "../../app/editor/reading/cell-words.ts";

const NOW = new Date(2026, 2, 2, 14, 40);
const at = (hour: number, minute: number) => new Date(2026, 2, 2, hour, minute).toISOString();

function said(runs: readonly Run[]): string {
  return runs.map((run) => (run.run === "text" ? run.text : run.run === "math" ? run.tex : "?")).join("");
}

const SHOWN: ShownCell = {
  key: "k1",
  at: at(14, 2),
  by: "Inês",
  seconds: 0.4,
  solver: "halfline 1",
  parameterValues: { mu: "1.9" },
  workingKey: "w",
};

function words(state: Partial<CellState>, shown: ShownCell | undefined = SHOWN, work?: CellWork, cost = ""): string {
  const whole: CellState = { state: "current", causes: [], failure: null, waitsFor: [], hasResult: true, ...state };
  return said(
    stateWords({
      state: whole,
      shown,
      work,
      cost,
      titleOf: (id) => (id === "K" ? "Figure 1" : id),
      printed: (_name, value) => Number(value).toFixed(2),
      firstLine: 40,
      now: NOW,
    }),
  );
}

test("what varying costs is told before it is computed, and only then", () => {
  const cost = costWords({ noun: "point", points: 40, cells: 3 });
  expect(cost).toBe("It takes 120 computations: 3 cells at each of 40 points.");
  expect(words({ state: "empty" }, undefined, undefined, cost)).toBe(`Not computed yet. ${cost}`);
  expect(words({ state: "outOfDate", causes: [{ cause: "working" }] }, SHOWN, undefined, cost)).toBe(
    `Its working was changed. ${cost}`,
  );
  expect(words({ state: "current" }, SHOWN, undefined, cost)).toBe("");
  expect(costWords({ noun: "row", points: 1, cells: 1 })).toBe("It takes 1 computation: 1 cell at 1 row.");
});

/** The sentences are the design's: its table of states and its words in errors. */
describe("states in words", () => {
  test("a current cell is silent", () => {
    expect(words({})).toBe("");
  });
  test("out of date names the parameter, from, to, who and when", () => {
    const cause = {
      cause: "parameter",
      name: "mu",
      symbol: "\\mu",
      was: "1.9",
      now: "2",
      by: "Tormod",
      at: at(14, 30),
    } as const;
    expect(words({ state: "outOfDate", causes: [cause] })).toBe(
      "Set with \\mu = 1.90; \\mu is now 2.00 (Tormod, 14:30).",
    );
  });
  test("two parameters are one sentence", () => {
    const cause = (name: string, was: string, now: string) =>
      ({ cause: "parameter", name, symbol: name, was, now, by: null, at: null }) as const;
    expect(words({ state: "outOfDate", causes: [cause("a", "1", "2"), cause("b", "3", "4")] })).toBe(
      "Set with a = 1.00 and b = 3.00; a is now 2.00 and b is now 4.00.",
    );
  });
  test("other causes are sentences too", () => {
    const causes = [
      { cause: "working" },
      { cause: "solver", was: "2", now: "3" },
      { cause: "needs", id: "K" },
    ] as const;
    expect(words({ state: "outOfDate", causes })).toBe(
      "Its working was changed. The solver is newer (2 → 3). Figure 1, which it reads, was changed.",
    );
  });
  test("what stands says with what and by whom", () => {
    const cause = { cause: "parameter", name: "mu", symbol: "\\mu", was: "1.9", now: "2", by: null, at: null } as const;
    const shown = { ...SHOWN, stands: { by: "Inês", at: at(14, 20) } };
    expect(words({ state: "stands", causes: [cause] }, shown)).toBe("Stands with \\mu = 1.90, by Inês.");
  });
  test("work says how far, whose, since when", () => {
    const work = { state: "computing", key: "k2", by: "Inês", begun: at(14, 31), done: 4, total: 7 } as const;
    expect(words({ state: "computing" }, SHOWN, work)).toBe("4 of 7. Begun by Inês, 14:31");
  });
  test("waiting says for what", () => {
    expect(words({ state: "waiting", waitsFor: ["K"] })).toBe("Needs Figure 1 first.");
  });
  test("lines of a working count from its first", () => {
    expect(words({ state: "failed", failure: { line: 41, message: "the drift is 1.00, too slow." } })).toBe(
      "Line 2: the drift is 1.00, too slow.",
    );
  });
  test("cancelled says what is kept", () => {
    const work = { state: "cancelled", key: "k2", by: "Tormod", at: at(14, 33) } as const;
    expect(words({ state: "cancelled" }, SHOWN, work)).toBe(
      "Cancelled by Tormod, 14:33. The result from 14:02 is kept.",
    );
  });
  test("a moment of another day has its day", () => {
    expect(moment(new Date(2026, 1, 27, 9, 5).toISOString(), NOW)).toBe("27 Feb 09:05");
    expect(moment(new Date(2024, 1, 27, 9, 5).toISOString(), NOW)).toBe("27 Feb 2024 09:05");
    expect(moment("never", NOW)).toBe("never");
  });
});

describe("the tail line", () => {
  const live = { connection: { state: "live" }, ready: true } as const;
  test("says kept only of what is committed", () => {
    expect(keptWords({ ...live, kept: { all: true, at: new Date(2026, 2, 2, 14, 32) } }, true)).toBe(
      "All changes kept, 14:32",
    );
    expect(keptWords({ ...live, kept: { all: true, at: null } }, true)).toBe("All changes kept");
    expect(keptWords({ ...live, kept: { all: false, at: new Date() } }, true)).toBe("Keeping");
  });
  test("without connection says since when, and where the words are", () => {
    const away = {
      connection: { state: "away", since: new Date(2026, 2, 2, 14, 40) },
      ready: true,
      kept: { all: false, at: null },
    } as const;
    expect(keptWords(away, true)).toBe(
      "No connection since 14:40. Your words are kept on this machine; recomputing waits.",
    );
    expect(keptWords(away, false)).toBe("No connection since 14:40.");
  });
  test("tells what is out of date and what is to be mended", () => {
    const cell = (title: string, mark: "†" | "‡" = "†"): Erratum => ({ from: 0, line: 1, mark, what: "cell", title });
    const number = (line: number): Erratum => ({ from: 0, line, mark: "†", what: "number", title: "a number" });
    expect(errataWords([cell("Table 1"), number(41), number(41)])).toBe(
      "Table 1 and 2 numbers in line 41 are out of date",
    );
    expect(errataWords([cell("Figure 1")])).toBe("Figure 1 is out of date");
    expect(errataWords([cell("Figure 1"), cell("Table 1", "‡")])).toBe("Figure 1 is out of date; Table 1 to be mended");
    expect(errataWords(["1", "2", "3", "4"].map((n) => cell(`Figure ${n}`)))).toBe("4 cells are out of date");
  });
});

test("a cell that waits for a failed one is not under way", () => {
  const cell = (slot: string, state: CellFace["state"], needs: string | null = null) =>
    ({ slot, state, needs: needs === null ? null : { slot: needs, title: needs } }) as CellFace;
  const cells = [
    cell("a", "failed"),
    cell("b", "waiting", "a"),
    cell("c", "waiting", "b"),
    cell("d", "computing"),
    cell("e", "waiting", "d"),
    cell("f", "waiting"),
  ];
  expect(cells.filter((each) => isUnderWay(each, cells)).map(({ slot }) => slot)).toEqual(["d", "e", "f"]);
});

test("every refusal of a socket has words and a way out", () => {
  for (const code of [...Object.values(CLOSE), 4499]) {
    const { words, way } = closingOf(code);
    expect(words.length).toBeGreaterThan(20);
    expect(way.label).not.toBe("");
  }
  expect(closingOf(CLOSE.noAccess).forgets).toBe(true);
  expect(closingOf(CLOSE.signedOut).forgets).toBe(false);
});

test("waits that pass unnoticed are not announced", () => {
  expect(aboutSeconds(0.05)).toBe("");
  expect(aboutSeconds(null)).toBe("");
  expect(aboutSeconds(0.42)).toBe("about 0.4 s");
  expect(aboutSeconds(12.3)).toBe("about 12 s");
  expect(aboutSeconds(240)).toBe("about 4 min");
});

test("the plain setting has the words of the paper and no workings", () => {
  const text =
    "---\ntitle: T\n---\n\n## Model {#m}\n\nOne\nparagraph.\n\n```counts K\nof: P\n```\n\n:::theorem[X]\nSaid.\n:::\n\n<!-- hidden\n\nmore -->\nLast.";
  expect(plainBlocks(text).map(({ words: found, heading }) => [found, heading])).toEqual([
    ["Model", true],
    ["One\nparagraph.", false],
    ["Said.", false],
    ["Last.", false],
  ]);
});
