import type { IncomingMessage } from "node:http";
import { CLOSE, SOCKET_PATHS } from "../../app/editor/protocol.ts";
import type { Database, DocumentName, Role } from "../../db/index.server.ts";

/** Who a request's cookies speak for. The web half of the server knows how sessions are written. */
export interface Visitor {
  readonly id: string;
  readonly name: string;
  readonly sessionHash: string;
}

export type Identify = (cookieHeader: string | undefined) => Promise<Visitor | null>;

export interface Admission {
  readonly admitted: true;
  readonly paperId: string;
  readonly doc: DocumentName;
  /** null: a visitor of the specimen who has not signed in. */
  readonly visitor: Visitor | null;
  /** null: not a member, but the paper is open to all. */
  readonly role: Role | null;
  /** May write the text. */
  readonly writes: boolean;
}

export interface Refusal {
  readonly admitted: false;
  readonly code: number;
  readonly reason: string;
}

const SOCKET_PATH = new RegExp(`^(${SOCKET_PATHS.text}|${SOCKET_PATHS.shown})/([A-Za-z0-9_-]{10,64})$`);

/** Paper and document that a socket's address names; null when it is no socket of ours. */
export function readSocketPath(url: string | undefined): { doc: DocumentName; paperId: string } | null {
  const path = (url ?? "").split("?", 1)[0] ?? "";
  const match = SOCKET_PATH.exec(path);
  const paperId = match?.[2];
  if (!paperId) return null;
  return { doc: match[1] === SOCKET_PATHS.text ? "text" : "shown", paperId };
}

/** The door of the sockets: the page's origin, then the session, then the paper and the role on it. */
export async function admit(
  request: IncomingMessage,
  door: {
    readonly isOwnOrigin: (origin: string | undefined) => boolean;
    readonly identify: Identify;
    readonly papers: Database["papers"];
  },
): Promise<Admission | Refusal> {
  const asked = readSocketPath(request.url);
  if (!asked) return refusal(CLOSE.noSuchPaper, "The address names no paper.");
  const { origin, cookie } = request.headers;
  if (!door.isOwnOrigin(origin)) {
    return refusal(CLOSE.noAccess, "A page of another address asked. Open the paper from this program's own pages.");
  }
  return admitVisitor(asked, await door.identify(cookie), door.papers);
}

/** The door again, for a socket that is open: its session's person, as of now. */
export async function admitVisitor(
  { paperId, doc }: { readonly paperId: string; readonly doc: DocumentName },
  visitor: Visitor | null,
  papers: Database["papers"],
): Promise<Admission | Refusal> {
  const paper = await papers.findFor(paperId, visitor?.id ?? null);
  if (!paper || (paper.role === null && !paper.specimen)) {
    if (!visitor) return refusal(CLOSE.signedOut, "Nobody is signed in.");
    // Whether a paper exists is not told to those who may not open it.
    return refusal(CLOSE.noAccess, "There is no such paper, or it is not open to you.");
  }
  const writes = doc === "text" && (paper.role === "owner" || paper.role === "author");
  return { admitted: true, paperId, doc, visitor, role: paper.role, writes };
}

function refusal(code: number, reason: string): Refusal {
  return { admitted: false, code, reason };
}
