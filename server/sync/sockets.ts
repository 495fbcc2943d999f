import type { Server } from "node:http";
import { type WebSocket, WebSocketServer } from "ws";
import { CLOSE } from "../../app/editor/protocol.ts";
import type { Database } from "../../db/index.server.ts";
import { type Admission, admit, type Identify, readSocketPath } from "./admission.ts";
import { Connection } from "./connection.ts";
import type { LiveTexts } from "./live-texts.ts";

/** Bytes of one frame: more than any paper's first state, less than hurts. */
const LARGEST_FRAME = 16 * 1024 * 1024;
/** Sockets that one person may have open in this process, and one address where nobody is signed in. */
const MOST_OF_A_PERSON = 64;
const MOST_OF_AN_ADDRESS = 256;

export interface SocketsOptions {
  readonly texts: LiveTexts;
  readonly database: Database;
  readonly identify: Identify;
  /** Says whether an `Origin` header is that of our own pages. */
  readonly isOwnOrigin: (origin: string | undefined) => boolean;
  /** Leave upgrades to other addresses alone, for a development server that shares the port. Otherwise they are cut off. */
  readonly sharesPort?: boolean;
  readonly onProblem: (error: unknown, where: string) => void;
}

/**
 * Serves the papers' sockets on `server`. A refusal is told by accepting the socket and closing it with a code (CLOSE
 * in app/editor/protocol.ts): a page cannot read the status of a handshake that fails.
 */
export function attachSockets(server: Server, options: SocketsOptions): void {
  const { texts, onProblem } = options;
  const sockets = new WebSocketServer({ noServer: true, maxPayload: LARGEST_FRAME, perMessageDeflate: false });
  const openBy = new Map<string, number>();

  server.on("upgrade", (request, stream, head) => {
    if (!readSocketPath(request.url)) {
      if (!options.sharesPort) stream.destroy();
      return;
    }
    const onError = () => stream.destroy();
    stream.on("error", onError);
    const accept = (use: (socket: WebSocket) => void) => {
      stream.off("error", onError);
      if (!stream.destroyed) sockets.handleUpgrade(request, stream, head, use);
    };

    open().catch((error) => {
      onProblem(error, "opening a socket");
      accept((socket) => refuse(socket, CLOSE.again, "The paper cannot be read just now."));
    });

    async function open(): Promise<void> {
      const answer = await admit(request, { ...options, papers: options.database.papers });
      if (!answer.admitted) {
        accept((socket) => refuse(socket, answer.code, answer.reason));
        return;
      }
      const who = answer.visitor?.id ?? `address ${request.socket.remoteAddress}`;
      const count = openBy.get(who) ?? 0;
      if (count >= (answer.visitor ? MOST_OF_A_PERSON : MOST_OF_AN_ADDRESS)) {
        accept((socket) => refuse(socket, CLOSE.again, "Too many windows are open on papers."));
        return;
      }
      openBy.set(who, count + 1);
      await join(answer, () => {
        const left = (openBy.get(who) ?? 1) - 1;
        if (left > 0) openBy.set(who, left);
        else openBy.delete(who);
      });
    }

    /** The room is loaded before the handshake is answered, so that no frame comes before there is somebody to read it. */
    async function join(admission: Admission, onLeave: () => void): Promise<void> {
      const { paperId, doc } = admission;
      const { room, company } = await texts.rooms.open(paperId, doc).catch((error) => {
        onLeave();
        throw error;
      });
      let connection: Connection | null = null;
      const leave = () => {
        if (connection) texts.connections.delete(connection);
        texts.rooms.release(paperId, doc);
        onLeave();
      };
      if (stream.destroyed) {
        leave();
        return;
      }
      // A handshake that ws refuses makes no connection, which would leave by itself.
      stream.once("close", () => {
        if (!connection) leave();
      });
      accept((socket) => {
        const present = doc === "text" ? company : null;
        connection = new Connection(socket, room, present, admission, request.headers.cookie, leave);
        texts.connections.add(connection);
      });
    }
  });
}

function refuse(socket: WebSocket, code: number, reason: string): void {
  socket.on("error", () => {});
  socket.close(code, reason);
}
