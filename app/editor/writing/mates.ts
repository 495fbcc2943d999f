/** Two places of a text that belong together: what stands at the caret, and its mate; null where it has none. */
export interface Mates {
  readonly own: Stretch;
  readonly mate: Stretch | null;
}

export interface Stretch {
  readonly from: number;
  readonly to: number;
}

const CLOSES: Readonly<Record<string, string>> = { "(": ")", "[": "]", "{": "}" };
const OPENS: Readonly<Record<string, string>> = { ")": "(", "]": "[", "}": "{" };

/**
 * The mate of what stands at a place: of a bracket or a dollar within its block, of a fence or a line of surroundings
 * within the text. null where none of these stands there.
 */
export function matesAt(text: string, offset: number): Mates | null {
  const lineFrom = text.lastIndexOf("\n", offset - 1) + 1;
  const lineEnd = text.indexOf("\n", offset);
  const line = text.slice(lineFrom, lineEnd === -1 ? text.length : lineEnd);
  const mark = /^(?: {0,3}`{3,}|:{3,})/.exec(line)?.[0];
  if (mark !== undefined && offset <= lineFrom + mark.length) return ofLine(text, lineFrom, mark);
  for (const at of [offset - 1, offset]) {
    const sign = text[at] ?? "";
    if (at < 0 || text[at - 1] === "\\") continue;
    const block = blockAround(text, at);
    if (sign in CLOSES) return { own: one(at), mate: bracket(text, at, 1, block) };
    if (sign in OPENS) return { own: one(at), mate: bracket(text, at, -1, block) };
    if (sign === "$") return dollars(text, at, block);
  }
  return null;
}

function one(at: number): Stretch {
  return { from: at, to: at + 1 };
}

/** Between the blank lines around a place. */
function blockAround(text: string, at: number): Stretch {
  const from = text.lastIndexOf("\n\n", at);
  const to = text.indexOf("\n\n", at);
  return { from: from === -1 ? 0 : from, to: to === -1 ? text.length : to };
}

function bracket(text: string, at: number, step: 1 | -1, block: Stretch): Stretch | null {
  const own = text[at] ?? "";
  const mate = (step === 1 ? CLOSES : OPENS)[own];
  let depth = 0;
  for (let place = at; place >= block.from && place < block.to; place += step) {
    if (text[place - 1] === "\\") continue;
    if (text[place] === own) depth += 1;
    else if (text[place] === mate) depth -= 1;
    if (depth === 0) return one(place);
  }
  return null;
}

function dollars(text: string, at: number, block: Stretch): Mates {
  const found = [...text.slice(block.from, block.to).matchAll(/(?<!\\)\$\$?/g)].map((each) => ({
    from: block.from + each.index,
    to: block.from + each.index + each[0].length,
  }));
  let open: Stretch | null = null;
  for (const each of found) {
    const touches = at >= each.from && at < each.to;
    if (open === null) {
      open = each;
      continue;
    }
    if (open.to - open.from !== each.to - each.from) continue;
    if (touches) return { own: each, mate: open };
    if (at >= open.from && at < open.to) return { own: open, mate: each };
    open = null;
  }
  return { own: found.find((each) => at >= each.from && at < each.to) ?? one(at), mate: null };
}

/** The other line of a cell or of surroundings. */
function ofLine(text: string, lineFrom: number, mark: string): Mates {
  const own = { from: lineFrom, to: lineFrom + mark.length };
  const isFence = mark.includes("`");
  const lines = isFence ? /^ {0,3}(`{3,})[ \t]*(.*)$/gm : /^(:{3,})[ \t]*(.*)$/gm;
  const open: { stretch: Stretch; mark: string }[] = [];
  for (const { index, 0: whole, 1: sign = "", 2: rest = "" } of text.matchAll(lines)) {
    const stretch = { from: index, to: index + whole.indexOf(sign) + sign.length };
    const last = open.at(-1);
    const closes = rest.trim() === "" && last !== undefined && (!isFence || sign.startsWith(last.mark));
    if (closes) {
      open.pop();
      if (stretch.from === lineFrom) return { own, mate: last.stretch };
      if (last.stretch.from === lineFrom) return { own, mate: stretch };
    } else if (!isFence || last === undefined) open.push({ stretch, mark: sign });
  }
  return { own, mate: null };
}
