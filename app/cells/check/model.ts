import type { Formula, Value } from "../../formulas/index.ts";
import { isTruth, printExact, printNumber, toDouble } from "../../formulas/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import type { Presentation } from "../presentation.ts";
import type { Finding } from "../types.ts";
import { refusedValue, textValue } from "../values.ts";
import { CHECK_DOCUMENTATION } from "./documentation.ts";
import { comparisonOf, NO_COMPARISON, verdictOf } from "./verdict.ts";

/** `because` is no part of it: words change no verdict. */
export interface CheckCell {
  readonly that: Formula;
}

export interface CheckData {
  readonly verdict: "holds" | "fails" | "undecided";
  /** The comparison in numbers, "0.0329 < 0.05"; "" where it joins several. */
  readonly compared: string;
}

const DIGITS = 6;

export const CHECK: KindOf<CheckCell, CheckData> = {
  documentation: CHECK_DOCUMENTATION,
  solver: "check 1",
  knownAtPlanning: false,

  read(body: Body): CheckCell {
    const that = body.formula("that", "0");
    const node = body.node("that");
    const isRead = !body.problems.some(
      (problem) => node !== null && problem.from >= node.from && problem.to <= node.to,
    );
    if (node !== null && isRead && !isTruth(that)) body.problem(node, NO_COMPARISON);
    const because = body.node("because");
    if (because !== null) body.scalar(because, "the words of `because`");
    return { that };
  },

  members: () => documentedMembers(CHECK_DOCUMENTATION),

  inspect: () => true,

  compute({ that }, context) {
    const holds = verdictOf(that, context);
    const verdict = holds === null ? "undecided" : holds ? "holds" : "fails";
    const sides = sidesOf(that, context);
    return {
      values: { verdict: textValue(verdict), left: sides.left, right: sides.right },
      data: { verdict, compared: sides.compared },
      method: "Compared within error bounds",
    };
  },

  call: () => undefined,
  view: () => ({ figure: null, table: null, points: null }),
  finding: told,
};

function sidesOf(that: Formula, context: ComputeContext): { left: Value; right: Value; compared: string } {
  const comparison = comparisonOf(that);
  if (comparison === null) {
    const none = refusedValue("`that` is not one comparison but joins some; it has no one left and right side.");
    return { left: none, right: none, compared: "" };
  }
  const left = context.value(comparison.left);
  const right = context.value(comparison.right);
  return { left, right, compared: `${inWords(left)} ${comparison.sign} ${inWords(right)}` };
}

/** A side with the digits that its error supports. */
function inWords(value: Value): string {
  if (value.type === "number") {
    const isExact = value.quantity.error === 0 && value.quantity.se === 0;
    return isExact ? printExact(toDouble(value.quantity)) : printNumber(value.quantity, { digits: DIGITS }).text;
  }
  return value.type === "text" ? value.text : "no value";
}

/** Nothing where it holds: silence means sound. */
function told({ verdict, compared }: CheckData, presentation: Presentation): Finding | null {
  if (verdict === "holds") return null;
  const what = compared === "" ? "What it compares" : compared;
  const told = verdict === "fails" ? `${what} does not hold.` : `${what} is undecided within the errors.`;
  const because = presentation.body?.entries.find((entry) => entry.key === "because")?.value;
  const reason = because?.yaml === "scalar" ? because.text.trim() : "";
  return { isGrave: true, words: reason === "" ? told : `${told} It should hold because: ${reason}` };
}
