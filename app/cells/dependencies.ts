import { RESERVED_NAMES } from "../formulas/index.ts";
import type { FormulaUse, IntroducedName, Place, ReferenceUse } from "./body.ts";
import type { Declarations } from "./declared.ts";
import { faultAt } from "./declared.ts";
import type { Draft } from "./drafts.ts";
import { fixOfFault, lookUp, placeOfFault } from "./lookup.ts";
import { didYouMean, listOfNames, nearestFix } from "./names.ts";
import type { ParameterValues } from "./parameter-values.ts";

/** What a cell reads. */
export interface Dependencies {
  /** Cells it reads directly. */
  readonly cells: ReadonlySet<string>;
  /** Parameters it varies itself. */
  readonly varied: readonly string[];
  /** Parameters it reads, itself, through other parameters and through the cells it reads; not those it varies. */
  readonly parameters: ReadonlySet<string>;
}

/** What an entry reads that stands once for all values of a varied parameter. */
interface OutsideRead {
  readonly path: string;
  readonly place: Place;
  readonly parameters: readonly string[];
  readonly cells: readonly string[];
}

/** What a body itself reads, before what stands behind it is followed. */
interface DirectReads {
  readonly cells: Set<string>;
  readonly parameters: Set<string>;
  /** What is read outside of what is varied. */
  readonly outside: OutsideRead[];
  readonly varied: readonly string[];
}

/**
 * Looks up all names of all cells and orders the cells so that each stands after those it reads.
 * Faults (names of nothing, circles) are noted in the drafts; cells on a circle stand in the order of the text.
 */
export function findDependencies(
  names: Declarations,
  parameters: ParameterValues,
): { order: readonly string[]; dependencies: ReadonlyMap<string, Dependencies> } {
  const direct = new Map<string, DirectReads>();
  for (const [id, draft] of names.drafts) direct.set(id, readsOf(draft, names, parameters));
  const order = orderOf(names, direct);
  const dependencies = new Map<string, Dependencies>();
  for (const id of order) {
    const reads = direct.get(id);
    const draft = names.drafts.get(id);
    if (reads === undefined || draft === undefined) continue;
    dependencies.set(id, follow(reads, dependencies, parameters));
    checkVaried(draft, reads, dependencies, parameters);
  }
  return { order, dependencies };
}

function readsOf(draft: Draft, names: Declarations, values: ParameterValues): DirectReads {
  const varied =
    draft.body === null
      ? []
      : draft.body.introduced
          .filter(({ varies, name }) => varies && names.parameters.has(name))
          .map(({ name }) => name);
  const reads: DirectReads = {
    cells: new Set(),
    parameters: new Set(),
    outside: [],
    varied,
  };
  if (draft.body === null || draft.kind === null) return reads;
  for (const use of draft.body.formulas) noteFormula(draft, use, reads, names, values);
  for (const use of draft.body.references) noteReference(draft, use, reads, names);
  checkIntroduced(draft, draft.body.introduced, names);
  return reads;
}

function noteFormula(
  draft: Draft,
  use: FormulaUse,
  reads: DirectReads,
  names: Declarations,
  values: ParameterValues,
): void {
  const { reads: found, faults } = lookUp(use.formula, use.locals, names);
  for (const fault of faults) {
    const fix = fixOfFault(fault, use, use.base);
    draft.faults.push(faultAt(draft, placeOfFault(fault, use, use.base), fault.message, fix));
  }
  if (!reads.varied.some((name) => use.locals.includes(name)))
    reads.outside.push({ path: use.path, place: use, parameters: [...found.parameters], cells: [...found.cells] });
  for (const name of found.parameters) {
    reads.parameters.add(name);
    const value = values.values.get(name);
    if (value?.type === "refused" && !reads.varied.includes(name)) draft.faults.push(faultAt(draft, use, value.reason));
  }
  if (draft.kind?.knownAtPlanning === true && found.cells.size > 0) {
    const message = `A parameter may read parameters only, and ${listOfNames(found.cells)} is still to be computed. A formula cell may read it.`;
    draft.faults.push(faultAt(draft, use, message));
    return;
  }
  for (const cell of found.cells) reads.cells.add(cell);
}

