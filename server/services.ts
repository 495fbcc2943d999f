import { randomBytes } from "node:crypto";
import type { Server } from "node:http";
import type { Knex } from "knex";
import type { Logger } from "pino";
import { readSession } from "../app/access/index.server.ts";
import type { AppConfig, Services } from "../app/context.ts";
import type { Database } from "../db/index.server.ts";
import { Computations } from "./compute/index.ts";
import { prepareDemo } from "./demo.ts";
import type { Environment } from "./env.server.ts";
import type { StandIn, StandInClient } from "./fakes/index.ts";
import { attachSockets, type Identify, LiveTexts, type SocketsOptions } from "./sync/index.ts";
import { TexPdfService } from "./tex/index.ts";

export interface ServiceParts {
  readonly knex: Knex;
  readonly database: Database;
  readonly environment: Environment;
  readonly config: AppConfig;
  readonly log: Logger;
  /** Folder of the specimen paper's text. */
  readonly specimenFolder: string;
}

/** The services, with their sockets and the way to end them. */
export interface RunningServices extends Services {
  attachSockets(server: Server, options: Pick<SocketsOptions, "isOwnOrigin" | "sharesPort">): void;
  /** Closes the sockets, and waits for what is being committed. */
  close(): Promise<void>;
}

const GITHUB = { signInBase: "https://github.com", apiBase: "https://api.github.com" };

/** Id and secret that this process's stand-in accepts. */
export function drawStandInClient(): StandInClient {
  return { clientId: "halfline-demo", clientSecret: randomBytes(16).toString("hex") };
}

/** @param publicOrigin where people reach this program */
export function appConfig(
  environment: Environment,
  publicOrigin: string,
  standIn: { server: StandIn; client: StandInClient } | null,
): AppConfig {
  const github = standIn
    ? { ...standIn.client, signInBase: standIn.server.origin, apiBase: standIn.server.origin }
    : environment.github && { ...environment.github, ...GITHUB };
  if (!github) throw new Error("There is neither an id for GitHub nor a stand-in. readEnvironment refuses that.");
  return {
    standIn: standIn !== null,
    publicOrigin,
    secureCookies: publicOrigin.startsWith("https:"),
    // Without one, attempts to sign in do not outlive the process; sessions do, they are rows of the database.
    sessionSecret: environment.sessionSecret ?? randomBytes(32).toString("hex"),
    github,
  };
}

/** Texts with their live sockets, computations, and the making of PDFs. */
export async function createServices(parts: ServiceParts): Promise<RunningServices> {
  const { database, environment, config, log } = parts;
  const identify: Identify = async (cookieHeader) => {
    const session = await readSession(config, database, cookieHeader);
    return session && { id: session.person.id, name: session.person.name, sessionHash: session.hash };
  };
  const onProblem = (error: unknown, where: string) => log.error({ err: error, where }, "live texts");
  const texts = await LiveTexts.open({ database, databaseUrl: environment.databaseUrl, identify, onProblem });
  const compute = new Computations({
    database,
    texts,
    threads: environment.computeThreads,
    cellLimitMs: environment.cellLimitSeconds * 1000,
    secondsAnHour: environment.solverSecondsAnHour,
    onProblem: (error, where) => log.error({ err: error, where }, "computations"),
  });
  if (environment.mode === "demo") {
    await prepareDemo({ database, texts, compute, folder: parts.specimenFolder, provider: "github" }).catch((error) =>
      log.error({ err: error }, "demo"),
    );
  }
  return {
    texts,
    compute,
    pdf: new TexPdfService({ log }),
    config,
    log,
    attachSockets: (server, options) => attachSockets(server, { ...options, texts, database, identify, onProblem }),
    close: async () => {
      await compute.close();
      await texts.close();
    },
  };
}
