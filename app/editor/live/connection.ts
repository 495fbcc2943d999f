import { CLOSE } from "../protocol.ts";

/**
 * A page's tie to the server:
 *
 *     joining ──text is here──▶ live ──socket lost──▶ away ──socket again──▶ live
 *        └───────────────────────┴─────refused (4400 to 4499)─────▶ closed
 *     still: a visitor's page, which has its text from the server and no socket.
 */
export type Connection =
  | { readonly state: "joining" | "live" | "still" }
  | { readonly state: "away"; readonly since: Date }
  | { readonly state: "closed"; readonly code: number };

/** What a closed tie means, and the way out of it. */
export interface Closing {
  readonly words: string;
  readonly way: { readonly label: string; readonly to: "sign-in" | "shelf" | "again" | "reload" };
  /** The private copy of the text in this browser goes with the access. */
  readonly forgets: boolean;
}

const CLOSINGS: Readonly<Record<number, Closing>> = {
  [CLOSE.signedOut]: {
    words: "Your session has ended. Your words are kept on this machine.",
    way: { label: "Sign in again", to: "sign-in" },
    forgets: false,
  },
  [CLOSE.noAccess]: {
    words: "This paper is not open to you any more. What is on the sheet can still be read and copied.",
    way: { label: "Back to the shelf", to: "shelf" },
    forgets: true,
  },
  [CLOSE.noSuchPaper]: {
    words: "This paper has been removed. What is on the sheet can still be read and copied.",
    way: { label: "Back to the shelf", to: "shelf" },
    forgets: true,
  },
  [CLOSE.roleChanged]: {
    words: "Your role on this paper has changed.",
    way: { label: "Open the paper again", to: "reload" },
    forgets: false,
  },
  [CLOSE.tooLarge]: {
    words: "The text is longer than a paper may be. Take the last piece out, and join again.",
    way: { label: "Join again", to: "again" },
    forgets: false,
  },
};

export function closingOf(code: number): Closing {
  return (
    CLOSINGS[code] ?? {
      words: `The server would not go on (${code}). Your words are kept on this machine.`,
      way: { label: "Join again", to: "again" },
      forgets: false,
    }
  );
}
