import { spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { resolve } from "node:path";
import * as Y from "yjs";
import { TEXT_NAME } from "../app/editor/protocol.ts";
import { connect, openDatabase } from "../db/index.server.ts";
import { ensureDatabase, startPostgres, temporaryClusterName } from "../scripts/private-postgres.mjs";
import { DEMO_PEOPLE } from "../server/fakes/index.ts";

export interface ServedPaper {
  /** Where the application answers. */
  readonly url: string;
  /** Address of the paper there. */
  readonly path: string;
  /** One of the demo's people, who owns the paper. */
  readonly owner: string;
  stop(): Promise<void>;
}

const PAPER = "paper-of-the-bench";
const PATIENCE_MS = 60_000;
const root = resolve(import.meta.dirname, "..");

/** The built application in demo mode on a temporary PostgreSQL, with a paper of this text. */
export async function servePaper(text: string): Promise<ServedPaper> {
  if (!existsSync(resolve(root, "build/index.js"))) throw new Error("There is no build. `npm run build` makes it.");
  const cluster = await startPostgres(temporaryClusterName("bench"), { temporary: true });
  try {
    const databaseUrl = await ensureDatabase(cluster, "halfline_bench");
    const server = await startApplication(databaseUrl);
    const owner = await createPaper(databaseUrl, text);
    return {
      url: server.url,
      path: `/papers/${PAPER}`,
      owner,
      stop: async () => {
        await server.stop();
        await cluster.stop();
      },
    };
  } catch (error) {
    await cluster.stop();
    throw error;
  }
}

async function startApplication(databaseUrl: string): Promise<{ url: string; stop(): Promise<unknown> }> {
  const child = spawn(process.execPath, ["build/index.js"], {
    cwd: root,
    env: { ...process.env, NODE_ENV: "production", HALFLINE_MODE: "demo", PORT: "0", DATABASE_URL: databaseUrl },
    stdio: ["ignore", "pipe", "inherit"],
  });
  const ended = new Promise((done) => child.once("exit", done));
  const url = await new Promise<string>((done, fail) => {
    child.stdout.on("data", (chunk) => {
      const found = /Halfline is ready: (\S+)/.exec(String(chunk))?.[1];
      if (found) done(found);
    });
    ended.then(() => fail(new Error("The application ended before it was ready.")));
    setTimeout(() => fail(new Error("The application was not ready in time.")), PATIENCE_MS).unref();
  });
  return {
    url,
    stop: () => {
      child.kill("SIGTERM");
      return ended;
    },
  };
}

/** Writes the paper as one update, as if typed at once; returns its owner's name. */
async function createPaper(databaseUrl: string, text: string): Promise<string> {
  const knex = connect(databaseUrl);
  try {
    const database = openDatabase(knex);
    const author = DEMO_PEOPLE.find(({ role }) => role === "author");
    if (author === undefined) throw new Error("Nobody of the demo's people is an author.");
    const owner = await database.people.signIn({ provider: "github", ...author });
    await database.papers.create({ id: PAPER, title: "A long paper", authors: "Nobody" }, owner.id);
    const doc = new Y.Doc();
    doc.getText(TEXT_NAME).insert(0, text);
    const updates = [{ update: Y.encodeStateAsUpdate(doc), personId: owner.id }];
    await database.texts.append(PAPER, "text", updates, 0, "bench");
    return author.name;
  } finally {
    await knex.destroy();
  }
}
