import { describe, expect, test } from "vitest";
import type { CellResult } from "../../app/cells/index.ts";
import { computeCell, computePlan } from "../../app/cells/index.ts";
import { cell, computed, HALF_DIE, LARVAE, plannedCell, planOf } from "./papers.ts";

const PAPER = `${LARVAE}${cell("profile w", "of: larvae")}${cell("counts K", "of: larvae", "start: 1")}${cell("formula f", "a: K.mean")}`;

describe("computing one cell", () => {
  const { plan, results } = computed(PAPER);
  const task = plannedCell(plan, "K").task;
  if (task === null) throw new Error("K is planned.");

  test("task and result are plain JSON, and the result carries the key", () => {
    const copied = JSON.parse(JSON.stringify(task)) as typeof task;
    const outcome = computeCell(
      copied,
      new Map([...results].map(([id, result]) => [id, JSON.parse(JSON.stringify(result)) as CellResult])),
    );
    if (outcome.status !== "computed") throw new Error(JSON.stringify(outcome));
    expect(outcome.result.key).toBe(plannedCell(plan, "K").key);
    expect(JSON.parse(JSON.stringify(outcome.result))).toEqual(outcome.result);
    expect({ ...outcome.result, seconds: 0 }).toEqual({ ...results.get("K"), seconds: 0 });
  });

  test("a result under another key does not serve: the cell waits", () => {
    const larvae = results.get("larvae");
    if (larvae === undefined) throw new Error("larvae was computed.");
    expect(computeCell(task, new Map([["larvae", { ...larvae, key: "older" }]]))).toEqual({
      status: "waiting",
      needs: ["larvae"],
    });
    expect(computeCell(task, new Map())).toEqual({ status: "waiting", needs: ["larvae"] });
  });

  test("progress is told", () => {
    const text = LARVAE + cell("profile w", "of: larvae", "s: [0, 1, 2]");
    const { plan, results } = computed(text);
    const told: string[] = [];
    const profile = plannedCell(plan, "w").task;
    if (profile !== null)
      computeCell(profile, results, { progress: (done, total) => told.push(`${done} of ${total}`) });
    expect(told).toEqual(["0 of 3", "1 of 3", "2 of 3"]);
  });
});

describe("computing a plan", () => {
  test("in dependency order, each outcome told once", () => {
    const told: string[] = [];
    computePlan(planOf(PAPER), { onOutcome: ({ id }, { status }) => told.push(`${id} ${status}`) });
    expect(told).toEqual(["parameters@1 computed", "larvae computed", "w computed", "K computed", "f computed"]);
  });

  test("only what is asked for, with what it needs", () => {
    expect([...computePlan(planOf(PAPER), { only: ["f"] }).keys()]).toEqual(["larvae", "K", "f"]);
  });

  test("known results are not computed again", () => {
    const { results, outcomes } = computed(PAPER);
    const byKey = new Map([...results.values()].map((result) => [result.key, result]));
    const again = computePlan(planOf(PAPER), { known: (key) => byKey.get(key) });
    expect([...again.keys()]).toEqual([...outcomes.keys()]);
    for (const [id, outcome] of again) {
      if (outcome.status !== "computed") throw new Error(`${id}: ${outcome.status}`);
      expect(outcome.result).toBe(results.get(id));
    }
  });

  test("what reads a failed cell waits for it, and names it", () => {
    // the process computes; its trajectory is refused, and K fails
    const { outcomes } = computed(PAPER.replace("rate: beta", HALF_DIE), { mu: "-2" });
    expect(outcomes.get("larvae")?.status).toBe("computed");
    expect(outcomes.get("K")?.status).toBe("failed");
    expect(outcomes.get("f")).toEqual({ status: "waiting", needs: ["K"] });
  });
});
