import { afterEach, beforeEach, expect, vi } from "vitest";

/** A warning nobody expected is a fault: console.error and console.warn fail the test unless it mocks them itself. */
beforeEach(() => {
  vi.spyOn(console, "error");
  vi.spyOn(console, "warn");
});

afterEach(() => {
  for (const method of ["error", "warn"] as const) {
    const spy = vi.mocked(console[method]);
    if (vi.isMockFunction(spy)) {
      const calls = spy.mock.calls;
      spy.mockRestore();
      expect(calls, `console.${method} was called`).toEqual([]);
    }
  }
});
