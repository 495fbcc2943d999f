import type { ParameterChange } from "../../app/cells/index.ts";
import { planPaper } from "../../app/cells/index.ts";
import { BIBLIOGRAPHY_NAME, TEXT_NAME } from "../../app/editor/protocol.ts";
import { readPaper, UNTITLED } from "../../app/paper/index.ts";
import type { Author, Commit, Room } from "./room.ts";

/** A burst of typing is over after this; then a parameter's change is told with the value from before the burst. */
const BURST_MS = 400;
/** Title and authors on the shelf follow the text after this. */
const DESCRIBE_MS = 1_500;

export interface WatchOptions {
  /** A parameter was given another value. */
  changed(paperId: string, changes: Readonly<Record<string, ParameterChange>>): Promise<void>;
  /** The text changed, and this is what it says of itself now. */
  describe(paperId: string, words: { title: string; authors: string }): Promise<void>;
  onProblem(error: unknown, where: string): void;
}

interface Watched {
  /** Sources of the parameters before the present burst. */
  sources: ReadonlyMap<string, string>;
  /** The parameters' cells as they stand now, verbatim. */
  cells: string;
  burst: { readonly author: Author | null; timer: NodeJS.Timeout } | null;
  describing: NodeJS.Timeout | null;
}

/**
 * Watches the texts of papers: who changed which parameter from what, and what title and authors a text gives.
 * A paper is read again only where the part in question has changed, since this runs beside every edit.
 */
export class TextWatch {
  readonly #options: WatchOptions;
  readonly #watched = new Map<Room, Watched>();

  constructor(options: WatchOptions) {
    this.#options = options;
  }

  begin(room: Room): void {
    if (room.name !== "text") return;
    const cells = parameterCells(textOf(room));
    this.#watched.set(room, { cells, sources: parameterSources(cells), burst: null, describing: null });
  }

  committed(commit: Commit, room: Room): void {
    const watched = this.#watched.get(room);
    if (!watched) return;
    const author = commit.authors.findLast((one) => one !== null) ?? null;
    watched.describing ??= setTimeout(() => this.#describe(room), DESCRIBE_MS);

    const cells = parameterCells(textOf(room));
    if (cells === watched.cells) return;
    if (watched.burst && watched.burst.author?.id !== author?.id) this.#settle(room);
    if (watched.burst) clearTimeout(watched.burst.timer);
    watched.cells = cells;
    watched.burst = { author, timer: setTimeout(() => this.#settle(room), BURST_MS) };
  }

  /** Tells what is still to be told, and forgets the room. */
  end(room: Room): void {
    const watched = this.#watched.get(room);
    if (!watched) return;
    this.#settle(room);
    if (watched.describing) this.#describe(room);
    this.#watched.delete(room);
  }

  #settle(room: Room): void {
    const watched = this.#watched.get(room);
    if (!watched?.burst) return;
    const { author, timer } = watched.burst;
    clearTimeout(timer);
    watched.burst = null;
    const former = watched.sources;
    const now = parameterSources(watched.cells);
    // One that is away (its line is being rewritten, or the cell cannot be read just now) keeps what it had.
    watched.sources = new Map([...former, ...now]);
    // What another process took in, it has told itself.
    if (!author) return;
    const changes: Record<string, ParameterChange> = {};
    for (const [name, source] of now) {
      const was = former.get(name);
      if (was !== undefined && was !== source) changes[name] = { by: author.name, at: new Date().toISOString(), was };
    }
    if (Object.keys(changes).length === 0) return;
    this.#options.changed(room.paperId, changes).catch((error) => this.#options.onProblem(error, "parameter changes"));
  }

  #describe(room: Room): void {
    const watched = this.#watched.get(room);
    if (!watched) return;
    if (watched.describing) clearTimeout(watched.describing);
    watched.describing = null;
    const { front } = readPaper(frontMatter(textOf(room)), "");
    const title = front.title.trim() === "" ? UNTITLED : front.title;
    const words = { title, authors: front.authors.map(({ name }) => name).join(", ") };
    this.#options.describe(room.paperId, words).catch((error) => this.#options.onProblem(error, "description"));
  }
}

/** The paper's Markdown as this process holds it. */
export function textOf(room: Room): string {
  return room.doc.getText(TEXT_NAME).toString();
}

/** The paper's BibTeX, likewise. */
export function bibliographyOf(room: Room): string {
  return room.doc.getText(BIBLIOGRAPHY_NAME).toString();
}

/** The fenced blocks whose info string begins with `parameters`, verbatim. */
function parameterCells(text: string): string {
  const blocks = text.matchAll(/^ {0,3}(`{3,}|~{3,})[ \t]*parameters\b[^\n]*\n[\s\S]*?^ {0,3}\1[`~]*[ \t]*$/gm);
  return [...blocks].map(([block]) => block).join("\n\n");
}

/** Name → source of its formula. */
function parameterSources(cells: string): ReadonlyMap<string, string> {
  if (cells === "") return new Map();
  const { parameters } = planPaper(readPaper(cells, ""));
  return new Map(parameters.map(({ name, source }) => [name, source]));
}

function frontMatter(text: string): string {
  return /^---[ \t]*\r?\n[\s\S]*?\n---[ \t]*(?:\r?\n|$)/.exec(text)?.[0] ?? "";
}
