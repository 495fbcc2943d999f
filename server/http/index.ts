import { join } from "node:path";
import express, { type Express, type RequestHandler } from "express";
import type { Logger } from "pino";
import { securityHeaders } from "./headers.ts";
import { boundedBodies, limitedSignIn } from "./limits.ts";
import { exactOrigin, loopbackOrigin, type OwnOrigin, onlyFromOwnPages } from "./origin.ts";
import { refuse } from "./refusal.ts";
import { loggedRequests } from "./requests.ts";

export { exactOrigin, loopbackOrigin };

export interface HttpParts {
  /** Answers everything that is no file: the pages. */
  readonly pages: RequestHandler;
  /** Vite's files while developing; null when the built files of `clientFolder` are served. */
  readonly developmentFiles: RequestHandler | null;
  readonly clientFolder: string;
  readonly isOwnOrigin: OwnOrigin;
  readonly signInOrigin: string;
  readonly signInsPerMinute: number;
  readonly sockets: () => readonly string[];
  readonly tls: boolean;
  readonly trustedProxies: number;
  /** Resolves when the database answers. */
  readonly healthy: () => Promise<void>;
  readonly log: Logger;
}

const YEAR_SECONDS = 365 * 24 * 60 * 60;

/** Everything between the socket and the pages, outermost first. */
export function httpApp(parts: HttpParts): Express {
  const app = express();
  app.disable("x-powered-by");
  app.set("trust proxy", parts.trustedProxies);

  app.get("/healthz", async (_request, response) => {
    response.set("Cache-Control", "no-store");
    try {
      await parts.healthy();
      response.json({ healthy: true });
    } catch (error) {
      parts.log.error({ err: error }, "the database does not answer");
      response.status(503).json({ healthy: false, message: "The database does not answer." });
    }
  });

  app.use(loggedRequests(parts.log));
  app.use(securityHeaders({ ...parts, development: parts.developmentFiles !== null }));
  app.use(onlyFromOwnPages(parts.isOwnOrigin));
  app.use(boundedBodies);
  app.use(["/sign-in/github", "/sign-in/github.data"], limitedSignIn(parts.signInsPerMinute));

  if (parts.developmentFiles) {
    app.use(parts.developmentFiles);
  } else {
    // Names of assets carry a hash of their content.
    const assets = { immutable: true, maxAge: YEAR_SECONDS * 1000, index: false, fallthrough: false };
    app.use("/assets", express.static(join(parts.clientFolder, "assets"), assets));
    app.use(express.static(parts.clientFolder, { maxAge: "1h", index: false }));
  }

  app.use(parts.pages);
  app.use(lastResort(parts.log));
  return app;
}

/** Errors that nothing else has answered. The asker learns no more than that. */
function lastResort(log: Logger): express.ErrorRequestHandler {
  return (error, request, response, next) => {
    const status = typeof error?.statusCode === "number" && error.statusCode < 500 ? error.statusCode : 500;
    if (status === 500) log.error({ err: error, path: request.path }, "a request failed");
    if (response.headersSent) return next(error);
    if (status === 500) refuse(request, response, 500, "Something failed here. Try again in a moment.");
    else refuse(request, response, status, "There is nothing here.");
  };
}
