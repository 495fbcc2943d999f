import type { Formula, FormulaProblem } from "../formulas/index.ts";
import { parseFormula } from "../formulas/index.ts";
import type { Cell, Problem, Yaml, YamlEntry } from "../paper/index.ts";
import { PRINTED_PARTS } from "../paper/index.ts";
import { didYouMean, isName, listOfNames, nearestFix } from "./names.ts";

/** A cell named in a body, `of: larvae`. In keys it stands for the key of that cell. */
export interface CellReference {
  readonly cell: string;
}

/** A formula of a body with what is needed to check its names: which further names it may use, and where it stands. */
export interface FormulaUse {
  readonly formula: Formula;
  /** Names beside parameters and cells: dummies, earlier keys, names given by `rows`. */
  readonly locals: readonly string[];
  readonly path: string;
  readonly from: number;
  readonly to: number;
  readonly line: number;
  /** Offset in the paper of the formula's first character; null when quoting or folding moved the characters. */
  readonly base: number | null;
}

/** A cell named by a key, and the kinds that will do. */
export interface ReferenceUse {
  readonly id: string;
  readonly kinds: readonly string[];
  /** What is wanted, where the kinds are too many to be named: "a cell with a figure". */
  readonly wanted?: string;
  readonly path: string;
  readonly node: Yaml;
}

/** A name that the body introduces. `varies`: if it is a parameter, that parameter is varied; otherwise it must be new. */
export interface IntroducedName {
  readonly name: string;
  readonly varies: boolean;
  readonly path: string;
  readonly from: number;
  readonly to: number;
  readonly line: number;
}

const DRAWN_KINDS: readonly string[] = Object.entries(PRINTED_PARTS).flatMap(([kind, part]) =>
  part === "figure" ? [kind] : [],
);

type YamlMap = Extract<Yaml, { yaml: "map" }>;
/** A stretch of the paper, for problems. */
export type Place = { readonly from: number; readonly to: number; readonly line: number };

/**
 * Reads one cell's body entry by entry, noting every problem, formula and reference on the way.
 * A reader never throws: what could not be read stands as the number 0 beside its problem, and a cell with a problem never computes.
 */
export class Body {
  readonly problems: Problem[] = [];
  readonly formulas: FormulaUse[] = [];
  readonly references: ReferenceUse[] = [];
  readonly introduced: IntroducedName[] = [];
  /** Where each entry stands, by its path: "drift", "columns.ratio", "" for the cell's opening line. */
  readonly places: Record<string, Place> = {};
  readonly #entries = new Map<string, YamlEntry>();

  constructor(
    readonly cell: Cell,
    readonly text: string,
    readonly map: YamlMap,
    /** Names of the paper's cells: tells a cell from a formula where either may stand. */
    readonly cellNames: ReadonlySet<string> = new Set(),
  ) {
    this.places[""] = this.opening;
    for (const entry of map.entries) {
      this.#entries.set(entry.key, entry);
      this.places[entry.key] = { from: entry.keyFrom, to: entry.keyTo, line: entry.line };
    }
  }

  /** The place of an entry, or of the nearest one around it, or of the cell's opening. */
  placeOf(path: string): Place {
    return (
      this.places[path] ??
      (path === "" ? this.opening : this.placeOf(path.slice(0, Math.max(0, path.lastIndexOf(".")))))
    );
  }

  get entries(): readonly YamlEntry[] {
    return this.map.entries;
  }

  has(key: string): boolean {
    return this.#entries.has(key);
  }

  node(key: string): Yaml | null {
    return this.#entries.get(key)?.value ?? null;
  }

  problem(place: Place, message: string, fix?: Problem["fix"]): void {
    const { from, to, line } = place;
    this.problems.push({ from, to, line, severity: "error", message, cell: this.cell.id, fix });
  }

  /** Where problems of the cell as a whole stand: its opening fence. */
  get opening(): Place {
    const end = this.text.indexOf("\n", this.cell.span.from);
    return { from: this.cell.span.from, to: end < 0 ? this.cell.span.to : end, line: this.cell.span.line };
  }