function noteReference(draft: Draft, use: ReferenceUse, reads: DirectReads, names: Declarations): void {
  const cell = names.cells.get(use.id);
  const wanted = use.wanted ?? `a ${use.kinds.join(" or ")} cell`;
  const candidates = [...names.cells].filter(([, { kind }]) => use.kinds.includes(kind)).map(([name]) => name);
  if (cell === undefined) {
    const there =
      candidates.length === 0 ? ` This paper has no such cell with a name.` : ` There are ${listOfNames(candidates)}.`;
    const message = `\`${use.id}\` is not a cell of this paper; \`${use.path}\` names ${wanted}.${didYouMean(use.id, candidates) || there}`;
    draft.faults.push(faultAt(draft, use.node, message, nearestFix(use.id, candidates, use.node)));
  } else if (!use.kinds.includes(cell.kind)) {
    draft.faults.push(
      faultAt(draft, use.node, `\`${use.id}\` is a ${cell.kind} cell; \`${use.path}\` names ${wanted}.`),
    );
  } else {
    reads.cells.add(use.id);
    reads.outside.push({ path: use.path, place: use.node, parameters: [], cells: [use.id] });
  }
}

/** Dummies, columns and keys must be new names, unless they are there to vary a parameter. */
function checkIntroduced(draft: Draft, introduced: readonly IntroducedName[], names: Declarations): void {
  const here = new Set<string>();
  for (const { name, varies, from, to, line } of introduced) {
    const isParameter = names.parameters.has(name);
    if (here.has(name))
      draft.faults.push(faultAt(draft, { from, to, line }, `The name \`${name}\` is given twice in this cell.`));
    here.add(name);
    if (draft.kind?.knownAtPlanning === true || (varies && isParameter)) continue;
    if (isParameter || names.cells.has(name)) {
      const what = isParameter ? "parameter" : "cell";
      draft.faults.push(
        faultAt(
          draft,
          { from, to, line },
          `\`${name}\` is the name of a ${what} of this paper; a name given here must be a new one.`,
        ),
      );
    } else if (RESERVED_NAMES.has(name)) {
      draft.faults.push(
        faultAt(
          draft,
          { from, to, line },
          `\`${name}\` has a meaning of its own in formulas; a name given here must be a new one.`,
        ),
      );
    }
  }
}

function follow(reads: DirectReads, known: ReadonlyMap<string, Dependencies>, values: ParameterValues): Dependencies {
  const parameters = new Set<string>();
  for (const name of reads.parameters)
    for (const through of [name, ...(values.reads.get(name) ?? [])]) parameters.add(through);
  for (const cell of reads.cells) for (const name of known.get(cell)?.parameters ?? []) parameters.add(name);
  for (const name of reads.varied) parameters.delete(name);
  return { cells: reads.cells, varied: reads.varied, parameters };
}

/** The values that a varied parameter takes cannot depend on it, nor can anything that stands once for all of them. */
function checkVaried(
  draft: Draft,
  reads: DirectReads,
  known: ReadonlyMap<string, Dependencies>,
  values: ParameterValues,
): void {
  for (const name of reads.varied) {
    const given = draft.body?.introduced.find((introduced) => introduced.name === name);
    for (const { path, place, parameters, cells } of reads.outside) {
      const depends =
        parameters.some((outside) => outside === name || values.reads.get(outside)?.has(name) === true) ||
        cells.some((cell) => known.get(cell)?.parameters.has(name) === true);
      if (!depends) continue;
      const isOwnValue = given !== undefined && (path === given.path || path.startsWith(`${given.path}.`));
      const message = isOwnValue
        ? `The values given to \`${name}\` are computed from \`${name}\` itself; they must stand without it.`
        : `\`${path}\` depends on \`${name}\`, which this cell varies; it must stand without it.`;
      draft.faults.push(faultAt(draft, isOwnValue ? given : place, message));
    }
  }
}

/** Depth first in the order of the text. A cell met again on the way to itself closes a circle. */
function orderOf(names: Declarations, direct: ReadonlyMap<string, DirectReads>): readonly string[] {
  const order: string[] = [];
  const done = new Set<string>();
  const visit = (id: string, path: readonly string[]): void => {
    if (done.has(id)) return;
    if (path.includes(id)) {
      noteCircle(names, path.slice(path.indexOf(id)));
      return;
    }
    for (const cell of direct.get(id)?.cells ?? []) visit(cell, [...path, id]);
    if (done.has(id)) return;
    done.add(id);
    order.push(id);
  };
  for (const id of names.drafts.keys()) visit(id, []);
  return order;
}

function noteCircle(names: Declarations, circle: readonly string[]): void {
  const lines = circle.map((id) => names.drafts.get(id)?.cell.span.line ?? 0).sort((a, b) => a - b);
  const message =
    circle.length === 1
      ? `\`${circle[0]}\` reads itself. What it is computed from must stand without it.`
      : `${listOfNames(circle)} need each other (lines ${lines.join(", ")}). One of them must stand without the others.`;
  for (const id of circle) {
    const draft = names.drafts.get(id);
    if (draft === undefined || draft.faults.some((fault) => fault.message === message)) continue;
    draft.faults.push(faultAt(draft, draft.body?.opening ?? draft.cell.span, message));
  }
}
