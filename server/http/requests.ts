import type { RequestHandler } from "express";
import type { Logger } from "pino";

/** One line of the log for each answer. Queries and bodies may hold secrets and are left out. */
export function loggedRequests(log: Logger): RequestHandler {
  return (request, response, next) => {
    const begun = performance.now();
    const { method, path } = request;
    response.on("finish", () => {
      const details = {
        method,
        path,
        status: response.statusCode,
        ms: Math.round(performance.now() - begun),
      };
      if (response.statusCode >= 500) log.error(details, "answered");
      else log.info(details, "answered");
    });
    next();
  };
}
