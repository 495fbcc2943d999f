import type { Series } from "../figures/index.ts";
import type { Quantity, Value } from "../formulas/index.ts";
import type { Body } from "./body.ts";
import type { ComputeContext } from "./context.ts";
import type { Presentation } from "./presentation.ts";
import type { CellView, Finding } from "./types.ts";

/** What the manual and completion say of a kind. */
export interface KindDocumentation {
  /** The word of the fence: "profile". */
  readonly name: string;
  /** The word of the interface: "Profile". */
  readonly label: string;
  readonly summary: string;
  /** In the order they are best written. `caption`, `show`, … that every kind has are not among them. */
  readonly keys: readonly KeyDocumentation[];
  /** True where the body's keys are names of the author's own. */
  readonly ownKeys: boolean;
  readonly values: readonly { readonly name: string; readonly meaning: string }[];
  readonly callables: readonly CallableDocumentation[];
  /** Parts that `show` may name. */
  readonly parts: readonly string[];
  /** Parts that appear when `show` is not given. */
  readonly shows: readonly string[];
  /** A body that computes, given a process `larvae`. */
  readonly example: string;
  readonly offered: OfferedCell;
}

/** How a cell of the kind is set for one who only says that one is wanted. */
export interface OfferedCell {
  /** Its name, or how that begins where it is taken; "" where the kind is best without one. */
  readonly name: string;
  /** What it is, in a few words: "the law of the number absorbed". */
  readonly line: string;
  /** Further words by which one may ask for it. */
  readonly words: string;
  /**
   * Its body. What stands in «» is taken from the paper: «process» or another kind is the name of a cell of that kind, and
   * the rest is told in app/editor/case/ground.ts. What one will want to change first stands between ‹ and ›.
   */
  readonly body: string;
}

export interface KeyDocumentation {
  readonly name: string;
  readonly meaning: string;
  readonly required: boolean;
  /** As it would be written; null when there is none. */
  readonly fallback: string | null;
}

export interface CallableDocumentation {
  /** "" for the cell itself. */
  readonly member: string;
  readonly args: readonly string[];
  /** How many of `args` must be given. */
  readonly least: number;
  readonly meaning: string;
}

/**
 * The branch of a theory that the inputs of a cell decide: where it changes, values may jump, and no curve is drawn across.
 */
export interface Branch {
  /** Equal names, equal branch: "between". */
  readonly name: string;
  /** What holds in it, to end a sentence: "K is infinite with positive probability". */
  readonly holds: string;
  /** Where it may end, each to end a sentence: "the drift is critical". Two branches meet where both have the same one, the first such. */
  readonly borders: readonly string[];
  /** Its border belongs to it. */
  readonly closed: boolean;
}

/** What a computation costs that varies something. */
export interface Cost {
  /** What one point is called: "row". */
  readonly noun: string;
  readonly points: number;
  /** Cells computed again at each point. */
  readonly cells: number;
}

/** What formulas may read of a cell. */
export interface Members {
  readonly values: readonly string[];
  readonly callables: readonly { readonly member: string; readonly least: number; readonly most: number }[];
}

/** What a kind's solver call gives. */
export interface Computed<Data> {
  /** In the order of the documentation. */
  readonly values: Readonly<Record<string, Value>>;
  /** Plain JSON, whole in itself: callables, figure and table are made from it alone. */
  readonly data: Data;
  /** The method that ran, D among its parameters: "Saddle contour, 256 nodes; D = 0.5". */
  readonly method: string;
}

/**
 * A computation that splits into parts, which several threads compute in any order and which are kept one by one.
 *
 * Life: `split` decides what all parts share and how many there are → `part` for each index from 0, on any thread, knowing
 * what is shared and its index alone → `merge` of all parts in the order of their indices. All is plain JSON; equal model and
 * context split alike. `split` throws CellFault or SolverError, `part` and `merge` SolverError.
 */
export interface PartsOf<Model, Shared, Part, Data> {
  split(model: Model, context: ComputeContext): { readonly shared: Shared; readonly count: number };
  part(shared: Shared, index: number): Part;
  merge(shared: Shared, parts: readonly Part[]): Computed<Data>;
}

/** The same with what travels between its functions forgotten: it only ever comes from the same kind's functions. */
export type Parts<Model, Data> = PartsOf<Model, unknown, unknown, Data>;

/** Forgets the types of what is shared and of parts. */
export function defineParts<Model, Shared, Part, Data>(parts: PartsOf<Model, Shared, Part, Data>): Parts<Model, Data> {
  return {
    split: (model, context) => parts.split(model, context),
    part: (shared, index) => parts.part(shared as Shared, index),
    merge: (shared, all) => parts.merge(shared as Shared, all as readonly Part[]),
  };
}

