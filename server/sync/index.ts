export type { Identify, Visitor } from "./admission.ts";
export type { ShownMaps } from "./live-texts.ts";
export { LiveTexts } from "./live-texts.ts";
export type { SocketsOptions } from "./sockets.ts";
export { attachSockets } from "./sockets.ts";
