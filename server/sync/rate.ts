/** A bucket of tokens that fills at a steady rate: short bursts pass, a lasting flood does not. */
export class TokenBucket {
  readonly #capacity: number;
  readonly #perSecond: number;
  #tokens: number;
  #at: number;

  /** @param capacity tokens of a burst  @param perSecond tokens gained a second  @param now milliseconds */
  constructor(capacity: number, perSecond: number, now: number) {
    this.#capacity = capacity;
    this.#perSecond = perSecond;
    this.#tokens = capacity;
    this.#at = now;
  }

  /** Takes `tokens` if they are there. @param now milliseconds, never earlier than at the call before */
  take(tokens: number, now: number): boolean {
    this.#tokens = Math.min(this.#capacity, this.#tokens + ((now - this.#at) / 1000) * this.#perSecond);
    this.#at = now;
    if (tokens > this.#tokens) return false;
    this.#tokens -= tokens;
    return true;
  }
}
