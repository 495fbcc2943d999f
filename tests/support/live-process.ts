/** A live-text server as a process of its own, to be killed. Its argument is the database's URL; it prints its own. */
import { connect } from "../../db/index.server.ts";
import { startLiveServer } from "./live.ts";

const url = process.argv[2];
if (!url) throw new Error("The database's URL is missing.");
const server = await startLiveServer(connect(url), url, Number(process.argv[3] ?? 0));
process.stdout.write(`${server.url}\n`);
