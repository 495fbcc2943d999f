import type { Cause, CellState, CellWork, ShownCell } from "../../cells/index.ts";
import type { Run } from "../model/types.ts";

/** What the words on a cell's state are made from. */
export interface Telling {
  readonly state: CellState;
  readonly shown: ShownCell | undefined;
  readonly work: CellWork | undefined;
  /** What computing it costs, where it varies something; "" otherwise. */
  readonly cost: string;
  /** "Figure 1" for the id of a cell. */
  titleOf(id: string): string;
  /** A parameter's value as the rule shows it: "1.90". */
  printed(name: string, words: string): string;
  /** Source line of the cell's fence. */
  readonly firstLine: number;
  readonly now: Date;
}

/** The sentences that stand beneath a cell's caption, in design's words. A current cell has none: silence means sound. */
export function stateWords(telling: Telling): Run[] {
  return WORDS[telling.state.state](telling);
}

const WORDS: Readonly<Record<CellState["state"], (telling: Telling) => Run[]>> = {
  current: () => [],
  outOfDate: (telling) => withCost(causeWords(telling.state.causes, telling), telling),
  stands({ state, shown, printed }) {
    const parameters = state.causes.filter((cause) => cause.cause === "parameter");
    const by = shown?.stands === undefined ? "" : `, by ${shown.stands.by}`;
    return parameters.length === 0
      ? [text(`Stands as it was${by}.`)]
      : [
          text("Stands with "),
          ...joined(parameters.map(({ name, symbol, was }) => [math(symbol), text(` = ${printed(name, was)}`)])),
          text(`${by}.`),
        ];
  },
  computing({ work, now }) {
    if (work?.state !== "computing") return [text("Being computed.")];
    const parts = work.total > 1 ? `${work.done} of ${work.total}. ` : "";
    return [text(`${parts}Begun by ${work.by}, ${moment(work.begun, now)}`)];
  },
  waiting({ state, work, titleOf, now }) {
    const needs = state.waitsFor.map(titleOf);
    const begun = work?.state === "waiting" ? ` Asked by ${work.by}, ${moment(work.begun, now)}.` : "";
    return [text(needs.length === 0 ? `Waits its turn.${begun}` : `Needs ${listed(needs)} first.${begun}`)];
  },
  failed: ({ state, firstLine }) => [
    text(state.failure === null ? "It could not be computed." : lineWords(state.failure, firstLine)),
  ],
  cancelled({ work, shown, now }) {
    const by = work?.state === "cancelled" ? ` by ${work.by}, ${moment(work.at, now)}` : "";
    const kept = shown === undefined ? "" : ` The result from ${moment(shown.at, now)} is kept.`;
    return [text(`Cancelled${by}.${kept}`)];
  },
  empty: (telling) => withCost([text("Not computed yet.")], telling),
};

/** What varying will cost is told before it is asked for. */
function withCost(runs: readonly Run[], { cost }: Telling): Run[] {
  return cost === "" ? [...runs] : [...runs, text(` ${cost}`)];
}

/** Lines of a working count from its first. */
function lineWords({ line, message }: { readonly line: number; readonly message: string }, firstLine: number): string {
  return /^line \d/i.test(message) ? message : `Line ${line - firstLine + 1}: ${message}`;
}

/** "Set with μ = 1.90; μ is now 2.00 (Tormod, 14:30)." and the other causes, each a sentence. */
function causeWords(causes: readonly Cause[], { titleOf, printed, now }: Telling): Run[] {
  const parameters = causes.filter((cause) => cause.cause === "parameter");
  const sentences: Run[][] = [];
  if (parameters.length > 0) {
    sentences.push([
      text("Set with "),
      ...joined(parameters.map(({ name, symbol, was }) => [math(symbol), text(` = ${printed(name, was)}`)])),
      text("; "),
      ...joined(
        parameters.map(({ name, symbol, now: value, by, at }) => [
          math(symbol),
          text(
            ` is now ${printed(name, value)}${by === null ? "" : ` (${by}${at === null ? "" : `, ${moment(at, now)}`})`}`,
          ),
        ]),
      ),
      text("."),
    ]);
  }
  for (const cause of causes) {
    if (cause.cause === "working") sentences.push([text("Its working was changed.")]);
    if (cause.cause === "solver") sentences.push([text(`The solver is newer (${cause.was} → ${cause.now}).`)]);
    if (cause.cause === "needs") sentences.push([text(`${titleOf(cause.id)}, which it reads, was changed.`)]);
  }
  return sentences.flatMap((sentence, at) => (at === 0 ? sentence : [text(" "), ...sentence]));
}

/** "14:30" today, "3 Dec 14:30" before. */
export function moment(iso: string, now: Date): string {
  const time = new Date(iso);
  if (Number.isNaN(time.getTime())) return iso;
  const clock = `${String(time.getHours()).padStart(2, "0")}:${String(time.getMinutes()).padStart(2, "0")}`;
  if (time.toDateString() === now.toDateString()) return clock;
  const year = time.getFullYear() === now.getFullYear() ? "" : ` ${time.getFullYear()}`;
  return `${time.getDate()} ${MONTHS[time.getMonth()]}${year} ${clock}`;
}

const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

function text(value: string): Run {
  return { run: "text", text: value };
}

function math(tex: string): Run {
  return { run: "math", tex };
}

function joined(parts: readonly Run[][]): Run[] {
  return parts.flatMap((part, at) => (at === 0 ? part : [text(at === parts.length - 1 ? " and " : ", "), ...part]));
}

function listed(things: readonly string[]): string {
  return things.length < 2 ? (things[0] ?? "") : `${things.slice(0, -1).join(", ")} and ${things.at(-1)}`;
}
