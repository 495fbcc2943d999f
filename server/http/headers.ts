import { randomBytes } from "node:crypto";
import type { RequestHandler } from "express";
import helmet from "helmet";

/** Security headers; the content security policy's nonce is left in `response.locals.nonce`. */
export function securityHeaders(options: {
  /** Where the sign-in form leads: browsers hold `form-action` against redirects too. */
  readonly signInOrigin: string;
  /** The sockets' addresses: Safari does not read 'self' as covering them. */
  readonly sockets: () => readonly string[];
  readonly tls: boolean;
  /** Vite's own socket, while developing. */
  readonly development: boolean;
}): RequestHandler[] {
  const nonce: RequestHandler = (_request, response, next) => {
    response.locals.nonce = randomBytes(16).toString("base64");
    next();
  };
  const withNonce = (_request: unknown, response: unknown) =>
    `'nonce-${(response as { locals: { nonce: string } }).locals.nonce}'`;
  const policy: RequestHandler = (request, response, next) =>
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'none'"],
          baseUri: ["'none'"],
          scriptSrc: ["'self'", withNonce],
          workerSrc: ["'self'"],
          styleSrcElem: ["'self'", withNonce],
          // Carets of coauthors and typeset formulas carry style attributes, which no nonce can cover.
          styleSrcAttr: ["'unsafe-inline'"],
          imgSrc: ["'self'", "data:", "blob:"],
          fontSrc: ["'self'"],
          manifestSrc: ["'self'"],
          connectSrc: ["'self'", ...options.sockets(), ...(options.development ? ["ws:"] : [])],
          formAction: ["'self'", options.signInOrigin],
          frameAncestors: ["'none'"],
        },
      },
      // With "no-referrer" a browser sends `Origin: null` from our own forms.
      referrerPolicy: { policy: "same-origin" },
      strictTransportSecurity: options.tls ? { maxAge: 365 * 24 * 60 * 60 } : false,
      xFrameOptions: { action: "deny" },
    })(request, response, next);
  return [nonce, policy];
}
