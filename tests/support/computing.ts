import type { Knex } from "knex";
import type { CellWork, ShownCell } from "../../app/cells/types.ts";
import { connect, type Database, openDatabase } from "../../db/index.server.ts";
import { Computations, type ComputeOptions } from "../../server/compute/index.ts";
import { bundled } from "./bundled.ts";
import { freshDatabaseUrl } from "./database.ts";
import { type Invented, inventPaper, inventPerson, type LiveServer, startLiveServer, until } from "./live.ts";

/** A process that computes, without pages. */
export interface Computing {
  readonly knex: Knex;
  readonly database: Database;
  readonly databaseUrl: string;
  readonly server: LiveServer;
  readonly service: Computations;
  readonly problems: unknown[];
  close(): Promise<void>;
}

/** @param options of the service, where they differ  @param databaseUrl of another process, to serve the same papers */
export async function startComputing(
  options: Partial<ComputeOptions> = {},
  databaseUrl: string | null = null,
): Promise<Computing> {
  const url = databaseUrl ?? (await freshDatabaseUrl());
  const knex = connect(url);
  const server = await startLiveServer(knex, url);
  const problems: unknown[] = [];
  const database = openDatabase(knex);
  const service = new Computations({
    database,
    texts: server.texts,
    threads: 1,
    cellLimitMs: 60_000,
    heapMb: 256,
    secondsAnHour: 600,
    worker: bundled("unruly-worker.ts"),
    onProblem: (error, where) => problems.push({ where, error }),
    ...options,
  });
  return {
    knex,
    database,
    databaseUrl: url,
    server,
    service,
    problems,
    close: async () => {
      await service.close();
      await server.close();
      await knex.destroy();
    },
  };
}

/** A paper and two of its authors, as one process sees it. */
export class Desk {
  readonly computing: Computing;
  readonly person: Invented;
  readonly coauthor: Invented;
  readonly paperId: string;

  constructor(computing: Computing, other: Pick<Desk, "person" | "coauthor" | "paperId">) {
    this.computing = computing;
    this.person = other.person;
    this.coauthor = other.coauthor;
    this.paperId = other.paperId;
  }

  static async invent(computing: Computing): Promise<Desk> {
    const { knex } = computing;
    const person = await inventPerson(knex, "Inês");
    const coauthor = await inventPerson(knex, "Tormod");
    return new Desk(computing, { person, coauthor, paperId: await inventPaper(knex, [[person, "owner"]]) });
  }

  ask(
    text: string,
    cells: readonly string[] | "all" = "all",
    { by = this.person, force = false } = {},
  ): ReturnType<Computations["compute"]> {
    const person = { ...by, email: null };
    const { paperId } = this;
    return this.computing.service.compute({ paperId, person, text: { text, bibliography: "" }, cells, force });
  }

  /** Asks, and waits until the paper shows how it ended. */
  async computed(...asking: Parameters<Desk["ask"]>): ReturnType<Computations["compute"]> {
    const answer = await this.ask(...asking);
    await this.settled();
    return answer;
  }

  async settled(): Promise<void> {
    await this.computing.service.settled(this.paperId);
  }

  async cancel(cells: readonly string[] | "all", by = this.person): Promise<void> {
    await this.computing.service.cancel({ paperId: this.paperId, person: { ...by, email: null }, cells });
  }

  /** Waits until a thread is at the cell. */
  async hasBegun(id: string): Promise<void> {
    await until(() => this.computing.service.isComputing(id), `${id} to compute`, 20_000);
  }

  async shown(slot: string): Promise<ShownCell | undefined> {
    return (await this.computing.server.texts.shown(this.paperId)).cells[slot];
  }

  async work(slot: string): Promise<CellWork | undefined> {
    return (await this.computing.server.texts.shown(this.paperId)).work[slot];
  }

  /** Records of what was computed for the paper, in the order of asking. */
  async records(): Promise<{ seconds: number; cells: string[]; ended_at: Date | null }[]> {
    return this.computing.knex("computations").where({ paper_id: this.paperId }).orderBy("id");
  }
}
