import { PassThrough } from "node:stream";
import { createReadableStreamFromReadable } from "@react-router/node";
import { isbot } from "isbot";
import { type RenderToPipeableStreamOptions, renderToPipeableStream } from "react-dom/server";
import {
  type EntryContext,
  type HandleErrorFunction,
  isRouteErrorResponse,
  type RouterContextProvider,
  ServerRouter,
} from "react-router";
import { nonceContext, servicesContext } from "./context.ts";
import { NonceProvider } from "./ui/index.ts";

/** Rendering that takes longer is given up. */
export const streamTimeout = 10_000;

export default function handleRequest(
  request: Request,
  status: number,
  headers: Headers,
  entry: EntryContext,
  context: Readonly<RouterContextProvider>,
): Promise<Response> {
  const nonce = context.get(nonceContext);
  headers.set("Content-Type", "text/html; charset=utf-8");
  // What one person may see must not come out of a shared cache for another.
  if (!headers.has("Cache-Control")) headers.set("Cache-Control", "private, no-store");
  // Readers of robots want the whole page at once; people want its head soon.
  const whole = isbot(request.headers.get("User-Agent") ?? "") || entry.isSpaMode;

  return new Promise((resolve, reject) => {
    let answered = false;
    let answerStatus = status;
    const ready: keyof RenderToPipeableStreamOptions = whole ? "onAllReady" : "onShellReady";
    const { pipe, abort } = renderToPipeableStream(
      <NonceProvider value={nonce}>
        <ServerRouter context={entry} url={request.url} nonce={nonce} />
      </NonceProvider>,
      {
        nonce,
        [ready]: () => {
          answered = true;
          const body = new PassThrough();
          resolve(new Response(createReadableStreamFromReadable(body), { headers, status: answerStatus }));
          pipe(body);
        },
        onShellError: reject,
        onError: (error: unknown) => {
          answerStatus = 500;
          // Before the shell is ready, `onShellError` tells of it.
          if (answered) context.get(servicesContext).log.error({ err: error }, "a page broke off");
        },
      },
    );
    setTimeout(abort, streamTimeout + 1_000).unref();
  });
}

/** Refusals and askers that went away are no faults; everything else is written to the log. */
export const handleError: HandleErrorFunction = (error, { request, context }) => {
  if (request.signal.aborted || isRouteErrorResponse(error)) return;
  context.get(servicesContext).log.error({ err: error, path: new URL(request.url).pathname }, "a route failed");
};
