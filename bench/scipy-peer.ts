import { execFileSync } from "node:child_process";
import { resolve } from "node:path";
import type { Timing } from "./timing.ts";
import { summary } from "./timing.ts";

/** What the SciPy script found, and its times. */
export interface PeerAnswer {
  readonly timing: Timing;
  readonly s0: number;
  readonly amplitude: number;
  readonly slope: number;
  readonly constant: number;
  /** P(K = n)·radius^n */
  readonly scaled: readonly number[];
  readonly radius: number;
}

/** Pythons tried, in this order. */
const PYTHONS = ["/usr/bin/python3", "python3"];
const RUNS = 15;

export const HOW_TO_GET =
  "The peer is missing: no Python with SciPy was found. Debian's is `apt-get install python3-scipy`.";

/** The same job by SciPy in its own process (warm, imports not counted), or null where there is no SciPy. */
export function askPeer(mu: number, x: number, upTo: number): PeerAnswer | null {
  const python = PYTHONS.find(hasScipy);
  if (python === undefined) return null;
  const script = resolve(import.meta.dirname, "scipy_peer.py");
  const said = execFileSync(python, [script, ...[mu, x, upTo, RUNS].map(String)], { encoding: "utf8" });
  const { times, ...found } = JSON.parse(said) as Omit<PeerAnswer, "timing"> & { times: number[] };
  return { timing: summary(times), ...found };
}

function hasScipy(python: string): boolean {
  try {
    execFileSync(python, ["-c", "import scipy.integrate"], { stdio: "ignore" });
    return true;
  } catch {
    return false;
  }
}
