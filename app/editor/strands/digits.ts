/** Of a bound number in prose: `:value[…]` with its braces, if it has any. */
const NUMBER = /^:value\[[\s\S]*?\](?:\{([^{}]*)\})?$/;

export const MOST_DIGITS = 15;
/** What is printed when nothing is said. */
export const USUAL_DIGITS = 6;

/** The digits that a number's source asks for; null where it is no number, or is told decimals instead. */
export function digitsOf(source: string): number | null {
  const found = NUMBER.exec(source);
  if (found === null || /\bdecimals\s*=/.test(found[1] ?? "")) return null;
  const digits = /\bdigits\s*=\s*"?(\d+)"?/.exec(found[1] ?? "")?.[1];
  return digits === undefined ? USUAL_DIGITS : Number(digits);
}

/** The source of a number with as many digits, all else as it was; null where `digitsOf` is. */
export function withDigits(source: string, digits: number): string | null {
  if (digitsOf(source) === null) return null;
  const said = `digits=${Math.min(MOST_DIGITS, Math.max(1, digits))}`;
  if (/\bdigits\s*=\s*"?\d+"?(?=[^\]]*\}$)/.test(source)) {
    return source.replace(/\bdigits\s*=\s*"?\d+"?(?=[^\]]*\}$)/, said);
  }
  if (!source.endsWith("}")) return `${source}{${said}}`;
  const inside = source.slice(0, -1);
  return inside.endsWith("{") ? `${inside}${said}}` : `${inside} ${said}}`;
}
