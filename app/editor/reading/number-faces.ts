import { type CellResult, evaluateNumber, type Plan } from "../../cells/index.ts";
import type { BoundNumber } from "../../paper/index.ts";
import { boundClasses } from "../model/bound-classes.ts";
import type { CellStateName, NumberFace, NumberState } from "../model/types.ts";

/** What is known of a cell where a number is set: its state and what it is called. */
export interface CellStanding {
  readonly state: CellStateName;
  readonly title: string;
}

/** Faces of the paper's numbers under one plan and one set of shown results; each formula is evaluated once. */
export interface NumberFaces {
  face(number: BoundNumber): NumberFace;
  /** TeX of the number, for math. */
  tex(number: BoundNumber): string;
}

type Evaluated = ReturnType<typeof evaluateNumber>;

interface Known {
  readonly face: NumberFace;
  readonly tex: string;
}

export function numberFaces(
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
  standings: ReadonlyMap<string, CellStanding>,
  tried: ReadonlySet<string>,
): NumberFaces {
  const strands = new Map(plan.parameters.map(({ name }, place) => [name, place]));
  const known = new Map<string, Known>();
  const know = (number: BoundNumber): Known => {
    const sign = `${number.formula}\n${JSON.stringify(number.options)}`;
    const before = known.get(sign);
    if (before !== undefined) return before;
    const made = faceOf(number, plan, results, standings, strands, tried);
    known.set(sign, made);
    return made;
  };
  return { face: (number) => know(number).face, tex: (number) => know(number).tex };
}

function faceOf(
  number: BoundNumber,
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
  standings: ReadonlyMap<string, CellStanding>,
  strands: ReadonlyMap<string, number>,
  tried: ReadonlySet<string>,
): Known {
  const { value, printed, needs, problem, ...read } = evaluated(number, plan, results);
  const through = needs.flatMap((id) => plan.byId.get(id)?.parameters ?? []);
  const hung = new Set([...read.parameters, ...through]);
  const parameters = plan.parameters.flatMap(({ name }) => (hung.has(name) ? [name] : []));
  const cells = needs.flatMap((id) => standings.get(id) ?? []);
  const state = stateOf(
    cells,
    printed !== null,
    parameters.some((name) => tried.has(name)),
  );
  const from = cells.length === 0 ? "" : `from ${listed(cells.map(({ title }) => title))}, `;
  const hangs = parameters.length === 0 ? "" : `${hangsWords(parameters)}, `;
  const reason = printed !== null ? "" : (problem ?? (value.type === "refused" ? value.reason : ""));
  const said = `${from}${hangs}${SAID[state]}${reason === "" ? "" : `: ${reason}`}`;
  const face = {
    known: printed?.sheet.known ?? textOf(value),
    unknown: printed?.sheet.unknown ?? "",
    rest: printed?.sheet.rest ?? "",
    formula: number.formula.trim(),
    good: printed !== null && Number.isFinite(printed.supported) ? printed.supported : null,
    state,
    cells: needs.flatMap((id) => plan.byId.get(id)?.slot ?? []),
    reads: read.parameters.flatMap((name) => strands.get(name) ?? []),
    strands: parameters.flatMap((name) => strands.get(name) ?? []),
    said,
  };
  const set = printed?.tex ?? `\\text{${face.known === "" ? "no value" : face.known}}`;
  const tex = `\\htmlClass{${boundClasses(face)}}{${set}}`;
  return { face, tex: MARKED.has(state) ? `{${tex}}^{\\dagger}` : printed === null ? `${tex}^{\\ddagger}` : tex };
}

/** A result that cannot be read must not keep the other numbers from the page. */
function evaluated(number: BoundNumber, plan: Plan, results: ReadonlyMap<string, CellResult>): Evaluated {
  try {
    return evaluateNumber(number, plan, results);
  } catch (error) {
    const problem = `it cannot be told: ${error instanceof Error ? error.message : String(error)}`;
    return { value: { type: "refused", reason: problem }, printed: null, needs: [], parameters: [], problem };
  }
}

/** What stands for a value that is not a number: a verdict, a word. */
function textOf(value: Evaluated["value"]): string {
  if (value.type === "text") return value.text;
  if (value.type === "truth") return value.holds === null ? "undecided" : value.holds ? "holds" : "fails";
  return "";
}

/** The gravest state of what a number reads. A value is only as good as the worst of them. */
function stateOf(cells: readonly CellStanding[], valued: boolean, tried: boolean): NumberState {
  const states = new Set(cells.map(({ state }) => state));
  const order = valued ? VALUED : UNVALUED;
  for (const [state, shown] of order) if (states.has(state)) return shown;
  return valued ? (tried ? "preview" : "current") : "failed";
}

const VALUED: readonly (readonly [CellStateName, NumberState])[] = [
  ["computing", "computing"],
  ["waiting", "waiting"],
  ["failed", "outOfDate"],
  ["outOfDate", "outOfDate"],
  ["cancelled", "outOfDate"],
  ["stands", "stands"],
  ["preview", "preview"],
];

const UNVALUED: readonly (readonly [CellStateName, NumberState])[] = [
  ["failed", "failed"],
  ["computing", "computing"],
  ["waiting", "waiting"],
  ["empty", "empty"],
  ["cancelled", "empty"],
];

const MARKED: ReadonlySet<NumberState> = new Set<NumberState>(["outOfDate", "stands"]);

const SAID: Readonly<Record<NumberState, string>> = {
  current: "current",
  outOfDate: "out of date",
  stands: "stands with an older result",
  computing: "being set",
  waiting: "waits",
  failed: "no value",
  empty: "not computed",
  preview: "tried, not kept",
};

/** "hangs from mu and beta". */
export function hangsWords(parameters: readonly string[]): string {
  return parameters.length === 0 ? "" : `hangs from ${listed(parameters)}`;
}

function listed(things: readonly string[]): string {
  return things.length < 2 ? (things[0] ?? "") : `${things.slice(0, -1).join(", ")} and ${things.at(-1)}`;
}
