import { createServer, type RequestListener, type Server } from "node:http";
import { dirname, join, resolve } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import type { RequestHandler } from "express";
import type { Logger } from "pino";
import { connect, migrateToLatest, openDatabase } from "../db/index.server.ts";
import type { makeHandler } from "./app.ts";
import { type Environment, EnvironmentError } from "./env.server.ts";
import { startGithubStandIn } from "./fakes/index.ts";
import { exactOrigin, httpApp, loopbackOrigin } from "./http/index.ts";
import { appConfig, createServices, drawStandInClient } from "./services.ts";

export interface RunningServer {
  /** Where a browser finds it. */
  readonly url: string;
  close(): Promise<void>;
}

/** The bundle of the pages, or its sources behind Vite. */
interface Pages {
  makeHandler: typeof makeHandler;
  developmentFiles: RequestHandler | null;
  close(): Promise<void>;
}

const HOUR_MS = 60 * 60 * 1000;
/** Requests under way when the process ends may take so long to finish. */
const FAREWELL_MS = 5_000;
const SIGN_INS_PER_MINUTE = { production: 20, demo: 120, test: 10_000 } as const;

// Built, this file is build/index.js, beside build/server and build/client.
const here = fileURLToPath(import.meta.url);
const fromSources = here.endsWith(".ts");
const root = resolve(dirname(here), "..");

/** Starts everything; resolves when pages are answered. */
export async function startServer(environment: Environment, log: Logger): Promise<RunningServer> {
  const knex = connect(environment.databaseUrl);
  await migrateToLatest(knex);
  const database = openDatabase(knex);

  const client = drawStandInClient();
  const standIn =
    environment.mode === "production"
      ? null
      : { client, server: await startGithubStandIn(client, environment.standInPort) };

  let answer: RequestListener = (_request, response) => {
    response.writeHead(503, { "Retry-After": "1" }).end();
  };
  const server = createServer((request, response) => answer(request, response));
  const port = await listen(server, environment.host, environment.port);
  const publicOrigin = environment.publicUrl ?? `http://localhost:${port}`;
  const config = appConfig(environment, publicOrigin, standIn);
  const services = await createServices({
    knex,
    database,
    environment,
    config,
    log,
    specimenFolder: join(root, "db/specimen"),
  });
  const isOwnOrigin = standIn ? loopbackOrigin(() => port) : exactOrigin(publicOrigin);
  const pages = await loadPages(server, environment);

  answer = httpApp({
    pages: pages.makeHandler({ database, services, development: environment.development }),
    developmentFiles: pages.developmentFiles,
    clientFolder: join(root, "build/client"),
    isOwnOrigin,
    signInOrigin: config.github.signInBase,
    signInsPerMinute: SIGN_INS_PER_MINUTE[environment.mode],
    sockets: () => socketOrigins(publicOrigin, standIn !== null, port),
    tls: config.secureCookies,
    trustedProxies: environment.trustedProxies,
    healthy: () => database.answers(),
    log,
  });
  services.attachSockets(server, { isOwnOrigin, sharesPort: fromSources });
  const sweeping = setInterval(() => {
    database.sessions.sweep().catch((error: unknown) => log.error({ err: error }, "ended sessions were not swept"));
    database.parts.sweep().catch((error: unknown) => log.error({ err: error }, "left parts were not swept"));
  }, HOUR_MS);
  sweeping.unref();

  return {
    url: publicOrigin,
    close: async () => {
      clearInterval(sweeping);
      const closed = new Promise((done) => server.close(done));
      await services.close();
      setTimeout(() => server.closeAllConnections(), FAREWELL_MS).unref();
      server.closeIdleConnections();
      await closed;
      await pages.close();
      await standIn?.server.close();
      await knex.destroy();
    },
  };
}

async function loadPages(server: Server, environment: Environment): Promise<Pages> {
  if (!fromSources) {
    const bundle = pathToFileURL(join(root, "build/server/index.js")).href;
    const { makeHandler }: Pick<Pages, "makeHandler"> = await import(bundle);
    return { makeHandler, developmentFiles: null, close: async () => {} };
  }
  const { createServer: createVite } = await import("vite");
  const vite = await createVite({
    root,
    appType: "custom",
    logLevel: "warn",
    server: {
      middlewareMode: { server },
      ...(environment.development ? { ws: { server } } : { ws: false, hmr: false }),
    },
  });
  const load = () => vite.ssrLoadModule("./server/app.ts") as Promise<Pick<Pages, "makeHandler">>;
  return {
    // Loaded again for each request: an edited route answers at once.
    makeHandler: (parts) => async (request, response, next) => {
      try {
        const { makeHandler } = await load();
        await makeHandler(parts)(request, response, next);
      } catch (error) {
        if (error instanceof Error) vite.ssrFixStacktrace(error);
        next(error);
      }
    },
    developmentFiles: vite.middlewares,
    close: () => vite.close(),
  };
}

function socketOrigins(publicOrigin: string, standIn: boolean, port: number): string[] {
  const own = publicOrigin.replace(/^http/, "ws");
  return standIn ? [own, `ws://127.0.0.1:${port}`, `ws://localhost:${port}`] : [own];
}

function listen(server: Server, host: string, port: number): Promise<number> {
  return new Promise((done, fail) => {
    server.once("error", (error: NodeJS.ErrnoException) => {
      const taken = `Port ${port} of ${host} is in use by another program. Give another one by PORT.`;
      fail(error.code === "EADDRINUSE" ? new EnvironmentError([taken]) : error);
    });
    server.listen(port, host, () => {
      const address = server.address();
      if (address === null || typeof address === "string") fail(new Error(`${host}:${port} has no port.`));
      else done(address.port);
    });
  });
}
