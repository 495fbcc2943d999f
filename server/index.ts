import { pino } from "pino";
import { EnvironmentError, readEnvironment } from "./env.server.ts";
import { startServer } from "./start.ts";

/** The process: reads its environment, starts, and ends in order when asked to. */
async function main(): Promise<void> {
  const environment = readEnvironment(process.env);
  const log = pino({ level: environment.logLevel });
  const server = await startServer(environment, log);
  process.stdout.write(`Halfline is ready: ${server.url}\n`);

  let ending = false;
  const end = async (signal: NodeJS.Signals) => {
    if (ending) return;
    ending = true;
    log.info({ signal }, "ending");
    await server.close();
    process.exit(0);
  };
  process.on("SIGINT", end);
  process.on("SIGTERM", end);
}

main().catch((error: unknown) => {
  const words =
    error instanceof EnvironmentError ? error.message : error instanceof Error ? error.stack : String(error);
  process.stderr.write(`Halfline did not start.\n${words}\n`);
  process.exit(1);
});
