import type { Axis, Figure } from "./types.ts";

/** TeX macros by name with the backslash, as a paper's front matter gives them: `{"\\E": "\\mathbb{E}"}`. */
export type Macros = Readonly<Record<string, string>>;

/** A macro that unfolds for ever, or into a text too long for any label, is left as it stands from there on. */
const MOST_EXPANSIONS = 100;
const LONGEST = 2000;

/** A label with a paper's macros unfolded, arguments `#1` to `#9` with them: the part of TeX that labels are read by knows none. */
export function withoutMacros(tex: string, macros: Macros): string {
  let text = tex;
  for (let count = 0, from = 0; count < MOST_EXPANSIONS && text.length < LONGEST; ) {
    const found = /\\(?:[A-Za-z@]+|[^A-Za-z@])/.exec(text.slice(from));
    if (found === null) return text;
    const at = from + found.index;
    const after = at + found[0].length;
    const body = Object.hasOwn(macros, found[0]) ? macros[found[0]] : undefined;
    if (body === undefined) {
      from = after;
      continue;
    }
    count += 1;
    const taken = argumentsAt(text, after, arity(body));
    const filled = body.replace(/#([1-9])/g, (_, place: string) => taken.given[Number(place) - 1] ?? "");
    // A letter that follows must not become part of a command at the end of the macro.
    const gap = /\\[A-Za-z]+$/.test(filled) && /^[A-Za-z]/.test(text.slice(taken.to)) ? " " : "";
    text = text.slice(0, at) + filled + gap + text.slice(taken.to);
    from = at;
  }
  return text;
}

function arity(body: string): number {
  return Math.max(0, ...[...body.matchAll(/#([1-9])/g)].map(([, place]) => Number(place)));
}

/** So many arguments from a place on: groups in braces, commands or single letters. */
function argumentsAt(
  text: string,
  from: number,
  count: number,
): { readonly given: readonly string[]; readonly to: number } {
  const given: string[] = [];
  let to = from;
  while (given.length < count) {
    const begin = to + (/^\s*/.exec(text.slice(to))?.[0].length ?? 0);
    const end = groupEnd(text, begin);
    if (end === begin) break;
    given.push(text.charAt(begin) === "{" ? text.slice(begin + 1, end - 1) : text.slice(begin, end));
    to = end;
  }
  return { given, to };
}

function groupEnd(text: string, at: number): number {
  if (text.charAt(at) !== "{") return at + (/^(?:\\[A-Za-z@]+|\\.|.)/su.exec(text.slice(at))?.[0].length ?? 0);
  let depth = 0;
  for (let end = at; end < text.length; end += 1) {
    const character = text.charAt(end);
    if (character === "\\") end += 1;
    else if (character === "{") depth += 1;
    else if (character === "}" && --depth === 0) return end + 1;
  }
  return text.length;
}

/** A figure whose labels have a paper's macros unfolded; the very figure where there are none. */
export function figureWithoutMacros(figure: Figure, macros: Macros): Figure {
  if (Object.keys(macros).length === 0) return figure;
  const tex = (label: string) => withoutMacros(label, macros);
  const axis = (own: Axis): Axis => ({ ...own, label: tex(own.label) });
  const within = (inner: Figure) => figureWithoutMacros(inner, macros);
  return {
    ...figure,
    x: axis(figure.x),
    y: axis(figure.y),
    series: figure.series.map((series) => ({
      ...series,
      label: tex(series.label),
      ...(series.dots ? { dots: series.dots.map((dot) => ({ ...dot, label: tex(dot.label) })) } : {}),
    })),
    levels: figure.levels.map((level) => ({ ...level, label: tex(level.label) })),
    ...(figure.verticals
      ? { verticals: figure.verticals.map((vertical) => ({ ...vertical, label: tex(vertical.label) })) }
      : {}),
    ...(figure.inset ? { inset: { ...figure.inset, figure: within(figure.inset.figure) } } : {}),
    ...(figure.panels
      ? { panels: figure.panels.map((panel) => ({ title: tex(panel.title), figure: within(panel.figure) })) }
      : {}),
  };
}
