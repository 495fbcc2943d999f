// @vitest-environment jsdom
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { turnTheme } from "../../../app/editor/keys/theme.ts";

const tell = vi.fn();
const asked = vi.fn<typeof fetch>();
let machineIsDark = false;

beforeEach(() => {
  vi.stubGlobal("fetch", asked);
  vi.stubGlobal("matchMedia", (query: string) => ({ matches: machineIsDark && query.includes("dark") }));
  delete document.documentElement.dataset.theme;
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.clearAllMocks();
});

const theme = () => document.documentElement.dataset.theme;

test("the page turns from what it is, by itself or by the machine, and says that it is kept", async () => {
  asked.mockImplementation(async () => new Response(null, { status: 204 }));
  await turnTheme(tell);
  expect([theme(), String(asked.mock.calls[0]?.[1]?.body)]).toEqual(["dark", "theme=dark"]);
  await turnTheme(tell);
  expect(theme()).toBe("light");
  delete document.documentElement.dataset.theme;
  machineIsDark = true;
  await turnTheme(tell);
  expect(theme()).toBe("light");
  expect(tell.mock.calls.flat()).toEqual([
    "Dark, on every page in this browser.",
    "Light, on every page in this browser.",
    "Light, on every page in this browser.",
  ]);
});

test.each([
  ["refused", () => Promise.resolve(new Response(null, { status: 500 }))],
  ["without a connection", () => Promise.reject(new TypeError("Failed to fetch"))],
])("%s, it turns all the same and says that it is not kept", async (_, answer) => {
  machineIsDark = false;
  asked.mockImplementation(answer);
  await turnTheme(tell);
  expect(theme()).toBe("dark");
  expect(tell).toHaveBeenCalledWith("Dark on this page; it could not be kept.");
});
