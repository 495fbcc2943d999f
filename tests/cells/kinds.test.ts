import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { computePlan, KINDS, planPaper } from "../../app/cells/index.ts";
import { PRINTED_PARTS, readPaper } from "../../app/paper/index.ts";
import { cell, computed, LARVAE } from "./papers.ts";

const EXTRA = cell("counts K", "of: larvae", "start: 1");

describe("the documentation of kinds is that of the program", () => {
  for (const [name, kind] of KINDS) {
    const { documentation } = kind;
    const example =
      name === "process" || name === "parameters" ? documentation.example : documentation.example.replaceAll("\r", "");
    const around = name === "parameters" ? "" : LARVAE + (name === "counts" ? "" : EXTRA);
    const subject = `${name} subject`;
    const text = around + cell(subject, ...example.split("\n"));

    test(`${name}: the example computes, and gives the values documented`, () => {
      const { plan, results, outcomes } = computed(text);
      expect(plan.problems).toEqual([]);
      const result = results.get("subject");
      if (result === undefined) throw new Error(JSON.stringify(outcomes.get("subject")));
      const documented = documentation.values.map((value) => value.name);
      if (!documentation.ownKeys) expect(Object.keys(result.values)).toEqual(documented);
      expect(result.solver).toMatch(/^[a-z]+ \d+$/);
    });

    test(`${name}: keys that are required are missed`, () => {
      for (const key of documentation.keys) {
        if (!key.required || documentation.ownKeys) continue;
        const without = documentation.example
          .split("\n")
          .filter((line, index, lines) => !belongsTo(line, key.name, lines, index))
          .join("\n");
        const { plan } = computed(around + cell(subject, without));
        expect(plan.problems.map(({ message }) => message).join()).toContain(`\`${key.name}\` is missing`);
      }
    });

    test(`${name}: prints what the paper's reading takes it to print`, () => {
      expect(documentation.shows).toEqual(PRINTED_PARTS[name] === "nothing" ? [] : [PRINTED_PARTS[name]]);
      for (const part of documentation.shows) expect(documentation.parts).toContain(part);
    });
  }
});

/** Whether a line is an entry of that key, or an indented line beneath it. */
function belongsTo(line: string, key: string, lines: readonly string[], index: number): boolean {
  const head = lines.slice(0, index + 1).findLast((candidate) => !candidate.startsWith(" ")) ?? line;
  return head.startsWith(`${key}:`);
}

test("any damage to a paper leaves it planned and computed, with problems in the text", () => {
  const whole = `${LARVAE}${EXTRA}${cell("profile w", "of: larvae", "s: [0, 1/2, s0]")}${cell("table t", "rows: {mu: [1.5, 2]}", "columns: {a: w.s0, b: K(3)}")}${cell("formula f", "a: K.mean", "b: a + t.a(1)")}\nSo :value[f.b + K(2)] it is.\n`;
  const damage = fc.record({
    from: fc.nat(whole.length),
    length: fc.nat(30),
    insert: fc.oneof(
      fc.string({ maxLength: 12 }),
      fc.constantFrom("mu", "K", "[", "}", ": ", "\n", "```", "s0", "- ", "\\", "t.a(1)"),
    ),
  });
  fc.assert(
    fc.property(fc.array(damage, { minLength: 1, maxLength: 4 }), (damages) => {
      const text = damages.reduce(
        (text, { from, length, insert }) => text.slice(0, from) + insert + text.slice(from + length),
        whole,
      );
      const plan = planPaper(readPaper(text, ""));
      for (const { from, to, line, message } of plan.problems) {
        expect(message).not.toBe("");
        expect(0 <= from && from <= to && to <= text.length).toBe(true);
        expect(line).toBeGreaterThanOrEqual(1);
        expect(line).toBeLessThanOrEqual(text.split(/\r\n?|\n/).length);
      }
      const outcomes = computePlan(plan);
      for (const planned of plan.cells) {
        const status = outcomes.get(planned.id)?.status;
        if (planned.failure !== null) expect(status).toBe("failed");
        if (status === "waiting") expect(planned.needs.length).toBeGreaterThan(0);
      }
    }),
    { numRuns: 120 },
  );
});
