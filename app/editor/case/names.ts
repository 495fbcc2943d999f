import type { CaseKnowledge } from "./types.ts";

const CELL = /^ {0,3}(`{3,}|~{3,})(.*)\n([\s\S]*?)(?:^ {0,3}\1|$(?![\s\S]))/gm;

/** Every name that stands in a working of a text, be it a key, a cell or part of a formula; what is read of a cell is none. */
export function namesWritten(text: string): ReadonlySet<string> {
  const written = new Set<string>();
  for (const [, , info = "", body = ""] of text.matchAll(CELL)) {
    for (const [name] of `${info}\n${body}`.matchAll(/(?<![\w.])[A-Za-z]\w*/g)) written.add(name);
  }
  return written;
}

/** Names that what is new in a paper must not take. */
export function namesTaken(knowledge: CaseKnowledge): Set<string> {
  return namesHidden(knowledge, [
    ...knowledge.taken,
    ...knowledge.words.kinds.map(({ name }) => name),
    ...knowledge.names.labels.map(({ label }) => label),
  ]);
}

/** Names that a column, a key or a new variable must not have, and others. */
export function namesHidden({ names, words }: CaseKnowledge, others: Iterable<string>): Set<string> {
  const own = [...names.parameters, ...names.cells, ...words.functions].map(({ name }) => name);
  return new Set([...own, ...others]);
}

/** A name that begins like `base` and is free: K, then K2, K3, … It is taken from then on. */
export function takeName(base: string, taken: Set<string>): string {
  let name = base;
  for (let count = 2; taken.has(name); count += 1) name = `${base}${count}`;
  taken.add(name);
  return name;
}
