import type { Database } from "../../db/index.server.ts";

const HOUR_MS = 3_600_000;

/** Solver seconds that a person may use within any hour. What is found ready under its key costs nothing. */
export class Quota {
  readonly #computations: Database["computations"];
  readonly #seconds: number;

  constructor(computations: Database["computations"], secondsAnHour: number) {
    this.#computations = computations;
    this.#seconds = secondsAnHour;
  }

  /** The words in which more is refused, or null while there is time left. @param now milliseconds since 1970 */
  async refusal(personId: string, now: number = Date.now()): Promise<string | null> {
    const used = await this.#computations.secondsSince(personId, new Date(now - HOUR_MS));
    let total = used.reduce((sum, { seconds }) => sum + seconds, 0);
    if (total < this.#seconds) return null;
    // The oldest leave the hour first: when enough have, there is time again.
    const frees = used.find(({ seconds }) => {
      total -= seconds;
      return total < this.#seconds;
    });
    const minutes = Math.max(1, Math.ceil(((frees?.begunAt.getTime() ?? now) + HOUR_MS - now) / 60_000));
    const when = minutes === 1 ? "in a minute" : `in ${minutes} minutes`;
    return `The ${this.#seconds} s of solver time that a person has in an hour are used up. There is time again ${when}.`;
  }
}
