import { describe, expect, test } from "vitest";
import type { CellWork, ShownCell, ShownPaper } from "../../app/cells/index.ts";
import { causeWords, cellState, durationWords, provenance } from "../../app/cells/index.ts";
import { cell, computed, LARVAE, plannedCell, planOf } from "./papers.ts";

const PAPER = LARVAE + cell("profile w", "of: larvae") + cell("counts K", "of: larvae", "start: 1");

/** What a paper shows after all of a text was computed by Inês. */
function shownAfter(text: string): ShownPaper {
  const { plan, results } = computed(text);
  const cells = new Map<string, ShownCell>();
  for (const planned of plan.cells) {
    const result = results.get(planned.id);
    if (result === undefined || planned.key === null) continue;
    const { parameterValues } = planned;
    const base = { key: planned.key, at: "2026-03-02T14:02:00Z", by: "Inês", seconds: 0.004, solver: result.solver };
    cells.set(planned.slot, { ...base, parameterValues, workingKey: planned.workingKey ?? "" });
  }
  const changes = new Map([["mu", { by: "Tormod", at: "2026-03-02T14:30:00Z", was: "1.90" }]]);
  return { cells, work: new Map(), changes };
}

function stateOf(text: string, id: string, shown: ShownPaper, work?: CellWork) {
  const plan = planOf(text);
  const planned = plannedCell(plan, id);
  return cellState(planned, shown.cells.get(planned.slot), work, plan, shown);
}

const OLD = PAPER.replace("value: 2,", "value: 1.90,");
const NEW = PAPER.replace("value: 2,", "value: 2.00,");
const SHOWN = shownAfter(OLD);
const KEY = plannedCell(planOf(NEW), "K").key ?? "";
const ASKED = { key: KEY, by: "Inês", begun: "2026-03-02T14:31:00Z" };
const WORDS = { symbol: () => "μ", time: (iso: string) => iso.slice(11, 16) };

