import type { RootContent } from "mdast";
import { ENVIRONMENTS } from "./environments.ts";
import type { CellNode, EnvironmentNode, PrintedPart } from "./nodes.ts";
import { printedParts } from "./printed.ts";
import type { Reading } from "./reading.ts";
import type { Target } from "./types.ts";

export interface Numbering {
  readonly targets: ReadonlyMap<string, Target>;
  /** Names of cells that print nothing: references to them are explained. */
  readonly silent: ReadonlySet<string>;
}

/**
 * Numbers sections, surroundings, equations, figures and tables in the order of the text, and gathers what can be
 * referred to. Surroundings share one counter that begins anew with each section, as in amsthm (before any section:
 * "0.1"); equations, figures and tables are counted through the paper.
 */
export function numberPaper(reading: Reading, nodes: readonly RootContent[]): Numbering {
  return new Counter(reading, nodes).count(nodes);
}

class Counter {
  private readonly targets = new Map<string, Target>();
  /** Every label and name so far, with the line where it was given. */
  private readonly labels = new Map<string, { line: number; what: string }>();
  private readonly silent = new Set<string>();
  private readonly sections: number[] = [];
  private readonly topDepth: number;
  private surroundings = 0;
  private equations = 0;
  private readonly printed = { Figure: 0, Table: 0 };

  constructor(
    private readonly reading: Reading,
    nodes: readonly RootContent[],
  ) {
    const depths = nodes.flatMap((node) => (node.type === "heading" ? [node.depth] : []));
    this.topDepth = Math.min(6, ...depths);
  }

  count(nodes: readonly RootContent[]): Numbering {
    for (const node of nodes) {
      if (node.type === "heading") this.heading(node);
      else this.visit(node);
    }
    return { targets: this.targets, silent: this.silent };
  }

  private visit(node: RootContent): void {
    switch (node.type) {
      case "environment":
        this.environment(node);
        break;
      case "math":
        if (node.data?.label === undefined) break;
        this.equations++;
        node.data.number = String(this.equations);
        this.register(node.data.label, "equation", node.data.number, node);
        break;
      case "cell":
        this.cell(node);
        break;
      case "heading": {
        const label = node.data?.label;
        if (!label) break;
        const message = `This heading stands inside something else and has no number, so “${label}” cannot label it.`;
        this.reading.report(this.reading.from(node), this.reading.to(node), message);
        break;
      }
      case "blockquote":
      case "list":
      case "listItem":
      case "footnoteDefinition":
        for (const child of node.children) this.visit(child);
        break;
    }
  }

  private heading(node: Extract<RootContent, { type: "heading" }>): void {
    const level = node.depth - this.topDepth;
    while (this.sections.length <= level) this.sections.push(0);
    this.sections.length = level + 1;
    this.sections[level] = (this.sections[level] ?? 0) + 1;
    if (level === 0) this.surroundings = 0;
    const number = this.sections.join(".");
    node.data = { ...node.data, number };
    if (node.data.label) this.register(node.data.label, "Section", number, node);
  }

  private environment(node: EnvironmentNode): void {
    const noun = ENVIRONMENTS[node.environment];
    if (noun !== "Proof") {
      this.surroundings++;
      node.number = `${this.sections[0] ?? 0}.${this.surroundings}`;
      if (node.label !== null) this.register(node.label, noun, node.number, node);
    }
    for (const child of node.children) this.visit(child);
  }

  private cell(node: CellNode): void {
    const { kind, body, name } = node.cell;
    const parts = printedParts(kind, body).map((part): PrintedPart => {
      const noun = part === "figure" ? "Figure" : "Table";
      this.printed[noun]++;
      return { part, noun, number: String(this.printed[noun]) };
    });
    node.parts = parts;
    if (name === null) return;
    const principal = parts.find((part) => part.part === "figure") ?? parts[0];
    if (principal !== undefined) this.register(name, principal.noun, principal.number, node);
    else if (this.claim(name, node, true)) this.silent.add(name);
  }

  private register(label: string, noun: Target["noun"], number: string, node: RootContent): void {
    if (!this.claim(label, node, node.type === "cell")) return;
    this.targets.set(label, { label, noun, number, span: this.reading.span(node) });
  }

  /** Whether a label is still free. Two cells of one name are reported where names are checked, with parameters. */
  private claim(label: string, node: RootContent, isCell: boolean): boolean {
    const from = this.reading.from(node);
    const line = this.reading.lines.lineAt(from);
    const taken = this.labels.get(label);
    if (taken === undefined) {
      this.labels.set(label, { line, what: isCell ? "cell" : "label" });
      return true;
    }
    if (!(isCell && taken.what === "cell")) {
      const message = `“${label}” is the name of a ${taken.what} in line ${taken.line} already. Labels and names of cells are given once.`;
      const end = this.reading.text.slice(from).search(/[\r\n]|$/);
      this.reading.report(from, from + end, message);
    }
    return false;
  }
}
