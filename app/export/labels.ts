import type { PrintedPart, Target } from "../paper/index.ts";

/** Labels and names as LaTeX takes them; those with other characters get a number instead, and no two become one. */
export class LatexNames {
  private readonly names = new Map<string, string>();

  private named(kind: string, name: string): string {
    const key = `${kind}:${name}`;
    const known = this.names.get(key);
    if (known !== undefined) return known;
    const made = /^[A-Za-z0-9][A-Za-z0-9.-]*$/.test(name)
      ? key
      : `${kind}:${this.names.size + 1}-${name.replace(/[^A-Za-z0-9.-]/g, "")}`;
    this.names.set(key, made);
    return made;
  }

  /** Label of a section, an environment or an equation. */
  label(name: string): string {
    return this.named("at", name);
  }

  /** Label of a part of a cell. */
  part(cell: string, noun: PrintedPart["noun"]): string {
    return this.named(noun === "Figure" ? "fig" : "tab", cell);
  }

  /** What a reference to a target names. */
  target(target: Target): string {
    if (target.noun === "Figure" || target.noun === "Table") return this.part(target.label, target.noun);
    return this.label(target.label);
  }

  /** Key of an entry of the bibliography. */
  citation(key: string): string {
    return this.named("ref", key).slice("ref:".length);
  }
}
