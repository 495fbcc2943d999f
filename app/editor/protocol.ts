/**
 * The words that a page and the server speak over a paper's live sockets. Constants only: both sides import this file.
 *
 * Addresses: `/sync/text/<paper>` (the Y.Doc with the Y.Texts "text" and "bibliography"; written by owner and authors)
 * and `/sync/shown/<paper>` (what the paper shows; written by the server alone). Frames are those of y-websocket:
 * a varuint message type, then its body.
 */
export const SOCKET_PATHS = { text: "/sync/text", shown: "/sync/shown" } as const;

/** Names of the shared types in the "text" document. */
export const TEXT_NAME = "text";
export const BIBLIOGRAPHY_NAME = "bibliography";

/** Names of the Y.Maps in the "shown" document: slot → ShownCell, slot → CellWork, parameter → ParameterChange. */
export const SHOWN_NAMES = { cells: "cells", work: "work", changes: "changes" } as const;

/** Message types of y-protocols … */
export const MESSAGE_SYNC = 0;
export const MESSAGE_AWARENESS = 1;
export const MESSAGE_QUERY_AWARENESS = 3;
/**
 * … and ours, sent by the server to a writer after the commit of what it sent. Body:
 *
 *     varuint8array  state vector of everything that is committed
 *     varuint        1 when the page's own state at connection (its sync step 2) is committed, else 0
 *     varuint        how many update frames of this connection are committed
 *
 * A state vector does not count deletions, so a page's words are all kept when it has joined and the last number
 * equals the number of update frames that it sent on this connection (`watchKept` in kept.ts counts).
 */
export const MESSAGE_KEPT = 100;

/** Why the server closed a socket. y-websocket tries again after every code but 4400 to 4499. */
export const CLOSE = {
  /** Nobody is signed in, or the session has ended. */
  signedOut: 4401,
  /** The person may not open this paper (any more), or sent an update without being an author. */
  noAccess: 4403,
  noSuchPaper: 4404,
  /** The person's role on the paper is another one now: the page is to be loaded again. */
  roleChanged: 4409,
  /** A frame or the whole text is larger than is allowed. */
  tooLarge: 4413,
  /** A frame could not be read. */
  unreadable: 4422,
  /** Try again: the server closes, too much came at once, the words could not be kept. */
  again: 4500,
} as const;
