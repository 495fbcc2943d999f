import { pino } from "pino";
import { EnvironmentError, readEnvironment } from "./env.server.ts";
import { startServer } from "./start.ts";

/** The process: reads its environment, starts, and ends in order when asked to, also while it is still starting. */
async function main(): Promise<void> {
  const environment = readEnvironment(process.env);
  const log = pino({ level: environment.logLevel });
  const starting = startServer(environment, log);

  let ending = false;
  const end = async (reason: string) => {
    if (ending) return;
    ending = true;
    log.info({ reason }, "ending");
    await (await starting).close();
    process.exit(0);
  };
  for (const signal of ["SIGINT", "SIGTERM"] as const) process.on(signal, () => void end(signal).catch(failed));
  // Only where whoever started this process holds a channel to it, as scripts/start.mjs does.
  process.once("disconnect", () => void end("the process that started this one is gone").catch(failed));

  process.stdout.write(`Halfline is ready: ${(await starting).url}\n`);
}

function failed(error: unknown): void {
  const words =
    error instanceof EnvironmentError ? error.message : error instanceof Error ? error.stack : String(error);
  process.stderr.write(`Halfline stopped.\n${words}\n`);
  process.exit(1);
}

main().catch(failed);
