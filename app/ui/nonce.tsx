import { createContext, useContext } from "react";

const NonceContext = createContext<string | undefined>(undefined);

/** Set while rendering on the server. */
export const NonceProvider = NonceContext.Provider;

/**
 * The nonce of this page's content security policy, on the server and in the browser.
 * Browsers hide it from the attribute and keep it on the element.
 */
export function useNonce(): string | undefined {
  const fromServer = useContext(NonceContext);
  if (fromServer !== undefined) return fromServer;
  if (typeof document === "undefined") return undefined;
  return document.querySelector<HTMLScriptElement>("script[nonce]")?.nonce;
}
