import { describe, expect, test } from "vitest";
import { KINDS, planPaper } from "../../../app/cells/index.ts";
import { lay } from "../../../app/editor/case/lay.ts";
import { bestOffer, offers } from "../../../app/editor/case/offers.ts";
import type { Offer } from "../../../app/editor/case/types.ts";
import { readPaper } from "../../../app/paper/index.ts";
import { SeededRandom } from "../../support/random.ts";
import { BIBLIOGRAPHY, EMPTY, knowledgeOf, problemsOf, SPECIMEN } from "./papers.ts";

const specimen = knowledgeOf(SPECIMEN);

function set(text: string, offer: Offer, caret: number): string {
  const { changes } = lay(text, caret, offer.setting);
  return [...changes]
    .reverse()
    .reduce((now, { from, to, insert }) => now.slice(0, from) + insert + now.slice(to), text);
}

function all(query: string, text: string, knowledge = knowledgeOf(text)): Offer[] {
  return offers(query, knowledge).flatMap(({ offers: list }) => list);
}

const best = (query: string) => bestOffer(query, offers(query, specimen));

describe("What is set checks without an error", () => {
  const PAPERS: Readonly<Record<string, string>> = {
    "the specimen paper": SPECIMEN,
    "an empty paper": EMPTY,
    "a text without anything": "",
    "a process alone": "```process larvae\ndrift: 2\nrate: 1\n```\n",
    "parameters with no scale": "```parameters\nmu: 2\nn: 3\nx: 1\n```\n\n```process p\ndrift: mu\nrate: 1\n```\n",
    "a law alone": "```process p\ndrift: 2\nrate: 1\n```\n\n```counts n\nof: p\nstart: 1\n```\n",
  };

  for (const [name, text] of Object.entries(PAPERS)) {
    const knowledge = text === SPECIMEN ? specimen : knowledgeOf(text);
    test(`every kind, in ${name}`, () => {
      expect(problemsOf(text)).toEqual([]);
      const list = all("", text, knowledge).filter(({ compartment }) => compartment === "cells");
      expect(list.map(({ id }) => id)).toEqual([...KINDS.keys()].map((kind) => `cell ${kind}`));
      for (const offer of list) {
        const after = set(text, offer, text.length);
        expect(problemsOf(after), offer.id).toEqual([]);
        const before = planPaper(readPaper(text, BIBLIOGRAPHY)).cells.length;
        const cells = planPaper(readPaper(after, BIBLIOGRAPHY)).cells;
        expect(cells.length, offer.id).toBeGreaterThan(before);
        expect(
          cells.every(({ key }) => key !== null),
          offer.id,
        ).toBe(true);
      }
    });

    test(`everything else, in ${name}`, () => {
      for (const offer of all("", text, knowledge).filter(({ compartment }) => compartment !== "cells"))
        expect(problemsOf(set(text, offer, text.length)), offer.id).toEqual([]);
    });
  }

  test("wherever the caret stands in the specimen paper, and nothing that stands there is lost", () => {
    const random = new SeededRandom(Number(process.env.FC_START ?? 20261201));
    const list = all("", SPECIMEN, specimen);
    for (let count = 0; count < 150; count += 1) {
      const offer = random.pick(list);
      const caret = random.below(SPECIMEN.length + 1);
      const where = `${offer.id} at ${caret}: ${JSON.stringify(SPECIMEN.slice(Math.max(0, caret - 30), caret))}`;
      const laid = lay(SPECIMEN, caret, offer.setting);
      for (const { from, to } of laid.changes) expect(SPECIMEN.slice(from, to).trim(), where).toBe("");
      const after = set(SPECIMEN, offer, caret);
      expect(after.slice(laid.select.from, laid.select.to)).not.toContain("\n");
      if (offer.setting.set === "block" || offer.setting.set === "footnote")
        expect(problemsOf(after), where).toEqual([]);
    }
  });
});

describe("What is asked for", () => {
  const ASKED: readonly (readonly [string, string])[] = [
    ["tail of larvae", "cell tail"],
    ["Tail", "cell tail"],
    ["how s0 moves with mu", "cell sweep"],
    ["simulate larvae", "cell simulate"],
    ["theorem", "surroundings theorem"],
    ["numbered equation", "surroundings equation"],
    ["footnote", "surroundings footnote"],
    ["cite harris", "citation harris1963"],
    ["bramson", "citation bramson1983"],
    ["K.mean", "number K.mean"],
    ["T.ratio", "number T.ratio"],
    ["mu", "parameter mu"],
    ["Figure 1", "reference K"],
    ["phase plane", "cell portrait"],
    ["1 - K.zero", "none"],
  ];
  for (const [query, id] of ASKED) test(query, () => expect(best(query)?.id ?? "none").toBe(id));

  test("s0 is a number, and all the cells have theirs", () => {
    const [numbers] = offers("s0", specimen).filter(({ name }) => name === "numbers");
    expect(numbers?.offers.map(({ title }) => title)).toEqual(expect.arrayContaining(["w.s0", "K.s0", "T.s0"]));
    expect(best("s0")?.compartment).toBe("numbers");
    // The turning value at μ = 1.6, β = 1, as the specimen's own test has it to more digits.
    expect(numbers?.offers.find(({ title }) => title === "T.s0")?.value?.known).toMatch(/^\d\.\d{5}$/);
  });

  test("names of the paper go into what is set", () => {
    const text = (query: string) => {
      const offer = best(query);
      return offer?.setting.set === "block" ? offer.setting.text : "";
    };
    expect(text("tail of threshold from 2")).toContain("of: threshold\nstart: 2\n");
    expect(text("tail of larvae")).toContain("of: larvae\nstart: x_0\n");
    expect(text("tail of larvae")).toMatch(/^```tail T2\n/);
    expect(text("how s0 moves with beta")).toMatch(/over: \{beta: 0\.5 to 1\}\nrecord:\n {2}s0: \w+\.s0\n/);
  });

  test("a formula is offered when it has a value", () => {
    const value = { formula: "1 - K.zero", known: "0.1", unknown: "", rest: "", reason: "" };
    const knowledge = { ...specimen, values: new Map([...specimen.values, [value.formula, value]]) };
    const offer = bestOffer(value.formula, offers(value.formula, knowledge));
    expect(offer).toMatchObject({ id: "number 1 - K.zero", value, setting: { set: "number", formula: "1 - K.zero" } });
  });

  test("nothing asked, nothing is best; what nobody knows is not there", () => {
    expect(best("")).toBeNull();
    expect(best("zygote")).toBeNull();
    const compartments = offers("zygote", specimen);
    expect(compartments.map(({ name }) => name)).toEqual([
      "cells",
      "surroundings",
      "numbers",
      "parameters",
      "references",
      "citations",
    ]);
    expect(compartments[0]?.offers.length).toBe(KINDS.size);
    expect(compartments[2]?.offers).toEqual([]);
  });
});
