import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { frameOf } from "../../../app/editor/strands/frame.ts";
import { type Interval, packLanes } from "../../../app/editor/strands/lanes.ts";

const intervals = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 4000 }), fc.integer({ min: 0, max: 1500 })), { maxLength: 40 })
  .map((drawn) => drawn.map(([from, length], id): Interval => ({ id: `${id}`, from, to: from + length })));
const lanesBefore = fc.dictionary(fc.integer({ min: 0, max: 50 }).map(String), fc.integer({ min: 0, max: 60 }));

describe("lanes of cords", () => {
  test("no two in one lane overlap or come closer than 16 px, whatever lanes they had before", () => {
    fc.assert(
      fc.property(intervals, lanesBefore, (drawn, before) => {
        const lanes = packLanes(drawn, new Map(Object.entries(before)));
        expect(lanes.size).toBe(drawn.length);
        for (const a of drawn) {
          for (const b of drawn) {
            if (a === b || lanes.get(a.id) !== lanes.get(b.id)) continue;
            expect(a.to + 16 <= b.from || b.to + 16 <= a.from).toBe(true);
          }
        }
      }),
    );
  });

  test("lanes are numbered without gaps", () => {
    fc.assert(
      fc.property(intervals, lanesBefore, (drawn, before) => {
        const used = new Set(packLanes(drawn, new Map(Object.entries(before))).values());
        expect([...used].sort((a, b) => a - b)).toEqual([...used].map((_, at) => at));
      }),
    );
  });

  test("packed again as they were, all stay where they were", () => {
    fc.assert(
      fc.property(intervals, (drawn) => {
        const lanes = packLanes(drawn);
        expect(packLanes(drawn, lanes)).toEqual(lanes);
      }),
    );
  });

  test("the longest lies outermost", () => {
    const lanes = packLanes([
      { id: "short", from: 100, to: 200 },
      { id: "long", from: 0, to: 900 },
      { id: "next", from: 400, to: 500 },
    ]);
    expect(Object.fromEntries(lanes)).toEqual({ long: 0, short: 1, next: 1 });
  });
});

describe("lanes of parameters", () => {
  test("the one declared last lies outermost, where the mock has them at 1440 px", () => {
    // Source: design c-paper.html: lanes at 303, 288, 273, 258 px with the text at 400 px.
    expect(frameOf(400, [0, 1, 2, 3]).strandLanes.map((x) => x + 400)).toEqual([303, 288, 273, 258]);
  });

  test("and at 1024 and 390 px", () => {
    // Source: design c-paper-1024.html, c-paper-390.html: 79, 66, 53, 40 with the text at 168; 11.5, 6 with it at 40.
    expect(frameOf(168, [0, 1, 2, 3]).strandLanes.map((x) => x + 168)).toEqual([79, 66, 53, 40]);
    expect(frameOf(40, [0, 1]).strandLanes.map((x) => x + 40)).toEqual([11.5, 6]);
  });

  test("lanes keep their order, stay in the margin and left of the cords, for any margin and any number", () => {
    fc.assert(
      fc.property(fc.integer({ min: 40, max: 700 }), fc.integer({ min: 1, max: 20 }), (margin, count) => {
        const frame = frameOf(
          margin,
          Array.from({ length: count }, (_, place) => place),
        );
        const lanes = frame.strandLanes;
        const own = lanes.filter((_, place) => !frame.bundled.includes(place));
        for (let k = 1; k < own.length; k += 1) expect(own[k] ?? 0).toBeLessThan(own[k - 1] ?? 0);
        expect(Math.min(...lanes)).toBeGreaterThanOrEqual(-margin);
        expect(Math.max(...lanes)).toBeLessThan(frame.cordLanes.outer);
        expect(frame.cordLanes.inner).toBeLessThan(frame.edge);
        expect(new Set(frame.bundled.map((place) => lanes[place])).size).toBeLessThanOrEqual(1);
      }),
    );
  });

  test("at 1024 px the fifth parameter makes a bundle of the last two", () => {
    expect(frameOf(168, [0, 1, 2, 3]).bundled).toEqual([]);
    expect(frameOf(168, [0, 1, 2, 3, 4]).bundled).toEqual([3, 4]);
  });
});
