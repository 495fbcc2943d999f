import type { Knex } from "knex";
import pg from "pg";

/** Every process that serves papers listens here. */
export const SIGNALS_CHANNEL = "halfline_signals";

/** What processes that serve the same papers tell each other. Small: PostgreSQL carries at most 8,000 bytes. */
export type Signal = { readonly signal: string; readonly sender: string } & Readonly<Record<string, unknown>>;

const FIRST_RETRY_MS = 200;
const LONGEST_RETRY_MS = 5_000;

/** Tells every process that listens, this one included. */
export async function send(knex: Knex, signal: Signal): Promise<void> {
  await knex.raw("select pg_notify(?, ?)", [SIGNALS_CHANNEL, JSON.stringify(signal)]);
}

export interface SignalHandlers {
  signal(signal: Signal): void;
  /** Listening again after a break: whatever was told meanwhile was not heard. */
  resumed(): void;
  problem(error: Error): void;
}

/**
 * One connection outside the pool that hears the signals of the other processes and holds this process's claims.
 * A claim is a session lock: it goes with the connection, so a process that is killed holds none.
 *
 *     closed ──open──▶ listening ──connection lost──▶ waiting ──retry──▶ listening (claims taken again, `resumed`)
 *                          └──────────close──────────────┴──▶ ended
 */
export class SignalLine {
  readonly #url: string;
  readonly #handlers: SignalHandlers;
  readonly #claims = new Set<string>();
  #client: pg.Client | null = null;
  /** The last question asked: one connection answers one at a time. */
  #asked: Promise<unknown> = Promise.resolve();
  #retry: NodeJS.Timeout | null = null;
  #ended = false;

  constructor(url: string, handlers: SignalHandlers) {
    this.#url = url;
    this.#handlers = handlers;
  }

  async open(): Promise<void> {
    const client = new pg.Client({
      connectionString: this.#url,
      application_name: "halfline signals",
      keepAlive: true,
    });
    client.on("notification", ({ payload }) => {
      const signal = readSignal(payload ?? "");
      if (signal) this.#handlers.signal(signal);
    });
    client.on("error", (error) => this.#handlers.problem(error));
    client.on("end", () => {
      if (this.#client === client) this.#lost();
    });
    await client.connect();
    await client.query(`listen ${SIGNALS_CHANNEL}`);
    for (const claim of this.#claims) await client.query(...lock("pg_try_advisory_lock", claim));
    if (this.#ended) return client.end();
    this.#client = client;
  }

  /** True when this process now holds `name`, and no other does. A name that it holds already is refused. */
  async claim(name: string): Promise<boolean> {
    if (this.#claims.has(name)) return false;
    this.#claims.add(name);
    try {
      if (await this.#ask("pg_try_advisory_lock", name)) return true;
    } catch (error) {
      this.#claims.delete(name);
      throw error;
    }
    this.#claims.delete(name);
    return false;
  }

  async release(name: string): Promise<void> {
    if (!this.#claims.delete(name) || !this.#client) return;
    await this.#ask("pg_advisory_unlock", name);
  }

  async close(): Promise<void> {
    this.#ended = true;
    if (this.#retry) clearTimeout(this.#retry);
    const client = this.#client;
    this.#client = null;
    await client?.end();
  }

  #ask(call: LockFunction, name: string): Promise<boolean> {
    const answer = this.#asked.then(async () => {
      if (!this.#client) throw new Error("The database's signals cannot be reached; they are being tried again.");
      const { rows } = await this.#client.query<{ held: boolean }>(...lock(call, name));
      return rows[0]?.held ?? false;
    });
    this.#asked = answer.catch(() => undefined);
    return answer;
  }

  #lost(wait = FIRST_RETRY_MS): void {
    this.#client = null;
    if (this.#ended) return;
    this.#retry = setTimeout(() => {
      this.open().then(
        () => this.#handlers.resumed(),
        (error: Error) => {
          this.#handlers.problem(error);
          this.#lost(Math.min(2 * wait, LONGEST_RETRY_MS));
        },
      );
    }, wait);
  }
}

type LockFunction = "pg_try_advisory_lock" | "pg_advisory_unlock";

function lock(call: LockFunction, name: string): [string, string[]] {
  return [`select ${call}(hashtextextended($1, 1)) as held`, [name]];
}

function readSignal(payload: string): Signal | null {
  try {
    const signal: unknown = JSON.parse(payload);
    return isSignal(signal) ? signal : null;
  } catch {
    // Somebody else's notification on our channel: not for us.
    return null;
  }
}

function isSignal(value: unknown): value is Signal {
  return (
    typeof value === "object" &&
    value !== null &&
    "signal" in value &&
    typeof value.signal === "string" &&
    "sender" in value &&
    typeof value.sender === "string"
  );
}
