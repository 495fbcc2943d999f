export { themeCookie } from "./cookies.server.ts";
export type { PaperAccess } from "./guards.server.ts";
export { refusal, requirePaper, requirePerson } from "./guards.server.ts";
export type { Session } from "./sessions.server.ts";
export { beginSession, readSession, sessionHash, signedOutHeaders } from "./sessions.server.ts";
export type { SignInProblem } from "./sign-in.server.ts";
export { beginSignIn, completeSignIn, forgetAttempt } from "./sign-in.server.ts";