  /** The words of a scalar. */
  scalar(node: Yaml, what: string): string | null {
    if (node.yaml === "scalar") return node.text;
    this.problem(node, `A ${node.yaml} stands where ${what} is expected.`);
    return null;
  }

  /** One of a few words. */
  choice(key: string, choices: readonly string[], fallback: string): string {
    const node = this.node(key);
    if (node === null) return fallback;
    const text = this.scalar(node, `one of ${listOfNames(choices, "or")}`);
    if (text === null || choices.includes(text)) return text ?? fallback;
    this.problem(
      node,
      `\`${text}\` is not a choice for \`${key}\`: it may be ${listOfNames(choices, "or")}.${didYouMean(text, choices)}`,
    );
    return fallback;
  }

  /** The formula under a key, or the one that stands when the key is absent, as it would be written. */
  formula(key: string, fallback: string, locals: readonly string[] = []): Formula {
    const node = this.node(key);
    if (node !== null) return this.formulaAt(node, key, locals);
    const parsed = parsedFormula(fallback);
    return parsed.ok ? parsed.formula : NOTHING;
  }

  /** The formula written at a node. `path` names it for failures: "columns.ratio". */
  formulaAt(node: Yaml, path: string, locals: readonly string[] = []): Formula {
    this.places[path] = node;
    const source = this.scalar(node, "a formula");
    return source === null ? NOTHING : this.#parse(source, node, this.#baseOf(node, source), path, locals);
  }

  /** The formula that a map's key is: a position in `start: {1: 3, x0: 2}`. */
  formulaInKey(entry: YamlEntry, path: string): Formula {
    const { key: text, keyFrom: from, keyTo: to, line } = entry;
    return this.formulaAt({ yaml: "scalar", text, quoted: false, from, to, line }, path);
  }

  /** `a to b` at a node; null when it is no interval (and nothing is noted: lists may stand there too). */
  intervalAt(node: Yaml, path: string, locals: readonly string[] = []): { from: Formula; to: Formula } | null {
    if (node.yaml !== "scalar") return null;
    const parts = /^(.*\S)\s+to\s+(\S.*)$/s.exec(node.text);
    const [, first, second] = parts ?? [];
    if (first === undefined || second === undefined) return null;
    this.places[path] = node;
    const base = this.#baseOf(node, node.text);
    const secondAt = node.text.length - second.length;
    return {
      from: this.#parse(first, node, base, path, locals),
      to: this.#parse(second, node, base === null ? null : base + secondAt, path, locals),
    };
  }

  /** The formulas of a list; one formula alone counts as a list of one. */
  listAt(node: Yaml, path: string, locals: readonly string[] = []): Formula[] {
    if (node.yaml === "map") {
      this.problem(node, `A map stands where a list is expected: write [a, b, c], or one value a line after a dash.`);
      return [];
    }
    const items = node.yaml === "list" ? node.items : [node];
    if (items.length === 0) this.problem(node, "The list is empty; it needs at least one value.");
    return items.map((item, index) => this.formulaAt(item, `${path}.${index}`, locals));
  }

  /** Entries of a map under a key, or null with the problem noted. */
  mapAt(node: Yaml, what: string): readonly YamlEntry[] | null {
    if (node.yaml === "map") return node.entries;
    this.problem(node, `A ${node.yaml} stands where ${what} is expected.`);
    return null;
  }

  /** The cell named under a key. */
  reference(key: string, kinds: readonly string[]): CellReference {
    const node = this.node(key);
    const id = node === null ? null : this.scalar(node, `the name of a ${kinds.join(" or ")} cell`);
    if (node === null || id === null) return { cell: "" };
    this.references.push({ id, kinds, path: key, node });
    return { cell: id };
  }

