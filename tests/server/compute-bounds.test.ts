import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from "vitest";
import { type Computing, Desk, startComputing } from "../support/computing.ts";
import { until } from "../support/live.ts";

let computing: Computing;
let desk: Desk;
let count = 0;

beforeAll(async () => {
  computing = await startComputing();
});

afterAll(() => computing.close());

beforeEach(async () => {
  desk = await Desk.invent(computing);
});

afterEach(() => desk.cancel("all"));

/** A cell of its own key, by the names of tests/support/unruly-worker.ts. */
function formula(name: string, reads = ""): string {
  count += 1;
  return `\`\`\`formula ${name}\nvalue: ${count}${reads && ` + ${reads}.value`}\n\`\`\`\n\n`;
}

test("a computation is cancelled at once, with what reads it, and the next one computes", async () => {
  await desk.ask(`${formula("Spin")}${formula("after", "Spin")}${formula("apart")}`);
  await desk.hasBegun("Spin");
  expect(await desk.work("after")).toMatchObject({ state: "waiting", needs: ["Spin"] });
  const before = performance.now();
  await desk.cancel(["Spin"], desk.coauthor);
  expect(performance.now() - before).toBeLessThan(2_000);
  expect(await desk.work("Spin")).toMatchObject({ state: "cancelled", by: "Tormod" });
  expect(await desk.work("after")).toMatchObject({ state: "cancelled", by: "Tormod" });
  await desk.settled();
  expect(await desk.shown("apart")).toBeDefined();
  expect(await desk.shown("Spin")).toBeUndefined();
});

test("a cell waiting for a thread is cancelled before it has one", async () => {
  await desk.ask(`${formula("Spin")}${formula("Queued")}`);
  await desk.hasBegun("Spin");
  await desk.cancel(["Queued"]);
  expect(await desk.work("Queued")).toMatchObject({ state: "cancelled" });
  await desk.cancel("all");
  expect(await desk.work("Spin")).toMatchObject({ state: "cancelled" });
});

test("what one paper cancels goes on for another that waits for it", async () => {
  const other = await Desk.invent(computing);
  const text = formula("Slow");
  await Promise.all([desk.ask(text), other.ask(text)]);
  await desk.hasBegun("Slow");
  await desk.cancel("all");
  await other.settled();
  expect(await desk.work("Slow")).toMatchObject({ state: "cancelled" });
  expect(await other.shown("Slow")).toBeDefined();
});

test("another process cancels what this one computes, and leaves alone what it was not asked for", async () => {
  const second = await startComputing({}, computing.databaseUrl);
  try {
    const there = new Desk(second, desk);
    await desk.ask(formula("Spin"));
    await desk.hasBegun("Spin");
    await there.cancel(["something else"]);
    expect((await there.work("Spin"))?.state).toMatch(/waiting|computing/);
    await there.cancel("all", desk.coauthor);
    await until(async () => (await there.work("Spin"))?.state === "cancelled", "the cell to be cancelled");
    expect(await there.work("Spin")).toMatchObject({ by: "Tormod" });
  } finally {
    await second.close();
  }
});

test("a cell that takes too long is stopped with the limit in words", async () => {
  const strict = await startComputing({ cellLimitMs: 1_000 });
  try {
    const there = await Desk.invent(strict);
    await there.computed(`${formula("Spin")}${formula("after", "Spin")}${formula("apart")}`);
    const message = "Stopped after 1 s, the limit for a cell.";
    expect(await there.work("Spin")).toMatchObject({ state: "failed", line: 1, message });
    expect(await there.work("after")).toMatchObject({ state: "waiting", needs: ["Spin"] });
    expect(await there.shown("apart")).toBeDefined();
  } finally {
    await strict.close();
  }
});

test.each([
  ["Heap", /256 MB of memory/],
  ["Exit", /worker ended before it was done/],
])("a worker that dies over a cell (%s) fails that cell alone", async (name, words) => {
  await desk.computed(`${formula(name)}${formula("apart")}`);
  expect(await desk.work(name)).toMatchObject({ state: "failed", message: expect.stringMatching(words) });
  expect(await desk.shown("apart")).toBeDefined();
});

test("solver seconds are counted to the person, and the refusal says when there is time again", async () => {
  const sparing = await startComputing({ secondsAnHour: 0.5 });
  try {
    const there = await Desk.invent(sparing);
    const twice = `${formula("Slow1")}${formula("Slow2")}`;
    expect((await there.computed(twice)).refused).toBeUndefined();

    const more = formula("third");
    const { refused } = await there.ask(more);
    expect(refused?.reason).toMatch(/0\.5 s .* used up.*again in (59|60) minutes/);
    expect(await there.work("third")).toBeUndefined();
    expect((await there.ask(twice)).refused, "what is kept costs nothing").toBeUndefined();
    expect((await there.computed(more, "all", { by: there.coauthor })).refused, "another person").toBeUndefined();

    await sparing.knex("computations").update({ begun_at: sparing.knex.raw("now() - interval '61 minutes'") });
    expect((await there.computed(formula("fourth"))).refused, "an hour later").toBeUndefined();

    // One request cannot outrun the quota: what is queued behind it is refused in its turn.
    const last = await Desk.invent(sparing);
    const three = ["Slow3", "Slow4", "Slow5"];
    await last.computed(three.map((name) => formula(name)).join(""));
    const afterwards = (await Promise.all(three.map((name) => last.work(name)))).filter((work) => work !== undefined);
    // Two use more than the half second up, in whatever order the three come to their turn.
    expect(afterwards).toMatchObject([{ state: "failed", message: expect.stringMatching(/used up/) }]);
  } finally {
    await sparing.close();
  }
});

test("work that a killed process left behind is cleared when the paper is opened again", async () => {
  const begun = "2026-01-01T00:00:00.000Z";
  await computing.server.texts.show(desk.paperId, ({ work }) => {
    work.set("gone", { state: "computing", key: "a".repeat(64), by: "Inês", begun, done: 1, total: 2 });
    work.set("kept", { state: "cancelled", key: "b".repeat(64), by: "Inês", at: begun });
  });
  const second = await startComputing({}, computing.databaseUrl);
  try {
    const there = new Desk(second, desk);
    await until(async () => (await there.work("gone")) === undefined, "the stale work to be cleared");
    expect(await there.work("kept")).toBeDefined();
  } finally {
    await second.close();
  }
});

test("a process that ends in order takes its work back", async () => {
  const second = await startComputing({}, computing.databaseUrl);
  const there = new Desk(second, desk);
  await there.ask(formula("Spin"));
  await there.hasBegun("Spin");
  expect(await desk.work("Spin")).toBeDefined();
  await second.close();
  await until(async () => (await desk.work("Spin")) === undefined, "the work to be taken back");
});
