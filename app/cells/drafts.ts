import type { Cell, Paper, Problem } from "../paper/index.ts";
import { Body } from "./body.ts";
import type { Kind } from "./kind.ts";
import { didYouMean, listOfNames, nearestFix } from "./names.ts";
import { checkPresentation, presentationKeys, readShow } from "./presentation.ts";
import { KINDS } from "./registry.ts";

/** A cell on its way into the plan: its body read, its names not yet looked up. */
export interface Draft {
  readonly cell: Cell;
  /** null: not a kind of the language. */
  readonly kind: Kind | null;
  /** What enters the computation; null when the body could not be read at all. */
  readonly body: Body | null;
  /** The same body read for its looks: what is wrong there does not keep the cell from computing. */
  readonly looks: Body | null;
  readonly model: unknown;
  readonly show: readonly string[];
  /** Problems that keep the cell from computing. Grows as the paper is planned. */
  readonly faults: Problem[];
}

/** Reads every cell of a paper by its kind. Pure; nothing throws. */
export function readDrafts(paper: Paper): readonly Draft[] {
  const names = new Set(paper.cells.flatMap(({ name }) => name ?? []));
  return paper.cells.map((cell) => readDraft(cell, paper, names));
}

function readDraft(cell: Cell, paper: Paper, names: ReadonlySet<string>): Draft {
  const kind = KINDS.get(cell.kind) ?? null;
  const unreadable = faultsOfReading(cell, paper);
  if (kind === null) return { ...NOTHING_READ, cell, kind, faults: [...unreadable, unknownKind(cell, paper.text)] };
  if (cell.body === null) return { ...NOTHING_READ, cell, kind, faults: unreadable };
  const body = new Body(cell, paper.text, cell.body, names);
  const looks = new Body(cell, paper.text, cell.body);
  checkKeys(body, kind);
  const model = kind.read(body);
  const show = readShow(looks, kind.documentation);
  checkPresentation(looks);
  return { cell, kind, body, looks, model, show, faults: [...unreadable, ...body.problems] };
}

const NOTHING_READ = { body: null, looks: null, model: null, show: [] } as const;

/** What the reading of the paper found wrong with the cell, captions apart. */
function faultsOfReading(cell: Cell, paper: Paper): Problem[] {
  const caption = cell.body?.entries.find((entry) => entry.key === "caption");
  return paper.problems.filter((problem) => {
    if (problem.cell !== cell.id || problem.severity !== "error") return false;
    return caption === undefined || problem.from < caption.keyFrom || problem.from > caption.value.to;
  });
}

function unknownKind(cell: Cell, text: string): Problem {
  const from = Math.max(cell.span.from, text.indexOf(cell.kind, cell.span.from));
  const kinds = [...KINDS.keys()];
  const message = `\`${cell.kind}\` is not a kind of cell; there are ${listOfNames(kinds)}.${didYouMean(cell.kind, kinds)}`;
  const place = { from, to: from + cell.kind.length, line: cell.span.line };
  return { ...place, severity: "error", message, cell: cell.id, fix: nearestFix(cell.kind, kinds, place) };
}

/** Notes unknown and missing keys. */
function checkKeys(body: Body, { documentation }: Kind): void {
  if (documentation.ownKeys) return;
  const known = documentation.keys.map((key) => key.name);
  body.onlyKeys(body.entries, [...known, ...presentationKeys(documentation)], `a ${documentation.name} cell`);
  for (const key of documentation.keys) {
    if (key.required && !body.has(key.name)) {
      body.problem(
        body.opening,
        `\`${key.name}\` is missing: ${key.meaning}. A ${documentation.name} cell cannot do without it.`,
      );
    }
  }
}
