import { describe, expect, test } from "vitest";
import { captionOf, evaluateNumber, paperScope } from "../../app/cells/index.ts";
import { cell, computed, HALF_DIE, LARVAE, plannedCell } from "./papers.ts";

const PAPER = `${LARVAE.replace("beta: 1", "beta: {value: 1, unit: 1/day}")}${cell("profile w", "of: larvae")}${cell("counts K", "of: larvae", "start: 1", "caption: 'How *many* reach $0$.'")}`;

function printed(prose: string, overrides: Record<string, string> = {}, text = PAPER) {
  const { paper, plan, results } = computed(`${text}\n\n${prose}\n`, overrides);
  return paper.numbers.map((number) => evaluateNumber(number, plan, results));
}

describe("numbers of the prose", () => {
  test("are printed to the digits asked", () => {
    expect(
      printed("From :value[w.s0]{digits=8} to :value[K(1000)]{digits=3}.").map((number) => number.printed?.text),
    ).toEqual(["5.4368778", "2.58×10⁻⁷⁴¹"]);
  });

  test("stand in math as well", () => {
    expect(printed("So $s_0 = \\value[digits=4]{w.s0}$ holds.")[0]?.printed?.text).toBe("5.437");
  });

  test("say what they read", () => {
    expect(printed("So :value[K.mean*mu + w(1)].")[0]).toMatchObject({
      needs: ["K", "w"],
      parameters: ["mu"],
      problem: null,
    });
  });

  test("may be words", () => {
    expect(printed("The regime is :value[larvae.regime].")[0]?.printed?.text).toBe("away");
  });

  test("carry the unit of a parameter when asked", () => {
    expect(printed("At :value[beta]{unit=yes}.")[0]?.printed?.text).toMatch(/^1.1\/day$/);
    expect(printed("At :value[beta].")[0]?.printed?.text).toBe("1");
  });

  test("without a value say why", () => {
    const [missing, unknown, broken, refused] = printed(
      "A :value[K.mean], a :value[L.mean], a :value[K.mean +], a :value[log(mu)].",
      { mu: "-2" },
      PAPER.replace("rate: beta", HALF_DIE),
    );
    expect(missing).toMatchObject({ printed: null, problem: "`K` has no result.", needs: ["K"] });
    expect(unknown?.problem).toContain("`L` is not a cell");
    expect(broken?.printed).toBeNull();
    expect(refused?.problem).not.toBe("");
    expect(refused?.value.type).toBe("refused");
  });
});

test("the scope of a paper knows parameters, values and callables", () => {
  const { plan, results } = computed(PAPER);
  const scope = paperScope(plan, results);
  expect(scope.name("mu")).toMatchObject({ quantity: { mantissa: 2 } });
  expect(scope.name("nu")).toBeUndefined();
  expect(scope.member("w", "nothing")).toBeUndefined();
  expect(scope.call("K", "above", [{ mantissa: 0, exponent: 0, error: 0, se: 0 }])?.type).toBe("number");
});

test("captions are given with their place", () => {
  const { plan, paper } = computed(PAPER);
  const caption = captionOf(plannedCell(plan, "K"));
  expect(caption?.text).toBe("How *many* reach $0$.");
  expect(paper.text.startsWith(caption?.text ?? "?", caption?.offset)).toBe(true);
  expect(captionOf(plannedCell(plan, "w"))).toBeNull();
});
