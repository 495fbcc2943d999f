import fc from "fast-check";
import { expect, test } from "vitest";
import { SheetPacker, unpackSheet } from "../../app/editor/model/packing.ts";
import type { SheetModel } from "../../app/editor/model/types.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { computed, SAMPLE, tellText } from "./sample.ts";

function begun() {
  const reader = new SheetReader();
  const { shown, results } = computed(SAMPLE);
  for (const message of [tellText(SAMPLE), shown, { tell: "results", results } as const]) reader.hear(message);
  return { reader, packer: new SheetPacker() };
}

test("after a keystroke the page is told what is new, and keeps the objects of what is not", () => {
  const { reader, packer } = begun();
  const first = unpackSheet(null, packer.pack(reader.sheet(), 0));
  reader.hear(tellText(SAMPLE.replace("The mean", "The plain mean"), 2), first.pieces.number);
  const packed = packer.pack(reader.sheet(), first.pieces.number);
  expect(packed.cells.some((face) => "state" in face)).toBe(false);
  expect(packed.parameters).toBeUndefined();
  expect(packed.front).toBeUndefined();
  const second = unpackSheet(first, packed);
  expect(second.parameters).toBe(first.parameters);
  expect(second.errata).toBe(first.errata);
  const last = second.cells.at(-1);
  expect(last?.caption).toBe(first.cells.at(-1)?.caption);
});

test("a page that has not got the last answer is told everything", () => {
  const { reader, packer } = begun();
  packer.pack(reader.sheet(), 0);
  const again = packer.pack(reader.sheet(), 0);
  expect(again.cells.every((face) => "state" in face)).toBe(true);
  expect(again.parameters).toBeDefined();
});

test("without a sheet before it, an answer that leaves parts out is refused", () => {
  const { reader, packer } = begun();
  const first = unpackSheet(null, packer.pack(reader.sheet(), 0));
  const packed = packer.pack(reader.sheet(), first.pieces.number);
  expect(() => unpackSheet(null, packed)).toThrow("did not tell its front");
});

test("packed and unpacked again, every answer is the sheet as it was drawn up", () => {
  const put = fc.constantFrom("", "x", "\n\n", "$z$", "```", ":value[mu]", "mu", "0.5", "title: B\n", "<!-- c -->");
  const change = fc.record({ at: fc.nat(10_000), gone: fc.nat(40), put, lost: fc.boolean() });
  fc.assert(
    fc.property(fc.array(change, { minLength: 1, maxLength: 6 }), (changes) => {
      const { reader, packer } = begun();
      let page: SheetModel = unpackSheet(null, packer.pack(reader.sheet(), 0));
      let text = SAMPLE;
      let version = 1;
      for (const { at, gone, put: insert, lost } of changes) {
        const from = at % (text.length + 1);
        text = text.slice(0, from) + insert + text.slice(from + gone);
        version += 1;
        const have = page.pieces.number;
        reader.hear(tellText(text, version), have);
        const whole = reader.sheet();
        const packed = structuredClone(packer.pack(whole, have));
        if (lost) continue;
        page = unpackSheet(page, packed);
        expect(page).toEqual(whole);
      }
    }),
    { numRuns: 25 },
  );
}, 60_000);
