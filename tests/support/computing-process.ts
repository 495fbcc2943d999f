/** A process that computes one paper's cells, to be killed. Its arguments: the database's URL, the worker's file, the paper's id, the asker's id and name, the text. */
import { connect, openDatabase } from "../../db/index.server.ts";
import { Computations } from "../../server/compute/index.ts";
import { startLiveServer } from "./live.ts";

const [url, worker, paperId, id, name, text] = process.argv.slice(2);
if (!url || !worker || !paperId || !id || !name || !text) throw new Error("An argument is missing.");
const knex = connect(url);
const { texts } = await startLiveServer(knex, url);
const service = new Computations({
  database: openDatabase(knex),
  texts,
  threads: 1,
  cellLimitMs: 60_000,
  secondsAnHour: 600,
  worker,
  onProblem: (error) => process.stderr.write(`${String(error)}\n`),
});
await service.compute({ paperId, person: { id, name, email: null }, text: { text, bibliography: "" }, cells: "all" });
process.stdout.write("asked\n");
