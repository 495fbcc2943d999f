import type { Formula, Quantity } from "../formulas/index.ts";
import type { Dependencies } from "./dependencies.ts";
import type { Draft } from "./drafts.ts";
import type { Keys } from "./keys.ts";
import type { ParameterValues } from "./parameter-values.ts";
import type { CellTask } from "./types.ts";

/** Makes of planned cells what a worker needs to compute them. */
export class Tasks {
  constructor(
    readonly drafts: ReadonlyMap<string, Draft>,
    readonly dependencies: ReadonlyMap<string, Dependencies>,
    readonly order: readonly string[],
    readonly parameters: ParameterValues,
    readonly keys: Keys,
  ) {}

  /** The task of a cell whose key is known; `open` are parameters that a table around it varies. */
  task(id: string, open: readonly string[] = []): CellTask | null {
    const draft = this.drafts.get(id);
    const dependencies = this.dependencies.get(id);
    if (draft === undefined || dependencies === undefined || draft.body === null) return null;
    const { varied } = dependencies;
    const again = varied.length === 0 ? [] : this.#recomputedCells(id, varied);
    const fixed = [...dependencies.cells].filter((cell) => !again.includes(cell));
    const behind = again.flatMap((cell) =>
      [...(this.dependencies.get(cell)?.cells ?? [])].filter((need) => !again.includes(need)),
    );
    const inner = [...new Set([...open, ...varied])];
    return {
      id,
      key: this.keys.key(id, open) ?? "",
      kind: draft.cell.kind,
      model: draft.model,
      parameters: this.#quantities([...dependencies.parameters, ...varied, ...ownParameters(draft)]),
      needs: this.#keysOf([...fixed, ...behind], open),
      lines: Object.fromEntries(Object.entries(draft.body.places).map(([path, place]) => [path, place.line])),
      ...(varied.length === 0
        ? {}
        : {
            recomputed: {
              varied,
              parameters: this.#recomputedParameters(varied),
              cells: again.flatMap((cell) => this.task(cell, inner) ?? []),
            },
          }),
    };
  }

  /** Cells that `id` reads, directly or behind others, and that a varied parameter changes; in order. */
  #recomputedCells(id: string, varied: readonly string[]): readonly string[] {
    const found = new Set<string>();
    const visit = (cell: string): void => {
      const dependencies = this.dependencies.get(cell);
      if (dependencies === undefined || found.has(cell) || !varied.some((name) => dependencies.parameters.has(name)))
        return;
      found.add(cell);
      for (const need of dependencies.cells) visit(need);
    };
    for (const need of this.dependencies.get(id)?.cells ?? []) visit(need);
    return this.order.filter((cell) => found.has(cell));
  }

  /** Parameters computed from varied ones, each after those it reads. */
  #recomputedParameters(varied: readonly string[]): { name: string; formula: Formula }[] {
    const depth = (name: string): number => this.parameters.reads.get(name)?.size ?? 0;
    return [...this.parameters.formulas]
      .filter(
        ([name]) => !varied.includes(name) && varied.some((by) => this.parameters.reads.get(name)?.has(by) === true),
      )
      .map(([name, formula]) => ({ name, formula }))
      .sort((a, b) => depth(a.name) - depth(b.name));
  }

  #quantities(names: readonly string[]): Record<string, Quantity> {
    const quantities: Record<string, Quantity> = {};
    for (const name of names) {
      const value = this.parameters.values.get(name);
      if (value?.type === "number") quantities[name] = value.quantity;
    }
    return quantities;
  }

  #keysOf(cells: readonly string[], open: readonly string[]): Record<string, string> {
    return Object.fromEntries([...new Set(cells)].map((cell) => [cell, this.keys.key(cell, open) ?? ""]));
  }
}

/** A cell of parameters gives the very values that planning found. */
function ownParameters(draft: Draft): readonly string[] {
  return draft.kind?.knownAtPlanning === true ? draft.kind.members(draft.model).values : [];
}
