import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { computePlan, planPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";
import { type Computing, Desk, startComputing } from "../support/computing.ts";
import { inventPaper, inventPerson } from "../support/live.ts";

let computing: Computing;
let desk: Desk;
let paper: string;
let count = 0;

beforeAll(async () => {
  computing = await startComputing();
});

afterAll(() => computing.close());

beforeEach(async () => {
  desk = await Desk.invent(computing);
  count += 1;
  // Another drift in each test, so that none finds the results of another.
  paper = paperWith(`${2 + count / 100}`);
});

const cell = (kindAndName: string, ...lines: string[]) => `\n\`\`\`${kindAndName}\n${lines.join("\n")}\n\`\`\`\n`;

function paperWith(mu: string): string {
  return [
    "---\ntitle: Reaching the shore\n---\n",
    cell("parameters", "beta: 1", `mu: ${mu}`),
    cell("process larvae", "drift: mu", "rate: beta"),
    cell("counts K", "of: larvae", "start: 1", "up_to: 40"),
    cell("tail T", "of: larvae", "start: 1"),
    cell("formula sums", "both: K.mean + T.s0"),
  ].join("");
}

/** Results without the time they took. */
const timeless = (result: unknown) => ({ ...(result as { seconds: number }), seconds: 0 });

test("what the server computes equals what is computed directly, and every page is told", async () => {
  const { accepted } = await desk.computed(paper);
  // Computed by an independent path: the plan in this thread, without server, pool or database.
  const plan = planPaper(readPaper(paper, ""));
  const outcomes = computePlan(plan);
  expect(accepted).toEqual(expect.arrayContaining(["larvae", "K", "T", "sums"]));
  for (const planned of plan.cells.filter(({ id }) => accepted.includes(id))) {
    const key = planned.key ?? "";
    const { parameterValues } = planned;
    expect(await desk.shown(planned.slot), planned.id).toMatchObject({ key, by: "Inês", parameterValues });
    const kept = (await computing.service.results(desk.paperId, [key]))[key];
    const outcome = outcomes.get(planned.id);
    if (outcome?.status !== "computed") throw new Error(`${planned.id} was not computed directly.`);
    expect(timeless(kept)).toEqual(timeless(JSON.parse(JSON.stringify(outcome.result))));
    expect(Object.keys(kept?.values ?? {}), "order of values").toEqual(Object.keys(outcome.result.values));
    expect(await desk.work(planned.slot)).toBeUndefined();
  }
  expect(computing.problems).toEqual([]);
});

test("asked again, nothing is computed; with force it is; a kept result is shown at once under its key", async () => {
  await desk.computed(paper);
  const first = await desk.shown("K");
  expect((await desk.computed(paper)).accepted).toEqual([]);

  await desk.computed(paperWith("3.5"));
  expect((await desk.shown("K"))?.key).not.toBe(first?.key);

  const { accepted } = await desk.ask(paper, ["K"]);
  expect(accepted).toContain("K");
  expect((await desk.shown("K"))?.key, "shown before the answer").toBe(first?.key);

  expect(await desk.records()).toHaveLength(2);
  await desk.computed(paper, ["K"], { force: true });
  expect((await desk.records()).map(({ cells }) => cells)[2]).toEqual(["K"]);
});

test("a cell that is asked for brings along what it reads", async () => {
  const { accepted } = await desk.computed(paper, ["K"]);
  expect(accepted).toContain("larvae");
  expect(accepted).not.toContain("T");
  expect(await desk.shown("larvae")).toBeDefined();
});

test("a cell that fails is told with its line, what reads it waits, the rest computes", async () => {
  const text = [
    paper,
    cell("formula low", "value: K.mean - 2"),
    // Of mean 1 and with a drift toward the barrier: only its trajectory tells, and that is solved for L.
    cell("process slow", "drift: low.value", "rate: beta", "offspring: {0: 1/2, 2: 1/2}"),
    cell("counts L", "of: slow", "start: 1"),
    cell("formula after", "value: L.mean + 1"),
  ].join("");
  await desk.computed(text);
  const work = await desk.work("L");
  expect(work).toMatchObject({ state: "failed", by: "Inês" });
  if (work?.state !== "failed") return;
  expect(text.split("\n")[work.line - 1]).toMatch(/counts L|of: slow/);
  expect(work.message.length).toBeGreaterThan(20);
  expect(await desk.work("after")).toMatchObject({ state: "waiting", needs: ["L"] });
  expect(await desk.shown("K")).toBeDefined();
  // Nobody is at it, but it is no leftover of a killed process either.
  await desk.cancel("all");
  expect(await desk.work("after")).toMatchObject({ state: "waiting", needs: ["L"] });
});

test("two cells of equal key are both shown", async () => {
  await desk.computed(`${paper}${cell("formula one", "value: mu + 1")}${cell("formula other", "value: mu + 1")}`);
  expect((await desk.shown("one"))?.key).toBe((await desk.shown("other"))?.key);
  expect(await desk.shown("one")).toBeDefined();
});

test("two people who ask for the same key at once get one computation", async () => {
  const text = `${paper}${cell("formula Slow", "value: K.mean")}`;
  const other = new Desk(computing, {
    ...desk,
    person: desk.coauthor,
    paperId: await inventPaper(computing.knex, [[desk.coauthor, "owner"]]),
  });
  await Promise.all([desk.computed(text, ["Slow"]), other.computed(text, ["Slow"])]);
  const [here, there] = [await desk.shown("Slow"), await other.shown("Slow")];
  expect([here?.by, there?.by]).toEqual(["Inês", "Tormod"]);
  expect(there?.key).toBe(here?.key);
  const paid = [...(await desk.records()), ...(await other.records())].map(({ seconds }) => seconds >= 0.2);
  expect(paid.toSorted()).toEqual([false, true]);
});

test("two processes asked for the same key at once compute it once, and both show it", async () => {
  const second = await startComputing({}, computing.databaseUrl);
  try {
    const text = `${paper}${cell("formula Slow", "value: K.mean")}`;
    const there = new Desk(second, desk);
    await Promise.all([desk.computed(text, ["Slow"]), there.computed(text, ["Slow"], { by: desk.coauthor })]);
    const shown = await desk.shown("Slow");
    expect(shown).toBeDefined();
    expect(await there.shown("Slow")).toEqual(shown);
    expect((await desk.records()).filter(({ seconds }) => seconds >= 0.2)).toHaveLength(1);
  } finally {
    await second.close();
  }
});

test("results are given only through a paper that has shown them", async () => {
  await desk.computed(paper, ["K"]);
  const key = (await desk.shown("K"))?.key ?? "";
  const elsewhere = await inventPaper(computing.knex, [[await inventPerson(computing.knex, "Stranger"), "owner"]]);
  expect(Object.keys(await computing.service.results(desk.paperId, [key]))).toEqual([key]);
  expect(await computing.service.results(elsewhere, [key])).toEqual({});
});

test("an out-of-date result may stand; a current one or one never computed need not", async () => {
  const { paperId } = desk;
  const person = { ...desk.person, email: null };
  const stand = (text: string, id = "K") => computing.service.stand({ paperId, person, cell: id, text });
  expect((await stand(paper)).refused).toMatch(/never computed/);
  await desk.computed(paper);
  expect((await stand(paper)).refused).toMatch(/current/);
  expect((await stand(paper, "Q")).refused).toMatch(/no cell/);
  expect(await stand(paperWith("3.5"))).toEqual({});
  expect((await desk.shown("K"))?.stands?.by).toBe("Inês");

  await desk.computed(paperWith("3.5"), ["K"]);
  expect((await desk.shown("K"))?.stands).toBeUndefined();
});
