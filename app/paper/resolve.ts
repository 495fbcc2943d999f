import type { Reading } from "./reading.ts";
import { didYouMean } from "./spelling.ts";
import type { BibliographyEntry, Target } from "./types.ts";
import type { PaperNode } from "./walk.ts";
import { walk } from "./walk.ts";

/** Finds the target of every reference and the entries of every citation; what is not found is reported. */
export function resolveMarks(
  reading: Reading,
  nodes: readonly PaperNode[],
  targets: ReadonlyMap<string, Target>,
  silent: ReadonlySet<string>,
  bibliography: readonly BibliographyEntry[],
): void {
  const entries = new Map(bibliography.map((entry) => [entry.key, entry]));
  walk(nodes, (node) => {
    if (node.type === "reference") {
      node.target = targets.get(node.label) ?? null;
      if (node.target === null && node.label !== "") {
        reading.report(reading.from(node), reading.to(node), missingTarget(node.label, targets, silent));
      }
    }
    if (node.type === "citation") {
      node.entries = node.keys.flatMap((key) => entries.get(key) ?? []);
      for (const key of node.keys) {
        if (entries.has(key)) continue;
        const message = `The bibliography has no entry “${key}”.${didYouMean(key, entries.keys())}`;
        reading.report(reading.from(node), reading.to(node), message);
      }
    }
  });
}

function missingTarget(label: string, targets: ReadonlyMap<string, Target>, silent: ReadonlySet<string>): string {
  if (silent.has(label)) {
    return `The cell “${label}” prints nothing, so there is nothing to refer to. Let it print with “show: figure” or “show: table”.`;
  }
  return `Nothing that is printed is labelled “${label}”.${didYouMean(label, targets.keys())}`;
}

/** The keys that a paper cites. */
export function citedKeys(nodes: readonly PaperNode[]): Set<string> {
  const keys = new Set<string>();
  walk(nodes, (node) => {
    if (node.type === "citation") for (const key of node.keys) keys.add(key);
  });
  return keys;
}