  /** A cell with a figure of its own, named at a node. */
  drawnCellAt(node: Yaml, path: string): CellReference {
    this.places[path] = node;
    const wanted = "a cell with a figure";
    const id = this.scalar(node, `the name of ${wanted}`);
    if (id === null) return { cell: "" };
    this.references.push({ id, kinds: DRAWN_KINDS, wanted, path, node });
    return { cell: id };
  }

  /** A new name (of a column, a key, a dummy), checked for its letters here and against the paper's names later. */
  introduce(entry: YamlEntry, path: string, varies: boolean): void {
    const place = { from: entry.keyFrom, to: entry.keyTo, line: entry.line };
    this.places[path] = place;
    if (isName(entry.key)) this.introduced.push({ name: entry.key, varies, path, ...place });
    else
      this.problem(
        place,
        `\`${entry.key}\` is not a name: names are letters, digits and underscores, starting with a letter.`,
      );
  }

  /** A name alone under a key, `vary: mu`: a parameter, which is then varied, or a new name. "" where none can be read. */
  variedName(key: string): string {
    const node = this.node(key);
    const name = node === null ? null : this.scalar(node, "the name of a parameter, or a new name");
    if (node === null || name === null) return "";
    if (isName(name))
      this.introduced.push({ name, varies: true, path: key, from: node.from, to: node.to, line: node.line });
    else
      this.problem(
        node,
        `\`${name}\` is not a name: names are letters, digits and underscores, starting with a letter.`,
      );
    return name;
  }

  /** A name that has a meaning of its own under this key; a parameter or cell of that name would be hidden by it. */
  introduceWord(name: string, node: Yaml, path: string): void {
    this.introduced.push({ name, varies: false, path, from: node.from, to: node.to, line: node.line });
  }

  /** Notes keys of a map that are not allowed there. */
  onlyKeys(entries: readonly YamlEntry[], allowed: readonly string[], owner: string): void {
    for (const entry of entries) {
      if (allowed.includes(entry.key)) continue;
      const place = { from: entry.keyFrom, to: entry.keyTo, line: entry.line };
      const message = `\`${entry.key}\` is not a key of ${owner}, which takes ${listOfNames(allowed)}.${didYouMean(entry.key, allowed)}`;
      this.problem(place, message, nearestFix(entry.key, allowed, place));
    }
  }

  #parse(source: string, node: Yaml, base: number | null, path: string, locals: readonly string[]): Formula {
    const place = { from: node.from, to: node.to, line: node.line };
    if (source.trim() === "") {
      this.problem(place, "Nothing stands here; a formula or a number is expected.");
      return NOTHING;
    }
    const parsed = parsedFormula(source);
    if (!parsed.ok) {
      this.problem(this.#placeIn(place, base, parsed.problem), parsed.problem.message);
      return NOTHING;
    }
    this.formulas.push({ formula: parsed.formula, locals, path, ...place, base });
    return parsed.formula;
  }

  #placeIn(place: Place, base: number | null, problem: FormulaProblem): Place {
    if (base === null) return place;
    const from = Math.min(base + problem.from, place.to);
    return { from, to: Math.max(from, Math.min(base + problem.to, place.to)), line: place.line };
  }

  /** Where the scalar's first character stands in the paper; null when YAML's quoting or folding changed the text. */
  #baseOf(node: Yaml, source: string): number | null {
    if (this.text.startsWith(source, node.from)) return node.from;
    return this.text.startsWith(source, node.from + 1) ? node.from + 1 : null;
  }
}

const NOTHING: Formula = { node: "number", value: 0 };

/** Parsing is pure, and a paper is read again at each keystroke: recent formulas are remembered. */
const remembered = new Map<string, ReturnType<typeof parseFormula>>();
const REMEMBERED_FORMULAS = 4096;

/** `parseFormula`, remembering what it gave for the same source. */
export function parsedFormula(source: string): ReturnType<typeof parseFormula> {
  const known = remembered.get(source);
  if (known !== undefined) return known;
  if (remembered.size >= REMEMBERED_FORMULAS) remembered.clear();
  const parsed = parseFormula(source);
  remembered.set(source, parsed);
  return parsed;
}
