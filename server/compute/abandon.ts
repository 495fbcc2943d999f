/** `promise`, or `onAbort()` as soon as the signal is given, whichever comes first. */
export function unlessAborted<T>(promise: Promise<T>, signal: AbortSignal, onAbort: () => T): Promise<T> {
  if (signal.aborted) return Promise.resolve(onAbort());
  return new Promise((done, fail) => {
    const abort = () => done(onAbort());
    signal.addEventListener("abort", abort, { once: true });
    promise.then(done, fail).finally(() => signal.removeEventListener("abort", abort));
  });
}
