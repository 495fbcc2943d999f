/** What the manual says, made on the server. */
export { type ManualContents, manualContents } from "./contents.server.ts";
