import type { MathNode } from "mathjs/number";

/** Reads one field of a node of mathjs, whose nodes are open objects. */
export function field(node: MathNode, name: string): unknown {
  return Reflect.get(node, name);
}

/** A field that holds a node: the kind of `node` is the caller's warrant that it does. */
export function child(node: MathNode, name: string): MathNode {
  return field(node, name) as MathNode;
}

/** A field that holds nodes, likewise. */
export function children(node: MathNode, name: string): readonly MathNode[] {
  return field(node, name) as readonly MathNode[];
}

/** The index of the token that a placeholder `t7` stands for. */
export function placeholderIndex(node: MathNode): number {
  const match = /^t(\d+)$/.exec(String(field(node, "name")));
  if (match === null) throw new Error(`unexpected name in a ${node.type}`);
  return Number(match[1]);
}
