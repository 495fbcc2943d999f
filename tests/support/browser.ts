/** As much of a browser as signing in needs: cookies by host, redirects followed one at a time, forms read off pages. */
export class Browser {
  readonly #jars = new Map<string, Map<string, string>>();

  /** Asks once, without following; the cookies of the answer are kept. */
  async ask(url: string, init: RequestInit = {}): Promise<Response> {
    const { origin } = new URL(url);
    const headers = new Headers(init.headers);
    if (!headers.has("Accept")) headers.set("Accept", "text/html");
    const cookies = this.cookies(origin);
    if (cookies !== "") headers.set("Cookie", cookies);
    if (init.method && init.method !== "GET" && !headers.has("Origin")) headers.set("Origin", origin);
    const answer = await fetch(url, { ...init, headers, redirect: "manual" });
    for (const cookie of answer.headers.getSetCookie()) this.#keep(origin, cookie);
    return answer;
  }

  /** Asks, and follows redirects by GET as a browser does after a form. */
  async open(url: string, init: RequestInit = {}): Promise<Response & { readonly at: string }> {
    let at = url;
    let answer = await this.ask(at, init);
    for (let hops = 0; answer.status >= 300 && answer.status < 400; hops += 1) {
      if (hops > 10) throw new Error(`More than ten redirects from ${url}; the last leads to ${at}.`);
      at = new URL(answer.headers.get("Location") ?? "", at).href;
      answer = await this.ask(at);
    }
    return Object.assign(answer, { at });
  }

  /** The `Cookie` header for an origin. */
  cookies(origin: string): string {
    const jar = this.#jars.get(origin) ?? new Map<string, string>();
    return [...jar].map(([name, value]) => `${name}=${value}`).join("; ");
  }

  /** Takes over what another browser has. */
  setCookie(origin: string, name: string, value: string): void {
    this.#keep(origin, `${name}=${value}`);
  }

  #keep(origin: string, cookie: string): void {
    const [pair = "", ...attributes] = cookie.split(";").map((part) => part.trim());
    const at = pair.indexOf("=");
    const jar = this.#jars.get(origin) ?? new Map<string, string>();
    this.#jars.set(origin, jar);
    if (attributes.some((attribute) => attribute.toLowerCase() === "max-age=0")) jar.delete(pair.slice(0, at));
    else jar.set(pair.slice(0, at), pair.slice(at + 1));
  }
}

export function form(fields: Readonly<Record<string, string>>): RequestInit {
  return { method: "POST", body: new URLSearchParams(fields) };
}

/** The hidden fields of the first form of a page. */
export function hiddenFields(html: string): Record<string, string> {
  const first = html.slice(0, html.indexOf("</form>"));
  const fields = [...first.matchAll(/type="hidden" name="([^"]*)" value="([^"]*)"/g)];
  return Object.fromEntries(
    fields.map(([, name = "", value = ""]) => [
      name,
      value.replace(/&#(\d+);/g, (_, code: string) => String.fromCharCode(Number(code))),
    ]),
  );
}