describe("the state of a cell", () => {
  test("current: the result shown has its key", () => {
    expect(stateOf(OLD, "K", SHOWN)).toEqual({
      state: "current",
      causes: [],
      failure: null,
      waitsFor: [],
      hasResult: true,
    });
  });

  test("out of date: which parameter, from what, to what, by whom and when", () => {
    const state = stateOf(NEW, "K", SHOWN);
    expect(state.state).toBe("outOfDate");
    expect(state.causes.map((cause) => causeWords(cause, WORDS))).toEqual([
      "Set with μ = 1.90; μ is now 2.00 (Tormod, 14:30)",
    ]);
  });

  test("a value typed otherwise is no change", () => {
    expect(stateOf(PAPER.replace("value: 2,", "value: 1.9,"), "K", SHOWN).state).toBe("current");
  });

  test("out of date by its own working", () => {
    const state = stateOf(OLD.replace("start: 1", "start: 1\nup_to: 50"), "K", SHOWN);
    expect(state.causes).toEqual([{ cause: "working" }]);
    expect(state.causes.map((cause) => causeWords(cause, WORDS))).toEqual(["Its working was changed"]);
  });

  test("out of date by the working of what it reads", () => {
    const changed = OLD.replace("rate: beta", "rate: beta\ndiffusion: 0.6");
    expect(stateOf(changed, "larvae", SHOWN).causes).toEqual([{ cause: "working" }]);
    expect(stateOf(changed, "K", SHOWN).causes).toEqual([{ cause: "needs", id: "larvae" }]);
  });

  test("out of date by a newer solver", () => {
    const planned = plannedCell(planOf(OLD), "K");
    const shown = SHOWN.cells.get("K");
    if (shown === undefined) throw new Error("K was computed.");
    const older = { ...shown, key: "another", solver: "halfline 0" };
    const { causes } = cellState(planned, older, undefined, planOf(OLD), SHOWN);
    expect(causes.map((cause) => causeWords(cause, WORDS))).toEqual([
      expect.stringMatching(/^The solver is newer \(0 → \d+\)$/),
    ]);
  });

  test("stands: out of date on purpose", () => {
    const shown = SHOWN.cells.get("K");
    if (shown === undefined) throw new Error("K was computed.");
    const standing = { ...shown, stands: { by: "Inês", at: "2026-03-02T14:40:00Z" } };
    const cells = new Map([...SHOWN.cells, ["K", standing] as const]);
    expect(stateOf(NEW, "K", { ...SHOWN, cells }).state).toBe("stands");
    expect(stateOf(OLD, "K", { ...SHOWN, cells }).state).toBe("current");
  });

  test("empty: never computed", () => {
    expect(stateOf(NEW, "K", { cells: new Map(), work: new Map(), changes: new Map() })).toMatchObject({
      state: "empty",
      hasResult: false,
    });
  });

  test("computing and waiting, on the present key only", () => {
    const computing: CellWork = { state: "computing", ...ASKED, done: 1, total: 7 };
    expect(stateOf(NEW, "K", SHOWN, computing)).toMatchObject({ state: "computing", hasResult: true });
    const waiting: CellWork = { state: "waiting", ...ASKED, needs: ["larvae"] };
    expect(stateOf(NEW, "K", SHOWN, waiting)).toMatchObject({ state: "waiting", waitsFor: ["larvae"] });
    expect(stateOf(NEW, "K", SHOWN, { ...computing, key: "older" }).state).toBe("outOfDate");
  });

  test("failed and cancelled, until there is a result or another text", () => {
    const failed: CellWork = {
      state: "failed",
      key: KEY,
      by: "Inês",
      at: ASKED.begun,
      line: 9,
      message: "It did not converge.",
    };
    expect(stateOf(NEW, "K", SHOWN, failed)).toMatchObject({
      state: "failed",
      failure: { line: 9, message: "It did not converge." },
    });
    const cancelled: CellWork = { state: "cancelled", key: KEY, by: "Tormod", at: ASKED.begun };
    expect(stateOf(NEW, "K", SHOWN, cancelled)).toMatchObject({ state: "cancelled", hasResult: true });
    expect(stateOf(NEW, "K", shownAfter(NEW), failed).state).toBe("current");
    expect(stateOf(OLD, "K", SHOWN, failed).state).toBe("current");
  });

  test("failed by its body, and waiting for one that is", () => {
    const broken = NEW.replace("rate: beta", "rate: -1");
    expect(stateOf(broken, "larvae", SHOWN)).toMatchObject({ state: "failed", failure: { line: 8 } });
    expect(stateOf(broken, "K", SHOWN)).toMatchObject({ state: "waiting", waitsFor: ["larvae"], hasResult: true });
  });

  test("cells of parameters are never out of date", () => {
    expect(stateOf(NEW, "parameters@1", SHOWN).state).toBe("current");
    expect(stateOf(NEW, "parameters@1", { cells: new Map(), work: new Map(), changes: new Map() }).state).toBe(
      "current",
    );
  });
});

describe("provenance", () => {
  test("says method, D, solver and time, by whom and when", () => {
    const { plan, results } = computed(OLD);
    const result = results.get("K");
    if (result === undefined) throw new Error("K was computed.");
    const made = provenance(plannedCell(plan, "K"), { ...result, seconds: 0.0042 }, SHOWN.cells.get("K"));
    expect(made.words).toMatch(/nodes; D = 0\.5; halfline \d+; 4 ms$/);
    expect(made).toMatchObject({ by: "Inês", at: "2026-03-02T14:02:00Z" });
  });

  test("durations are printed to what matters", () => {
    expect([0.0001, 0.004, 0.0094, 0.04, 0.42, 3.04, 12.4].map(durationWords)).toEqual([
      "1 ms",
      "4 ms",
      "9 ms",
      "40 ms",
      "0.4 s",
      "3.0 s",
      "12 s",
    ]);
  });
});
