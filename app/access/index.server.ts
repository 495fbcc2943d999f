export { themeCookie } from "./cookies.server.ts";
export type { Asked } from "./guards.server.ts";
export { refusal, requirePaper, requirePerson } from "./guards.server.ts";
export { beginSession, readSession, sessionHash, signedOutHeaders } from "./sessions.server.ts";
export { beginSignIn, completeSignIn, forgetAttempt } from "./sign-in.server.ts";
