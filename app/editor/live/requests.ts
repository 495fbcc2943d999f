import type { CellResult } from "../../cells/index.ts";

/** The resource routes of one paper, as the sheet asks them. Every refusal comes back as words for the person. */
export interface Requests {
  compute(text: string, bibliography: string, cells: readonly string[]): Promise<Answer>;
  cancel(cells: readonly string[] | "all"): Promise<Answer>;
  letStand(cell: string, text: string): Promise<Answer>;
  /** Results kept under these keys; those that are not kept are left out. */
  results(keys: readonly string[]): Promise<readonly CellResult[]>;
}

/** null: done as asked. */
export type Answer = { readonly refused: string } | null;

/** Keys in one address: 25 of 64 letters stay well below what servers take. */
const KEYS_AT_ONCE = 25;

export function requestsOf(paperId: string): Requests {
  const place = `/papers/${encodeURIComponent(paperId)}`;
  return {
    compute: (text, bibliography, cells) => post(`${place}/compute`, { text, bibliography, cells }),
    cancel: (cells) => post(`${place}/cancel`, { cells }),
    letStand: (cell, text) => post(`${place}/stand`, { cell, text }),
    async results(keys) {
      const parts = Array.from({ length: Math.ceil(keys.length / KEYS_AT_ONCE) }, (_, at) =>
        keys.slice(at * KEYS_AT_ONCE, (at + 1) * KEYS_AT_ONCE),
      );
      const found = await Promise.all(
        parts.map(async (asked) => {
          const address = `${place}/results?keys=${asked.join(",")}`;
          const response = await fetch(address, { headers: { accept: "application/json" } });
          if (!response.ok) throw new Error(wordsOf(response.status));
          const results: Readonly<Record<string, CellResult>> = await response.json();
          return Object.values(results);
        }),
      );
      return found.flat();
    },
  };
}

async function post(address: string, body: object): Promise<Answer> {
  try {
    const response = await fetch(address, {
      method: "POST",
      headers: { "content-type": "application/json", accept: "application/json" },
      body: JSON.stringify(body),
    });
    const told: unknown = await response.json().catch(() => null);
    const reason = reasonIn(told);
    if (reason !== null) return { refused: reason };
    return response.ok ? null : { refused: wordsOf(response.status) };
  } catch {
    return { refused: "No connection. Your words are kept on this machine; recomputing waits." };
  }
}

/** `{refused: {reason}}` or `{refused: "…"}`, as the routes answer. */
function reasonIn(told: unknown): string | null {
  if (typeof told !== "object" || told === null || !("refused" in told)) return null;
  const { refused } = told;
  if (typeof refused === "string") return refused;
  if (typeof refused === "object" && refused !== null && "reason" in refused && typeof refused.reason === "string") {
    return refused.reason;
  }
  return null;
}

function wordsOf(status: number): string {
  if (status === 401) return "Your session has ended. Sign in again; your words are kept on this machine.";
  if (status === 403 || status === 404) return "This paper is not open to you any more.";
  if (status === 413) return "The text is longer than a paper may be.";
  if (status === 429) return "Too much was asked at once. Wait a moment and ask again.";
  return "The server could not take this. Ask again in a moment.";
}
