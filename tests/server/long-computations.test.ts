import { spawn } from "node:child_process";
import { once } from "node:events";
import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { type CellResult, computePlan, planPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { bundled } from "../support/bundled.ts";
import { type Computing, Desk, startComputing } from "../support/computing.ts";
import { until } from "../support/live.ts";

let computing: Computing;
let desk: Desk;
let seed = 0;

beforeAll(async () => {
  computing = await startComputing({ threads: 2 });
});

afterAll(() => computing.close());

beforeEach(async () => {
  desk = await Desk.invent(computing);
  seed += 1;
});

const PARTS = 4;
const TEST_MS = 300_000;

/** A simulation of four parts, each some tenths of a second of one core: K is small toward the barrier. Another seed in each test, so that none finds the results of another. */
function paper(): string {
  return [
    "```process shore\ndrift: -2\nrate: 1\n```\n",
    "```simulate S",
    "of: shore",
    "start: 1",
    "replicates: 7500000",
    `seed: ${seed}`,
    "```\n",
    "```formula after\nvalue: S.mean\n```\n",
  ].join("\n");
}

const keyOf = (text: string): string => planPaper(readPaper(text, "")).byId.get("S")?.key ?? "";

async function partsOf(text: string): Promise<number[]> {
  const rows: { index: number }[] = await computing
    .knex("result_parts")
    .where({ key: keyOf(text) })
    .select("index");
  return rows.map(({ index }) => index).sort((a, b) => a - b);
}

/** The result of S as this thread computes it, without server, pool or parts. */
function alone(text: string): CellResult {
  const outcome = computePlan(planPaper(readPaper(text, ""))).get("S");
  if (outcome?.status !== "computed") throw new Error(`S was not computed: ${JSON.stringify(outcome)}`);
  return outcome.result;
}

async function kept(text: string, at: Desk = desk): Promise<CellResult | undefined> {
  return (await at.computing.service.results(at.paperId, [keyOf(text)]))[keyOf(text)];
}

const timeless = (result: CellResult | undefined) => result && { ...result, seconds: 0 };

test("parts on two threads give what one thread gives, with progress by parts; none is left behind", {
  timeout: TEST_MS,
}, async () => {
  const text = paper();
  const seen = new Set<string>();
  await desk.ask(text);
  const watch = setInterval(async () => {
    const work = await desk.work("S");
    if (work?.state === "computing" && work.total > 0) seen.add(`${work.done} of ${work.total}`);
  }, 50);
  await desk.settled();
  clearInterval(watch);
  expect(timeless(await kept(text))).toEqual(timeless(JSON.parse(JSON.stringify(alone(text)))));
  expect([...seen].some((words) => words.endsWith(` of ${PARTS}`))).toBe(true);
  expect(await partsOf(text)).toEqual([]);
  expect(await desk.shown("after")).toBeDefined();
  // The solver's seconds are those of all parts, and each was counted to the person.
  const [record] = await desk.records();
  expect(record?.seconds).toBeGreaterThanOrEqual((await kept(text))?.seconds ?? Number.POSITIVE_INFINITY);
});

test("cancelled, it keeps its parts and goes on where it was", { timeout: TEST_MS }, async () => {
  const text = paper();
  await desk.ask(text);
  await until(async () => (await partsOf(text)).length > 0, "the first part", TEST_MS);
  const before = performance.now();
  await desk.cancel(["S"], desk.coauthor);
  expect(performance.now() - before).toBeLessThan(5_000);
  expect(await desk.work("S")).toMatchObject({ state: "cancelled", by: "Tormod" });
  expect(await desk.work("after")).toMatchObject({ state: "cancelled" });
  await desk.settled();
  const there = await partsOf(text);
  expect(there.length).toBeLessThan(PARTS);

  // A part that is there is not computed again: this one says so by what it holds.
  const [row] = await computing.knex("result_parts").where({ key: keyOf(text), index: there[0] });
  const marked = { ...row.part, steps: row.part.steps + 1 };
  await computing
    .knex("result_parts")
    .where({ key: keyOf(text), index: there[0] })
    .update({ seconds: 1000, part: JSON.stringify(marked) });
  await desk.computed(text);
  const result = await kept(text);
  expect(result?.seconds).toBeGreaterThan(1000);
  expect(timeless(result)).toEqual(timeless(JSON.parse(JSON.stringify(alone(text)))));
  expect(await partsOf(text)).toEqual([]);
});

test("left by a process that ends in order, it is taken up by the next", { timeout: TEST_MS }, async () => {
  const text = paper();
  const first = await startComputing({}, computing.databaseUrl);
  await new Desk(first, desk).ask(text);
  await until(async () => (await partsOf(text)).length > 0, "the first part", TEST_MS);
  await first.close();
  expect((await desk.work("S"))?.state).toMatch(/waiting|computing/);
  // The page that looks at the paper needs no answer: the next process finds it by itself.
  const second = await startComputing({}, computing.databaseUrl);
  try {
    await until(async () => (await desk.shown("after")) !== undefined, "the computation to be taken up", TEST_MS);
    expect(await desk.shown("S")).toMatchObject({ by: "Inês" });
    expect(timeless(await kept(text))).toEqual(timeless(JSON.parse(JSON.stringify(alone(text)))));
    await until(async () => (await desk.records()).every((record) => record.ended_at !== null), "the record's end");
  } finally {
    await second.close();
  }
});

test("left by a process that was killed, it is taken up when the paper is opened", { timeout: TEST_MS }, async () => {
  const text = paper();
  const { person, paperId } = desk;
  const child = spawn(
    process.execPath,
    [
      bundled("computing-process.ts"),
      computing.databaseUrl,
      bundled("unruly-worker.ts"),
      paperId,
      person.id,
      "Inês",
      text,
    ],
    { stdio: ["ignore", "pipe", "inherit"] },
  );
  await once(child.stdout, "data");
  await until(async () => (await partsOf(text)).length > 0, "the first part", TEST_MS);
  child.kill("SIGKILL");
  await once(child, "exit");
  // Cancelled by somebody while nobody was at it, it is no more; asked for again, it goes on with the parts that are there.
  await desk.cancel(["after"], desk.coauthor);
  expect(await desk.work("after")).toMatchObject({ state: "cancelled", by: "Tormod" });
  await until(async () => (await desk.shown("S")) !== undefined, "the computation to be taken up", TEST_MS);
  expect(await desk.shown("S")).toMatchObject({ by: "Inês" });
  expect(await desk.shown("after")).toBeUndefined();
  expect(timeless(await kept(text))).toEqual(timeless(JSON.parse(JSON.stringify(alone(text)))));
});

test("one that ends its process each time is given up in the end, with words", { timeout: TEST_MS }, async () => {
  const text = paper();
  const first = await startComputing({}, computing.databaseUrl);
  await new Desk(first, desk).ask(text);
  await until(async () => (await desk.work("S"))?.state === "computing", "the simulation to begin", TEST_MS);
  await first.close();
  await computing.knex("computations").where({ paper_id: desk.paperId }).update({ begun_times: 4 });
  const second = await startComputing({}, computing.databaseUrl);
  try {
    await until(async () => (await desk.work("S"))?.state === "failed", "it to be given up", TEST_MS);
    expect(await desk.work("S")).toMatchObject({ message: expect.stringMatching(/begun 4 times.*Recompute/) });
  } finally {
    await second.close();
  }
});

test("parts that nobody goes on with are swept after a month", async () => {
  const { knex } = computing;
  const database = computing.database;
  await database.parts.keep("old", { index: 0, part: { n: [] }, seconds: 1 });
  await database.parts.keep("new", { index: 1, part: { n: [1] }, seconds: 2 });
  await knex("result_parts")
    .where({ key: "old" })
    .update({ created_at: knex.raw("now() - interval '31 days'") });
  await database.parts.sweep();
  expect(await database.parts.find("old")).toEqual([]);
  expect(await database.parts.find("new")).toEqual([{ index: 1, part: { n: [1] }, seconds: 2 }]);
});
