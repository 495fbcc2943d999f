// @vitest-environment jsdom
import { act } from "react";
import { afterEach, beforeAll, beforeEach, expect, test, vi } from "vitest";
import { EmptyPaper } from "../../../app/editor/first/empty-paper.tsx";
import { layStart, STARTS } from "../../../app/routes/parts/lay-start.ts";
import { emptyPaper } from "../../../app/routes/parts/new-paper.ts";
import { startingPoint } from "../../../app/routes/parts/starts.ts";
import { likeABrowser } from "../dom.ts";
import { sheetAtHand } from "../keys/at-hand.ts";
import { mount } from "../mounted.tsx";

beforeAll(() => {
  likeABrowser();
  Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });
});

const AUTHOR = "Inês Valadão";
let at: ReturnType<typeof sheetAtHand>;
let page: Awaited<ReturnType<typeof mount>>;
beforeEach(async () => {
  await act(async () => {
    at = sheetAtHand(emptyPaper(AUTHOR));
  });
});
afterEach(async () => {
  await page.end();
  await act(async () => at.end());
  document.body.replaceChildren();
});

const load = async () => ({ all: STARTS, lay: layStart });
const show = async (loadStarts: Parameters<typeof EmptyPaper>[0]["loadStarts"] = load) => {
  page = await mount(<EmptyPaper sheet={at.sheet} author={AUTHOR} loadStarts={loadStarts} />);
};

test("the case is opened from it", async () => {
  await show();
  await page.press("Open the case");
  expect(at.sheet.strips.get().open).toBe("case");
});

test("Write here puts the caret on a blank line of its own at the end", async () => {
  await act(async () =>
    at.view.dispatch({ changes: { from: at.view.state.doc.length - 1, to: at.view.state.doc.length } }),
  );
  await show();
  await page.press("Write here");
  expect(at.view.state.doc.toString()).toMatch(/```\n\n$/);
  expect(at.asked.goTo).toHaveBeenCalledExactlyOnceWith(at.view.state.doc.length);
});

test("a start is laid into it as one edit, and says how to go on", async () => {
  await show();
  await page.press("a sweep");
  expect(at.view.state.doc.toString()).toBe(startingPoint("sweep").text(AUTHOR));
  expect(at.asked.tell).toHaveBeenCalledWith(expect.stringContaining("Begun from a sweep"));
  expect(at.asked.recomputeAll).not.toHaveBeenCalled();
  await act(async () => at.apply(at.readAgain()));
  expect(at.asked.recomputeAll).toHaveBeenCalledTimes(1);
  await act(async () => at.apply(at.readAgain()));
  expect(at.asked.recomputeAll).toHaveBeenCalledTimes(1);
});

test("what was written meanwhile is not taken away", async () => {
  await show();
  await act(async () =>
    at.view.dispatch({ changes: { from: at.view.state.doc.length, insert: "Words of another's." } }),
  );
  await page.press("a sweep");
  expect(at.view.state.doc.toString()).toContain("Words of another's.");
  expect(at.asked.tell).toHaveBeenCalledWith(expect.stringContaining("take it away"));
});

test("without the starts it is as good to write on", async () => {
  await show(vi.fn(() => Promise.reject(new Error("no connection"))));
  expect(page.names()).toEqual(["Write here", "Open the case"]);
});
