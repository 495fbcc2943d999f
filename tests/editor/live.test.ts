import { afterEach, beforeEach, describe, expect, test, vi } from "vitest";
import type { CellResult, ShownCell } from "../../app/cells/index.ts";
import { Announcer } from "../../app/editor/live/announcer.ts";
import { requestsOf } from "../../app/editor/live/requests.ts";
import { ResultFetcher } from "../../app/editor/live/result-fetcher.ts";
import { createStore } from "../../app/editor/live/store.ts";
import type { CellFace, CellStateName } from "../../app/editor/model/types.ts";

beforeEach(() => vi.useFakeTimers());
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe("what is heard", () => {
  const face = (slot: string, state: CellStateName): CellFace => ({
    id: slot,
    slot,
    kind: "counts",
    name: slot,
    from: 0,
    to: 0,
    line: 1,
    title: `Figure ${slot}`,
    parts: [{ part: "figure", title: `Figure ${slot}` }],
    caption: [],
    state,
    words: [],
    provenance: [],
    finding: null,
    progress: null,
    failureLine: null,
    seconds: null,
    hasResult: true,
    sound: true,
    key: slot,
    strands: [],
    hangs: "",
    changed: [],
    needs: null,
    viewSign: "",
  });

  test("is at most one message in two seconds, and loses nothing", () => {
    const told: string[] = [];
    const announcer = new Announcer((message) => told.push(message));
    announcer.say("One.");
    vi.advanceTimersByTime(0);
    announcer.say("Two.");
    announcer.say("Three.");
    vi.advanceTimersByTime(1900);
    expect(told).toEqual(["One."]);
    vi.advanceTimersByTime(200);
    expect(told).toEqual(["One.", "Two. Three."]);
  });

  test("are the cells whose state has changed, together", () => {
    const told: string[] = [];
    const announcer = new Announcer((message) => told.push(message));
    announcer.hearCells([face("1", "current"), face("2", "current")]);
    vi.advanceTimersByTime(3000);
    expect(told).toEqual([]);
    announcer.hearCells([face("1", "outOfDate"), face("2", "outOfDate")]);
    vi.advanceTimersByTime(3000);
    announcer.hearCells([face("1", "outOfDate"), face("2", "current")]);
    vi.advanceTimersByTime(3000);
    expect(told).toEqual(["Figure 1 and Figure 2 out of date.", "Figure 2 current."]);
  });
});

describe("requests", () => {
  const answering = (status: number, body: unknown) => {
    const fetching = vi.fn(async (_address: string, _init?: RequestInit) => Response.json(body, { status }));
    vi.stubGlobal("fetch", fetching);
    return fetching;
  };

  test("compute sends the text that was planned and the cells asked", async () => {
    const fetching = answering(202, { accepted: ["K"] });
    expect(await requestsOf("p1").compute("text", "bib", ["K"])).toBeNull();
    const [address, init] = fetching.mock.calls[0] ?? [];
    expect(address).toBe("/papers/p1/compute");
    expect(JSON.parse(String(init?.body))).toEqual({ text: "text", bibliography: "bib", cells: ["K"] });
  });

  test.each([
    [202, { accepted: [], refused: { reason: "Quota." } }, "Quota."],
    [409, { refused: "Nothing is shown." }, "Nothing is shown."],
    [401, {}, "Your session has ended. Sign in again; your words are kept on this machine."],
    [404, {}, "This paper is not open to you any more."],
    [429, null, "Too much was asked at once. Wait a moment and ask again."],
    [500, "<html>", "The server could not take this. Ask again in a moment."],
  ])("%d is refused in words", async (status, body, words) => {
    answering(status, body);
    expect(await requestsOf("p1").letStand("K", "text")).toEqual({ refused: words });
  });

  test("without connection, recomputing waits", async () => {
    vi.stubGlobal("fetch", vi.fn().mockRejectedValue(new TypeError("Failed to fetch")));
    expect(await requestsOf("p1").cancel("all")).toEqual({
      refused: "No connection. Your words are kept on this machine; recomputing waits.",
    });
  });

  test("many keys are asked for in several addresses", async () => {
    const fetching = answering(200, {});
    await requestsOf("p1").results(Array.from({ length: 60 }, (_, k) => `k${k}`));
    expect(fetching.mock.calls.map(([address]) => address.split(",").length)).toEqual([25, 25, 10]);
  });
});

