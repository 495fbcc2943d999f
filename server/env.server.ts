import { availableParallelism } from "node:os";
import { z } from "zod";

const LOOPBACK = new Set(["127.0.0.1", "localhost", "::1", "[::1]"]);
const DEFAULT_PORT = 4180;
/** 32 characters of base64 hold 192 bits. */
const SHORTEST_SECRET = 32;

const port = z.coerce.number().int().min(0).max(65535);

const shape = z.object({
  HALFLINE_MODE: z.enum(["demo", "test", "production"]),
  NODE_ENV: z.string().default("production"),
  DATABASE_URL: z.string().regex(/^postgres(ql)?:\/\//, 'must begin with "postgres://"'),
  HOST: z.string().default("127.0.0.1"),
  PORT: port.default(DEFAULT_PORT),
  /** Where people reach this program; demo and test work it out from the port. */
  PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(),
  /** Proxies in front of this program that may be believed about the asker's address. */
  TRUSTED_PROXIES: z.coerce.number().int().min(0).max(5).default(0),
  SESSION_SECRET: z.string().optional(),
  GITHUB_CLIENT_ID: z.string().optional(),
  GITHUB_CLIENT_SECRET: z.string().optional(),
  /** Port of the stand-in for GitHub in demo and test; 0 takes a free one. */
  STAND_IN_PORT: port.default(0),
  /** Threads that compute cells; one core is left to the rest. */
  COMPUTE_THREADS: z.coerce.number().int().min(1).max(64).optional(),
  /** Longest that one cell may compute. */
  CELL_LIMIT_SECONDS: z.coerce.number().positive().default(120),
  /** Solver seconds that one person may use within an hour. */
  SOLVER_SECONDS_AN_HOUR: z.coerce.number().positive().default(900),
  LOG_LEVEL: z.enum(["fatal", "error", "warn", "info", "debug", "silent"]).optional(),
});

export type Mode = z.infer<typeof shape>["HALFLINE_MODE"];

/** The environment, checked. The only place that reads `process.env` is the caller of `readEnvironment`. */
export interface Environment {
  readonly mode: Mode;
  /** Served from the sources by Vite, with faults shown. */
  readonly development: boolean;
  readonly databaseUrl: string;
  readonly host: string;
  readonly port: number;
  readonly publicUrl: string | null;
  readonly trustedProxies: number;
  /** null: the stand-in for GitHub makes its own; one is drawn at each start. */
  readonly sessionSecret: string | null;
  readonly github: { readonly clientId: string; readonly clientSecret: string } | null;
  readonly standInPort: number;
  readonly computeThreads: number;
  readonly cellLimitSeconds: number;
  readonly solverSecondsAnHour: number;
  readonly logLevel: NonNullable<z.infer<typeof shape>["LOG_LEVEL"]>;
}

/** The environment does not fit: every fault at once, each with what would do. */
export class EnvironmentError extends Error {
  readonly faults: readonly string[];
  constructor(faults: readonly string[]) {
    super(`The environment does not fit:\n${faults.map((fault) => `  ${fault}`).join("\n")}`);
    this.name = "EnvironmentError";
    this.faults = faults;
  }
}

/**
 * Reads and checks the environment.
 * Demo and test run the stand-in for GitHub and therefore listen on loopback only; production refuses
 * stand-ins, weak secrets, and plain http beyond loopback.
 * @throws EnvironmentError naming all faults at once
 */
export function readEnvironment(variables: Readonly<Record<string, string | undefined>>): Environment {
  // An empty variable is one that was not set: `PORT= npm start`.
  const set = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== ""));
  const read = shape.safeParse(set);
  if (!read.success) {
    throw new EnvironmentError(read.error.issues.map((issue) => faultOf(issue.path.join("."), issue.message, set)));
  }
  const env = read.data;
  const faults = env.HALFLINE_MODE === "production" ? faultsOfProduction(env) : faultsOfStandIns(env);
  if (faults.length > 0) throw new EnvironmentError(faults);

  const { GITHUB_CLIENT_ID: clientId, GITHUB_CLIENT_SECRET: clientSecret } = env;
  return {
    mode: env.HALFLINE_MODE,
    development: env.NODE_ENV === "development",
    databaseUrl: env.DATABASE_URL,
    host: env.HOST,
    port: env.PORT,
    publicUrl: env.PUBLIC_URL ? new URL(env.PUBLIC_URL).origin : null,
    trustedProxies: env.TRUSTED_PROXIES,
    sessionSecret: env.SESSION_SECRET ?? null,
    github: clientId && clientSecret ? { clientId, clientSecret } : null,
    standInPort: env.STAND_IN_PORT,
    computeThreads: env.COMPUTE_THREADS ?? Math.max(1, availableParallelism() - 1),
    cellLimitSeconds: env.CELL_LIMIT_SECONDS,
    solverSecondsAnHour: env.SOLVER_SECONDS_AN_HOUR,
    // A person sits before a demo, and reads what goes wrong; a machine reads the rest.
    logLevel: env.LOG_LEVEL ?? (env.HALFLINE_MODE === "production" ? "info" : "warn"),
  };
}

function faultOf(name: string, message: string, set: Readonly<Record<string, unknown>>): string {
  if (name in set) return `${name}: ${message}`;
  if (name === "HALFLINE_MODE") return `${name} is not set. It is one of: demo, test, production`;
  return `${name} is not set`;
}

function faultsOfStandIns(env: z.infer<typeof shape>): string[] {
  const faults: string[] = [];
  const mode = env.HALFLINE_MODE;
  if (!LOOPBACK.has(env.HOST)) {
    faults.push(
      `HOST is "${env.HOST}": mode "${mode}" lets anybody sign in as anybody, so it listens on loopback only (127.0.0.1)`,
    );
  }
  if (env.PUBLIC_URL && !LOOPBACK.has(new URL(env.PUBLIC_URL).hostname)) {
    faults.push(`PUBLIC_URL is "${env.PUBLIC_URL}": mode "${mode}" is reached on loopback only`);
  }
  return faults;
}

function faultsOfProduction(env: z.infer<typeof shape>): string[] {
  const faults: string[] = [];
  if (env.NODE_ENV === "development")
    faults.push('NODE_ENV is "development": mode "production" does not show its faults');
  if (!env.SESSION_SECRET) {
    faults.push(`SESSION_SECRET is not set: at least ${SHORTEST_SECRET} characters drawn at random`);
  } else if (env.SESSION_SECRET.length < SHORTEST_SECRET || new Set(env.SESSION_SECRET).size < 10) {
    faults.push(`SESSION_SECRET is too easy to guess: at least ${SHORTEST_SECRET} characters drawn at random`);
  }
  if (!env.GITHUB_CLIENT_ID) faults.push("GITHUB_CLIENT_ID is not set: the id GitHub gave to this program");
  if (!env.GITHUB_CLIENT_SECRET) faults.push("GITHUB_CLIENT_SECRET is not set: the secret GitHub gave with the id");
  if (!env.PUBLIC_URL) {
    faults.push("PUBLIC_URL is not set: the address at which people reach this program, https://…");
  } else {
    const address = new URL(env.PUBLIC_URL);
    if (address.protocol !== "https:" && !LOOPBACK.has(address.hostname)) {
      faults.push(`PUBLIC_URL is "${env.PUBLIC_URL}": beyond loopback only https:// is accepted`);
    }
  }
  return faults;
}
