import { createContext } from "react-router";
import type { Database } from "../db/index.server.ts";
import type { CellResult, CellWork, ParameterChange, ShownCell } from "./cells/index.ts";

/**
 * What a request needs, set in one place (server/app.ts) and read by guards and routes.
 * The interfaces here are what the server promises to the routes; server/ implements them.
 */

/** Who is asking. */
export interface Person {
  readonly id: string;
  /** As coauthors see it. */
  readonly name: string;
  readonly email: string | null;
}

/** A paper's live text and its BibTeX. */
export interface PaperText {
  readonly text: string;
  readonly bibliography: string;
}

/** What a paper shows: the plain form of its "shown" document. */
export interface ShownPaper {
  readonly cells: Readonly<Record<string, ShownCell>>;
  readonly work: Readonly<Record<string, CellWork>>;
  readonly changes: Readonly<Record<string, ParameterChange>>;
}

export interface TextService {
  /** The committed text. Throws when the paper has none. */
  read(paperId: string): Promise<PaperText>;
  /** First text of a paper whose row exists; `personId` null for texts that came with the program. */
  create(paperId: string, text: PaperText, personId: string | null): Promise<void>;
  shown(paperId: string): Promise<ShownPaper>;
  /** Closes the live sockets of a person (of everybody when null) after a change of role, so that the role is read again. */
  closeSockets(paperId: string, personId: string | null): Promise<void>;
  /** Closes the live sockets that were opened under a session that has ended. */
  closeSession(sessionHash: string): Promise<void>;
}

export interface ComputeRequest {
  readonly paperId: string;
  readonly person: Person;
  /** The text the page planned; the server plans it again. */
  readonly text: PaperText;
  readonly cells: readonly string[] | "all";
  /** Compute again even where a result is kept under the key. */
  readonly force?: boolean;
}

export interface ComputeService {
  /** Begins, and returns at once; what comes is told through the shown document. */
  compute(
    request: ComputeRequest,
  ): Promise<{ readonly accepted: readonly string[]; readonly refused?: { readonly reason: string } }>;
  cancel(request: { paperId: string; person: Person; cells: readonly string[] | "all" }): Promise<void>;
  /** Lets an out-of-date result stand; resolves to the reason when it may not. */
  stand(request: { paperId: string; person: Person; cell: string; text: string }): Promise<{ refused?: string }>;
  /** Results by key; keys this paper has never shown or computed are left out. */
  results(paperId: string, keys: readonly string[]): Promise<Readonly<Record<string, CellResult>>>;
}

/** A LaTeX source and the way back from its lines to the paper's. */
export interface LatexSource {
  readonly files: readonly { readonly name: string; readonly text: string }[];
  /** Line of the paper's text for a line of main.tex, or null. */
  lineMap(texLine: number): number | null;
}

export interface PdfService {
  typeset(
    source: LatexSource,
  ): Promise<
    | { readonly ok: true; readonly pdf: Uint8Array }
    | { readonly ok: false; readonly problems: readonly { readonly line: number | null; readonly message: string }[] }
  >;
}

/** The part of the environment that routes may know. */
export interface AppConfig {
  /** demo and test use a stand-in for GitHub and say so on the page. */
  readonly standIn: boolean;
  /** "https://halfline.example": where this program is reached. */
  readonly publicOrigin: string;
  /** Cookies only over TLS; false only on loopback. */
  readonly secureCookies: boolean;
  readonly sessionSecret: string;
  readonly github: {
    readonly clientId: string;
    readonly clientSecret: string;
    /** "https://github.com" */
    readonly signInBase: string;
    /** "https://api.github.com" */
    readonly apiBase: string;
  };
}

export interface Services {
  readonly texts: TextService;
  readonly compute: ComputeService;
  readonly pdf: PdfService;
  readonly config: AppConfig;
  readonly log: Log;
}

/** The few words of the logger that routes need. */
export interface Log {
  info(details: object, message: string): void;
  warn(details: object, message: string): void;
  error(details: object, message: string): void;
}

export const databaseContext = createContext<Database>();
export const servicesContext = createContext<Services>();
/** null: nobody is signed in. */
export const personContext = createContext<Person | null>(null);
/** True for pages and for the data of pages; false for what scripts and programs ask for. */
export const pageRequestContext = createContext<boolean>(false);
/** Of this response's content security policy. */
export const nonceContext = createContext<string>("");
