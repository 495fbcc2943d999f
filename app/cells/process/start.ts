import type { Formula } from "../../formulas/index.ts";
import type { Start } from "../../solvers/index.ts";
import type { Body } from "../body.ts";
import { canonicalJson } from "../canonical.ts";
import type { ComputeContext } from "../context.ts";

/** Where the particles start: positions with numbers of particles, in an order that the text's order does not change. */
export type StartModel = readonly { readonly position: Formula; readonly particles: Formula }[];

const MOST_PARTICLES = 10_000;
const ONE: Formula = { node: "number", value: 1 };

/** Reads `start`: a position, or a map of positions to numbers of particles. */
export function readStart(body: Body): StartModel {
  const node = body.node("start");
  if (node?.yaml !== "map") return [{ position: body.formula("start", "0"), particles: ONE }];
  if (node.entries.length === 0)
    body.problem(node, "`start` is empty; it takes a position, or positions with numbers of particles: {1: 3, 2: 2}.");
  const starts = node.entries.map((entry) => ({
    position: body.formulaInKey(entry, "start"),
    particles: body.formulaAt(entry.value, "start"),
  }));
  // Trees without offsets order alike wherever they stand in the text.
  const order = (start: StartModel[number]): string => canonicalJson(start).replace(/"at":\d+,?/g, "");
  return starts.sort((a, b) => (order(a) < order(b) ? -1 : 1));
}

/** The starts in numbers. @throws CellFault when a position is negative or a number of particles is none. */
export function startsOf(model: StartModel, context: ComputeContext): readonly Start[] {
  return model.map(({ position, particles }) => ({
    position: context.number(position, "start", { least: 0 }),
    particles: context.number(particles, "start", { least: 1, most: MOST_PARTICLES, whole: true }),
  }));
}

/** "one particle at 1", "3 particles at 1 and 2 at 2": for the words of figures. */
export function startWords(starts: readonly Start[]): string {
  const [first] = starts;
  if (starts.length === 1 && first !== undefined && first.particles === 1) return `one particle at ${first.position}`;
  const parts = starts.map(({ position, particles }, index) => {
    const noun = index > 0 ? "" : particles === 1 ? " particle" : " particles";
    return `${particles}${noun} at ${position}`;
  });
  return parts.join(" and ");
}
