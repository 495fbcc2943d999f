import * as Y from "yjs";
import { listed } from "../parts/words.ts";

/** An edit so near to where the last one ended is of the same change: a word that is typed, and mended while typing. */
const NEAR = 1;

/** Counts what was written on both sides of a lost connection, to be told when they are joined. */
export class JoinedChanges {
  private own = 0;
  private last: { readonly text: unknown; readonly at: number } | null = null;
  /** By the client that wrote them. */
  private readonly others = new Map<number, number>();

  /** Notes an edit made on this page. Edits that follow on each other are one change. */
  noteOwn(event: Y.YTextEvent): void {
    let at = 0;
    for (const { retain = 0, insert, delete: gone } of event.delta) {
      at += retain;
      if (insert === undefined && gone === undefined) continue;
      const near = this.last?.text === event.target && Math.abs(at - this.last.at) <= NEAR;
      if (!near) this.own += 1;
      at += typeof insert === "string" ? insert.length : 0;
      this.last = { text: event.target, at };
    }
  }

  /** Notes what the server had of others: a stretch that somebody wrote in one go is one change. */
  noteOthers(update: Uint8Array): void {
    for (const struct of Y.decodeUpdate(update).structs) {
      if (!(struct instanceof Y.Item) || struct.content instanceof Y.ContentDeleted) continue;
      const { client } = struct.id;
      this.others.set(client, (this.others.get(client) ?? 0) + 1);
    }
  }

  /**
   * "12 changes by you and 3 by Tormod were joined."; null when there was nothing to join.
   * @param nameOf of the person who wrote as a client; undefined: not known
   */
  words(nameOf: (client: number) => string | undefined): string | null {
    const counts = new Map<string, number>(this.own === 0 ? [] : [["you", this.own]]);
    const rest = new Map<string, number>();
    for (const [client, count] of this.others) {
      const name = nameOf(client) ?? "others";
      rest.set(name, (rest.get(name) ?? 0) + count);
    }
    for (const [name, count] of [...rest].sort(byName)) counts.set(name, count);
    const total = [...counts.values()].reduce((sum, count) => sum + count, 0);
    if (total === 0) return null;
    const told = [...counts].map(([who, count], at) =>
      at === 0 ? `${count} ${count === 1 ? "change" : "changes"} by ${who}` : `${count} by ${who}`,
    );
    return `${listed(told)} ${total === 1 ? "was" : "were"} joined.`;
  }
}

/** Those whose name is not known come last. */
function byName([a]: readonly [string, number], [b]: readonly [string, number]): number {
  if (a === "others" || b === "others") return a === b ? 0 : a === "others" ? 1 : -1;
  return a.localeCompare(b);
}
