import katex from "katex";

/**
 * Formulas as HTML with MathML beside it, made on the server and in the page alike. The TeX is hostile: nothing in it is
 * trusted, and expansion, size and length are bounded.
 */

/** A macro that unfolds for ever is stopped after this many steps; the longest display of a paper needs about a hundred. */
const MOST_EXPANSIONS = 500;
/** No rule or space may be longer than this [em]. */
const LARGEST_SIZE_EM = 20;
/** Longer than any formula; a text of this length costs about 40 ms. */
const LONGEST_TEX = 10_000;
/** Formulas kept as set, the least recently used forgotten first. */
const KEPT_FORMULAS = 2_000;

const kept = new Map<string, string>();

/**
 * A formula as HTML.
 * @param tex TeX without dollars; numbers already put in, labels taken out (`mathTex` of app/paper)
 * @param display set as a display, else in a line
 * @param macros TeX macros of the paper's front matter: `{"\\E": "\\mathbb{E}"}`
 * @param classes what `\htmlClass` may name, put in by our own hand; it may name nothing when left out
 * @returns safe HTML; what cannot be set comes back as its source with ‡ and the reason
 */
export function renderMath(
  tex: string,
  display: boolean,
  macros: Readonly<Record<string, string>> = {},
  classes: RegExp | null = null,
): string {
  const key = `${display ? "D" : "I"}${classes?.source ?? ""}${JSON.stringify(macros)}${tex}`;
  const known = kept.get(key);
  if (known !== undefined) {
    kept.delete(key);
    kept.set(key, known);
    return known;
  }
  const html = setFormula(tex, display, macros, classes);
  kept.set(key, html);
  if (kept.size > KEPT_FORMULAS) kept.delete(kept.keys().next().value ?? "");
  return html;
}

function setFormula(
  tex: string,
  display: boolean,
  macros: Readonly<Record<string, string>>,
  classes: RegExp | null,
): string {
  if (tex.length > LONGEST_TEX)
    return unset(tex.slice(0, 40), `The formula has ${tex.length} characters; ${LONGEST_TEX} can be set.`);
  try {
    return katex.renderToString(tex, {
      displayMode: display,
      throwOnError: true,
      trust: classes === null ? false : (asked) => asked.command === "\\htmlClass" && classes.test(asked.class),
      strict: "ignore",
      maxExpand: MOST_EXPANSIONS,
      maxSize: LARGEST_SIZE_EM,
      // A copy: TeX's global definitions would otherwise change the macros of every later formula.
      macros: { ...macros },
    });
  } catch (error) {
    return unset(classes === null ? tex : tex.replace(/\\htmlClass\{[^{}]*\}/g, ""), reasonOf(error));
  }
}

/** The first macro of a formula that nobody has defined, with its backslash; null: there is none. */
export function unknownMacro(tex: string, macros: Readonly<Record<string, string>>): string | null {
  if (tex.length > LONGEST_TEX) return null;
  try {
    katex.renderToString(tex, {
      throwOnError: true,
      strict: "ignore",
      maxExpand: MOST_EXPANSIONS,
      macros: { ...macros },
    });
    return null;
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    return /Undefined control sequence: (\\[A-Za-z]+)/.exec(reason)?.[1] ?? null;
  }
}

/** Why a formula cannot be set; "" when it can. */
export function mathFault(tex: string, macros: Readonly<Record<string, string>>): string {
  const reason = /class="math-unset" title="([^"]*)"/.exec(renderMath(tex, false, macros))?.[1] ?? "";
  return reason.replaceAll("&quot;", '"').replaceAll("&lt;", "<").replaceAll("&gt;", ">").replaceAll("&amp;", "&");
}

/** What KaTeX says of its place ("at position 3: …") repeats the source, which stands beside it. */
function reasonOf(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const said = message.replace(/^KaTeX parse error:\s*/, "").replace(/\s+at (?:position|end of input)[\s\S]*$/, "");
  if (/Too many expansions/.test(message)) return "A macro in this formula unfolds without end.";
  return `This formula cannot be set: ${said}.`;
}

function unset(tex: string, reason: string): string {
  const words = escapeHtml(reason);
  return `<span class="math-unset" title="${words}"><code>${escapeHtml(tex)}</code><span class="math-unset-mark">‡</span><span class="sr-only"> ${words}</span></span>`;
}

function escapeHtml(text: string): string {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;").replaceAll('"', "&quot;");
}
