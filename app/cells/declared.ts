import { RESERVED_NAMES } from "../formulas/index.ts";
import type { Problem } from "../paper/index.ts";
import type { Place } from "./body.ts";
import type { Draft } from "./drafts.ts";
import type { NamedCell, NameTable } from "./lookup.ts";
import type { DeclaredParameter } from "./parameters/model.ts";
import { declaredParameters } from "./parameters/model.ts";

/** Every name of a paper, each given once. */
export interface Declarations extends NameTable {
  /** In the order of the text. */
  readonly declared: ReadonlyMap<string, { readonly parameter: DeclaredParameter; readonly draft: Draft }>;
  /** Drafts of cells by id, unnamed ones among them. */
  readonly drafts: ReadonlyMap<string, Draft>;
}

/** Collects the names of parameters and cells. A name given twice, or a reserved one, is a fault of the later cell. */
export function declareNames(drafts: readonly Draft[]): Declarations {
  const declared = new Map<string, { parameter: DeclaredParameter; draft: Draft }>();
  const cells = new Map<string, NamedCell>();
  const lines = new Map<string, number>();

  for (const draft of drafts) {
    declareCell(draft, cells, lines);
    if (draft.kind?.knownAtPlanning !== true || draft.looks === null) continue;
    for (const parameter of declaredParameters(draft.looks)) {
      const place = draft.looks.placeOf(parameter.name);
      const message = nameFault(parameter.name, lines);
      if (message !== null) draft.faults.push(faultAt(draft, place, message));
      else {
        declared.set(parameter.name, { parameter, draft });
        lines.set(parameter.name, parameter.line);
      }
    }
  }
  return {
    declared,
    drafts: new Map(drafts.map((draft) => [draft.cell.id, draft])),
    parameters: new Set(declared.keys()),
    cells,
  };
}

/** A fault of a cell, at a place. */
export function faultAt(draft: Draft, place: Place, message: string, fix?: Problem["fix"]): Problem {
  return { from: place.from, to: place.to, line: place.line, severity: "error", message, cell: draft.cell.id, fix };
}

function declareCell(draft: Draft, cells: Map<string, NamedCell>, lines: Map<string, number>): void {
  const { cell, kind } = draft;
  if (cell.name === null) return;
  const message = nameFault(cell.name, lines);
  if (message !== null) {
    draft.faults.push(
      faultAt(
        draft,
        { from: cell.span.from, to: Math.max(cell.span.from, cell.bodyFrom - 1), line: cell.span.line },
        message,
      ),
    );
    return;
  }
  lines.set(cell.name, cell.span.line);
  const members = kind === null || draft.body === null ? null : kind.members(draft.model);
  cells.set(cell.name, { kind: cell.kind, members, isParameters: kind?.knownAtPlanning === true });
}

function nameFault(name: string, lines: ReadonlyMap<string, number>): string | null {
  const line = lines.get(name);
  if (line !== undefined)
    return `The name \`${name}\` is given already, in line ${line}. Parameters and cells share one set of names; another name would do.`;
  if (!RESERVED_NAMES.has(name)) return null;
  return `\`${name}\` has a meaning of its own in formulas and cannot be given to anything else. Another name, such as \`${name}_1\`, would do.`;
}
