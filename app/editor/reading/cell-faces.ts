import {
  type CellResult,
  type CellState,
  type CellWork,
  costWords,
  findingOf,
  KINDS,
  type Plan,
  type PlannedCell,
  provenance,
  type ShownCell,
} from "../../cells/index.ts";
import { type CellNode, type Paper, walk } from "../../paper/index.ts";
import { isPlainNumber, shownValue } from "../model/scale.ts";
import type { CellFace } from "../model/types.ts";
import { moment, stateWords } from "./cell-words.ts";
import { hangsWords, type NumberFaces } from "./number-faces.ts";
import { runsOf } from "./runs.ts";

/** All that is known of a cell when its face is drawn. */
export interface CellTelling {
  readonly planned: PlannedCell;
  readonly shown: ShownCell | undefined;
  readonly work: CellWork | undefined;
  readonly state: CellState;
  /** The result to show: the paper's, or one tried in this page. */
  readonly result: CellResult | undefined;
  /** The result is tried here and kept nowhere. */
  readonly previewed: boolean;
  /** The result that the paper shows is on its way here; `result` is the one before. */
  readonly awaited: boolean;
}

/** The cells' nodes in the tree, by slot: their printed parts and captions. */
export function cellNodesOf(paper: Paper): Map<string, CellNode> {
  const nodes = new Map<string, CellNode>();
  walk(paper.root.children, (node) => {
    if (node.type === "cell") nodes.set(node.cell.slot, node);
  });
  return nodes;
}

/** "Figure 1", "Table 2", or kind and name for a cell that prints nothing; by id. */
export function titlesOf(plan: Plan, nodes: ReadonlyMap<string, CellNode>): Map<string, string> {
  return new Map(plan.cells.map((planned) => [planned.id, titleOf(planned, nodes.get(planned.slot))]));
}

function titleOf(planned: PlannedCell, node: CellNode | undefined): string {
  const part = node?.parts[0];
  if (part !== undefined) return `${part.noun} ${part.number}`;
  return planned.cell.name === null
    ? planned.kind.replace("_", " ")
    : `${planned.kind.replace("_", " ")} ${planned.cell.name}`;
}

interface Drawing {
  readonly plan: Plan;
  readonly nodes: ReadonlyMap<string, CellNode>;
  readonly titles: ReadonlyMap<string, string>;
  readonly numbers: NumberFaces;
  /** Parameters that are tried privately. */
  readonly tried: ReadonlySet<string>;
}

/** The face of each cell, in the order of the plan. */
export function cellFaces(tellings: readonly CellTelling[], drawing: Drawing): CellFace[] {
  const strands = new Map(drawing.plan.parameters.map(({ name }, place) => [name, place]));
  const symbols = new Map(drawing.plan.parameters.map(({ name, symbol }) => [name, symbol]));
  const printed = valuesIn(drawing.plan);
  const now = new Date();
  const faceOf = (telling: CellTelling): CellFace => {
    const { planned, shown, work, state, result, previewed } = telling;
    const node = drawing.nodes.get(planned.slot);
    const titleOfId = (id: string) => drawing.titles.get(id) ?? id;
    const cost = planned.cost === null ? "" : costWords(planned.cost);
    const waited = state.waitsFor[0] === undefined ? undefined : drawing.plan.byId.get(state.waitsFor[0]);
    return {
      ...cellInPaper(planned, drawing),
      caption: node === undefined ? [] : runsOf(node.caption, drawing.numbers),
      state: previewed ? "preview" : state.state,
      words: previewed
        ? []
        : stateWords({ state, shown, work, cost, titleOf: titleOfId, printed, firstLine: planned.line, now }),
      provenance: provenanceRuns(telling, symbols, drawing.tried, printed, now),
      finding: result === undefined ? null : findingOf(planned, result, drawing.plan),
      progress:
        state.state === "computing" && work?.state === "computing" && work.total > 1
          ? { done: work.done, total: work.total }
          : null,
      failureLine: state.failure?.line ?? null,
      seconds: shown?.seconds ?? result?.seconds ?? null,
      hasResult: result !== undefined || shown !== undefined,
      sound: planned.key !== null,
      key: planned.key,
      strands: planned.parameters.flatMap((name) => strands.get(name) ?? []),
      hangs: hangsWords(planned.parameters),
      changed: state.causes.flatMap((cause) => (cause.cause === "parameter" ? (strands.get(cause.name) ?? []) : [])),
      needs: waited === undefined ? null : { title: titleOfId(waited.id), slot: waited.slot },
      viewSign: result === undefined ? "" : viewSign(result, planned, drawing.plan),
    };
  };
  return tellings.map((telling) => {
    try {
      return faceOf(telling);
    } catch (error) {
      return faultFace(telling, drawing, error);
    }
  });
}