/** The `compute` of a kind that splits: all parts one after the other, in this thread. */
export function computeAllParts<Model, Data>(
  parts: Parts<Model, Data>,
): (model: Model, context: ComputeContext) => Computed<Data> {
  return (model, context) => {
    const { shared, count } = parts.split(model, context);
    const all = Array.from({ length: count }, (_, index) => {
      context.progress(index, count);
      return parts.part(shared, index);
    });
    return parts.merge(shared, all);
  };
}

/**
 * A kind of cell. One is a folder with model.ts and view.ts, and a line in registry.ts; nothing else branches on kinds.
 *
 * Life: `read` (planning, on each keystroke) → `inspect`, `branch` and `cost` (planning, when no other cell's value enters) → `compute` (in a
 * worker) → `call`, `view` and `finding` (wherever the result is shown, from its data alone). All are pure; `read` notes problems in
 * the body and never throws; `inspect`, `branch`, `cost` and `compute` throw CellFault or SolverError, `call` SolverError; `view` never throws.
 */
export interface KindOf<Model, Data> {
  readonly documentation: KindDocumentation;
  /** Name and version of what computes it: part of the key. */
  readonly solver: string;
  /** True where all values are known at planning (parameters): such a cell is never out of date. */
  readonly knownAtPlanning: boolean;
  /** Model: plain JSON of what enters the computation, formulas as trees, defaults filled in; all of it enters the key. */
  read(body: Body): Model;
  members(model: Model): Members;
  /** Refuses inputs out of range. False: it takes longer than some milliseconds. */
  inspect(model: Model, context: ComputeContext): boolean;
  /** The branch that the inputs decide, found at once. Absent: its values depend on its inputs without a jump. */
  branch?(model: Model, context: ComputeContext): Branch;
  /** What varying costs, told before it is computed; null where nothing is computed again. Absent: it never varies. */
  cost?(model: Model, context: ComputeContext): Cost | null;
  compute(model: Model, context: ComputeContext): Computed<Data>;
  /** How a long computation splits; `compute` is then `computeAllParts` of it. Absent: it does not. */
  readonly parts?: Parts<Model, Data>;
  /** `K(3)`: member is "" for the cell itself. undefined when it has no such callable. */
  call(data: Data, member: string, args: readonly Quantity[]): Value | undefined;
  view(data: Data, presentation: Presentation): CellView;
  /** What it draws among other curves of a figure. Absent: the series of its own figure. */
  drawn?(data: Data, presentation: Presentation): readonly Series[];
  /** What is said where the cell stands; null for nothing. Never throws. Absent: its values and its view say all. */
  finding?(data: Data, presentation: Presentation): Finding | null;
}

export type Kind = KindOf<unknown, unknown>;

/**
 * Forgets a kind's own types, for the registry. Sound because a model only ever comes from the same kind's `read`, and
 * data from its `compute`: both travel with the kind's name.
 */
export function defineKind<Model, Data>(kind: KindOf<Model, Data>): Kind {
  const { parts } = kind;
  const branch = kind.branch?.bind(kind);
  const cost = kind.cost?.bind(kind);
  const drawn = kind.drawn?.bind(kind);
  const finding = kind.finding?.bind(kind);
  return {
    documentation: kind.documentation,
    solver: kind.solver,
    knownAtPlanning: kind.knownAtPlanning,
    read: (body) => kind.read(body),
    members: (model) => kind.members(model as Model),
    inspect: (model, context) => kind.inspect(model as Model, context),
    branch: branch && ((model, context) => branch(model as Model, context)),
    cost: cost && ((model, context) => cost(model as Model, context)),
    compute: (model, context) => kind.compute(model as Model, context),
    parts: parts && { ...parts, split: (model, context) => parts.split(model as Model, context) },
    call: (data, member, args) => kind.call(data as Data, member, args),
    view: (data, presentation) => kind.view(data as Data, presentation),
    drawn: drawn && ((data, presentation) => drawn(data as Data, presentation)),
    finding: finding && ((data, presentation) => finding(data as Data, presentation)),
  };
}

/** The members of a kind that are the same for every cell of it. */
export function documentedMembers(documentation: KindDocumentation): Members {
  return {
    values: documentation.values.map((value) => value.name),
    callables: documentation.callables.map(({ member, least, args }) => ({ member, least, most: args.length })),
  };
}