describe("results", () => {
  const result = (key: string): CellResult => ({
    key,
    kind: "counts",
    values: {},
    data: null,
    method: "",
    solver: "",
    seconds: 0,
  });

  test("are fetched once, and again only after a while", async () => {
    const results = vi.fn(async (keys: readonly string[]) => keys.filter((key) => key !== "gone").map(result));
    const got: string[] = [];
    const fetcher = new ResultFetcher({ results }, (found) => got.push(...found.map(({ key }) => key)));
    fetcher.want(["a", "gone"]);
    fetcher.want(["a", "gone"]);
    await vi.advanceTimersByTimeAsync(100);
    expect(results.mock.calls).toEqual([[["a", "gone"]]]);
    expect(got).toEqual(["a"]);
    fetcher.want(["gone"]);
    expect(results).toHaveBeenCalledTimes(1);
    await vi.advanceTimersByTimeAsync(5000);
    expect(results).toHaveBeenCalledTimes(2);
    fetcher.end();
  });

  test("that could not be fetched are fetched when the connection is there again", async () => {
    const results = vi
      .fn<(keys: readonly string[]) => Promise<CellResult[]>>()
      .mockRejectedValueOnce(new Error("away"))
      .mockResolvedValue([result("a")]);
    const got: string[] = [];
    const fetcher = new ResultFetcher({ results }, (found) => got.push(...found.map(({ key }) => key)));
    fetcher.want(["a"]);
    await vi.advanceTimersByTimeAsync(100);
    expect(got).toEqual([]);
    fetcher.tryAgain();
    await vi.advanceTimersByTimeAsync(100);
    expect(got).toEqual(["a"]);
    fetcher.end();
  });
});

describe("what a paper shows at first", () => {
  test("is handed over together while it is waited for, and passed on when it comes late", async () => {
    const got: string[] = [];
    let answer: (found: readonly CellResult[]) => void = () => {};
    const results = vi.fn(() => new Promise<readonly CellResult[]>((resolve) => (answer = resolve)));
    const fetcher = new ResultFetcher({ results }, (found) => got.push(...found.map(({ key }) => key)));
    const result = (key: string) => ({ key }) as CellResult;
    const shown = (...keys: string[]) => Object.fromEntries(keys.map((key) => [key, { key } as ShownCell]));
    const inTime = fetcher.first(shown("a", "b"));
    await vi.advanceTimersByTimeAsync(100);
    answer([result("a"), result("b")]);
    expect((await inTime).map(({ key }) => key)).toEqual(["a", "b"]);
    expect(got).toEqual([]);
    const late = fetcher.first(shown("c"));
    await vi.advanceTimersByTimeAsync(2000);
    expect(await late).toEqual([]);
    answer([result("c")]);
    await vi.advanceTimersByTimeAsync(0);
    expect(got).toEqual(["c"]);
    fetcher.end();
  });

  test("is nothing where nothing is shown, and nobody is asked", async () => {
    const results = vi.fn(async () => []);
    const fetcher = new ResultFetcher({ results }, () => {});
    const first = fetcher.first({});
    await vi.advanceTimersByTimeAsync(0);
    expect(await first).toEqual([]);
    expect(results).not.toHaveBeenCalled();
  });
});

test("a store tells of changes alone", () => {
  const store = createStore({ a: 1, b: 2 });
  const told = vi.fn();
  const end = store.watch(told);
  store.set({ a: 1 });
  expect(told).not.toHaveBeenCalled();
  store.set({ a: 3 });
  expect([store.get(), told.mock.calls.length]).toEqual([{ a: 3, b: 2 }, 1]);
  end();
  store.set({ a: 4 });
  expect(told).toHaveBeenCalledTimes(1);
});