/** What a cell is called and where it stands, whatever becomes of its result. */
function cellInPaper(planned: PlannedCell, { nodes, titles }: Drawing) {
  const parts = nodes.get(planned.slot)?.parts ?? [];
  return {
    id: planned.id,
    slot: planned.slot,
    kind: planned.kind,
    name: planned.cell.name,
    from: planned.cell.span.from,
    to: planned.cell.span.to,
    line: planned.line,
    title: titles.get(planned.id) ?? planned.id,
    parts: parts.map(({ part, noun, number }) => ({ part, title: `${noun} ${number}` })),
  };
}

/** One cell whose face cannot be made says so in its place: it must not keep the others, and the text, from the page. */
function faultFace({ planned, result, shown }: CellTelling, drawing: Drawing, error: unknown): CellFace {
  const message = (error instanceof Error ? error.message : String(error)).replace(/\.$/, "");
  const inPaper = cellInPaper(planned, drawing);
  return {
    ...inPaper,
    caption: [],
    state: "failed",
    words: [{ run: "text", text: `${inPaper.title} cannot be told: ${message}. Recompute it, or edit its working.` }],
    provenance: [],
    finding: null,
    progress: null,
    failureLine: null,
    seconds: null,
    hasResult: result !== undefined || shown !== undefined,
    sound: planned.key !== null,
    key: planned.key,
    strands: [],
    hangs: "",
    changed: [],
    needs: null,
    viewSign: "",
  };
}

/** Values of parameters as the rule shows them, with the decimals of their steps. */
function valuesIn(plan: Plan): (name: string, words: string) => string {
  const steps = new Map(plan.parameters.map(({ name, step }) => [name, step]));
  return (name, words) => (isPlainNumber(words) ? shownValue(Number(words), words, steps.get(name) ?? null) : words);
}

/** A view depends on the result, on how the working wants it drawn, on the parameters' symbols and the paper's macros. */
function viewSign(result: CellResult, planned: PlannedCell, plan: Plan): string {
  const symbols = plan.parameters.map(({ name, symbol, source }) => `${name} ${symbol} ${source}`).join(";");
  return `${result.key}\n${JSON.stringify(planned.cell.body, withoutPlaces)}\n${symbols}\n${JSON.stringify(plan.macros)}`;
}

/** Where an entry stands does not change how it is drawn. */
function withoutPlaces(name: string, value: unknown): unknown {
  return PLACES.has(name) ? undefined : value;
}

const PLACES: ReadonlySet<string> = new Set(["from", "to", "line", "keyFrom", "keyTo"]);

function provenanceRuns(
  { planned, shown, result, previewed, awaited }: CellTelling,
  symbols: ReadonlyMap<string, string>,
  tried: ReadonlySet<string>,
  printed: (name: string, words: string) => string,
  now: Date,
): CellFace["provenance"] {
  if (result === undefined || awaited || KINDS.get(planned.kind)?.knownAtPlanning === true) return [];
  const { words, by, at } = provenance(planned, result, shown);
  if (!previewed) {
    const who = [by, at === null ? null : moment(at, now)].filter((part) => part !== null).join(", ");
    if (words === "") return who === "" ? [] : [{ run: "text", text: `Computed by ${who}` }];
    return [{ run: "text", text: who === "" ? words : `${words} · ${who}` }];
  }
  const said: CellFace["provenance"][number][] = [{ run: "text", text: words }];
  const names = planned.parameters.filter((name) => tried.has(name));
  if (names.length === 0) return words === "" ? [] : said;
  said.push({ run: "text", text: words === "" ? "Tried with " : " · tried with " });
  names.forEach((name, at) => {
    if (at > 0) said.push({ run: "text", text: ", " });
    said.push({ run: "math", tex: symbols.get(name) ?? name });
    said.push({ run: "text", text: ` = ${printed(name, planned.parameterValues[name] ?? "")}` });
  });
  said.push({ run: "text", text: "; not kept" });
  return said;
}
