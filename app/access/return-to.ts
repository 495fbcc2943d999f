/**
 * Where to go after signing in: a path of this program, or `otherwise`.
 * An address that a browser could read as another site's is never followed.
 */
export function safeReturnTo(wanted: unknown, otherwise: string): string {
  if (typeof wanted !== "string" || !wanted.startsWith("/")) return otherwise;
  const base = "http://halfline.invalid";
  if (!URL.canParse(wanted, base)) return otherwise;
  const url = new URL(wanted, base);
  const path = url.pathname + url.search + url.hash;
  // "//evil.example" and "/\evil.example" are addresses of other hosts.
  return url.origin === base && !/^\/[/\\]/.test(path) ? path : otherwise;
}
