import type { Node } from "mdast";
import type { Attributes } from "./attributes.ts";
import { readAttributes, takeBrackets } from "./attributes.ts";
import { labelsInTex, valuesInTex } from "./math.ts";
import type { BoundNumberNode, CitationNode, DisplayMath, InlineMath, NumberInMath, ReferenceNode } from "./nodes.ts";
import { readNumberOptions } from "./numbers.ts";
import type { Reading } from "./reading.ts";
import { didYouMean } from "./spelling.ts";
import type { BoundNumber } from "./types.ts";

/** Makes the node of a directive: a bound number, a reference or a citation. Targets and entries are found later. */
export function readDirective(
  reading: Reading,
  node: Node,
  value: string,
): BoundNumberNode | ReferenceNode | CitationNode {
  const name = /^:([a-z]+)/.exec(value)?.[1] ?? "";
  const { label, labelAt, attributes, attributesAt } = takeBrackets(value, name.length + 1);
  const place = reading.placeIn(node, value);
  const read = readAttributes(attributes);
  const content = (label ?? "").replace(/[\r\n]/g, " ");
  const { position } = node;
  if (name === "value") {
    const number = boundNumber(reading, node, content, place(labelAt), read, place(attributesAt), false);
    return { type: "boundNumber", number, position };
  }
  if (name === "ref") {
    refuseAttributes(reading, read, place(attributesAt), attributes, [], "A reference");
    if (content.trim() === "")
      reading.report(reading.from(node), reading.to(node), "A reference names a label: :ref[label].");
    return { type: "reference", label: content.trim(), target: null, position };
  }
  refuseAttributes(reading, read, place(attributesAt), attributes, ["at", "as"], "A citation");
  const as = read.values.find((attribute) => attribute.name === "as")?.value;
  if (as !== undefined && as !== "text" && as !== "number") {
    reading.report(
      place(attributesAt),
      reading.to(node),
      `“as” is text or number.${didYouMean(as, ["text", "number"])}`,
    );
  }
  const keys = content
    .split(",")
    .map((key) => key.trim())
    .filter((key) => key !== "");
  if (keys.length === 0) {
    reading.report(
      reading.from(node),
      reading.to(node),
      "A citation names keys of the bibliography: :cite[key] or :cite[key, key].",
    );
  }
  const at = read.values.find((attribute) => attribute.name === "at")?.value ?? null;
  return { type: "citation", keys, entries: [], at, as: as === "text" ? "text" : "number", position };
}

function refuseAttributes(
  reading: Reading,
  read: Attributes,
  at: number,
  source: string,
  allowed: readonly string[],
  what: string,
): void {
  const unknown = read.values.find((attribute) => !allowed.includes(attribute.name))?.name ?? read.rest;
  const wrong = unknown !== "" ? unknown : read.label !== null ? `#${read.label}` : "";
  if (wrong === "") return;
  const takes = allowed.length === 0 ? "takes no attributes" : `takes ${allowed.join(" and ")}, each as name=value`;
  reading.report(
    at,
    at + source.length,
    `“${wrong}” means nothing here. ${what} ${takes}.${didYouMean(wrong, allowed)}`,
  );
}

function boundNumber(
  reading: Reading,
  node: Node,
  formula: string,
  formulaFrom: number,
  attributes: Attributes,
  attributesFrom: number,
  inMath: boolean,
): BoundNumber {
  const { options, faults } = readNumberOptions(attributes);
  for (const fault of faults) {
    const to = fault.to > fault.from ? attributesFrom + fault.to : reading.to(node);
    reading.report(attributesFrom + fault.from, Math.max(attributesFrom + fault.from, to), fault.message);
  }
  if (formula.trim() === "") {
    const how = inMath ? "\\value{K(3)}" : ":value[K(3)]";
    reading.report(reading.from(node), reading.to(node), `A number needs a formula, as in ${how}.`);
  }
  const number = { id: formulaFrom, span: reading.span(node), formula, formulaFrom, options, inMath };
  reading.numbers.push(number);
  return number;
}

/** Finds the numbers and the label of a math node, and puts them into its `data`. */
export function readMath(reading: Reading, node: DisplayMath | InlineMath): void {
  const { value } = node;
  const data: { numbers?: NumberInMath[]; label?: string } = {};
  if (value.includes("\\value")) data.numbers = numbersInMath(reading, node);
  if (value.includes("\\label")) {
    const place = reading.placeIn(node, value);
    for (const { label, from, to } of labelsInTex(value)) {
      if (node.type === "inlineMath") {
        reading.report(
          place(from),
          place(to),
          "Only a display is numbered: put the formula between $$ and $$ to label it.",
        );
      } else if (data.label !== undefined) {
        reading.report(
          place(from),
          place(to),
          `A display has one number, and this one is labelled “${data.label}” already.`,
        );
      } else {
        const checked = reading.checkedLabel(label, place(from));
        if (checked !== null) data.label = checked;
      }
    }
  }
  if (value.trim() === "")
    reading.report(reading.from(node), reading.to(node), "There is no formula between these dollars.");
  node.data = { ...node.data, ...data };
}

function numbersInMath(reading: Reading, node: DisplayMath | InlineMath): NumberInMath[] {
  const place = reading.placeIn(node, node.value);
  const { values, broken } = valuesInTex(node.value);
  for (const at of broken) {
    const message = "A number in math is \\value{formula}, with its braces closed.";
    reading.report(place(at), place(at) + "\\value".length, message);
  }
  return values.map(({ from, to, formula, formulaAt, attributes, attributesAt }) => {
    const start = place(from);
    const stretch: Node = {
      type: "numberInMath",
      position: {
        start: { line: 1, column: 1, offset: start },
        end: { line: 1, column: 1, offset: Math.max(start, place(to - 1) + 1) },
      },
    };
    const content = formula.replace(/[\r\n]/g, " ");
    const read = readAttributes(`{${attributes.replaceAll(",", " ")}}`);
    const number = boundNumber(reading, stretch, content, place(formulaAt), read, place(attributesAt) - 1, true);
    return { from, to, number };
  });
}
