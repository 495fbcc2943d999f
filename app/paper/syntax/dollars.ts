import { markdownLineEnding, markdownSpace } from "micromark-util-character";
import type { Code, Construct, Effects, State, TokenizeContext } from "micromark-util-types";
import { blankRestOfLine } from "./rest-of-line.ts";
import { SourceRun } from "./source-run.ts";

const dollar = 36;
const backslash = 92;

declare module "micromark-util-types" {
  interface TokenTypeMap {
    paperMath: "paperMath";
    paperDisplay: "paperDisplay";
  }
}

/**
 * Math among words: `$…$`, and `$$…$$` that does not stand in lines of its own.
 *
 *   opened ──▶ inside ──dollar──▶ closing ──▶ ok, or inside again when the dollars do not match
 *
 * One dollar is a mere dollar when the next dollar cannot close it: before a digit, a closing dollar has no space before
 * and no digit after it ("$5 and $6"); after a space it must have a space before it ("US$ and CA$").
 */
export const mathAmongWords: Construct = { name: "paperMath", tokenize: tokenizeMath, previous: notAfterDollar };

function notAfterDollar(this: TokenizeContext, code: Code): boolean {
  return code !== dollar || this.events.at(-1)?.[1].type === "characterEscape";
}

function tokenizeMath(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
  const run = new SourceRun(effects);
  let opening = 0;
  let closing = 0;
  let beforeDigit = false;
  let beforeSpace = false;
  let afterSpace = false;

  return (code) => {
    effects.enter("paperMath");
    return opened(code);
  };

  function opened(code: Code): State | undefined {
    if (code === dollar && opening < 3) {
      opening++;
      run.consume(code);
      return opened;
    }
    if (opening > 2) return nok(code);
    beforeDigit = opening === 1 && isDigit(code);
    beforeSpace = opening === 1 && isSpace(code);
    return inside(code);
  }

  function inside(code: Code): State | undefined {
    if (code === null) return nok(code);
    if (code === dollar) {
      closing = 0;
      return atClosing(code);
    }
    if (markdownLineEnding(code)) {
      afterSpace = true;
      run.consume(code);
      return inside;
    }
    afterSpace = isSpace(code);
    run.consume(code);
    return code === backslash ? escaped : inside;
  }

  function escaped(code: Code): State | undefined {
    if (code !== dollar && code !== backslash) return inside(code);
    afterSpace = false;
    run.consume(code);
    return inside;
  }

  function atClosing(code: Code): State | undefined {
    if (code === dollar) {
      closing++;
      run.consume(code);
      return atClosing;
    }
    const closes =
      closing === opening && !(beforeDigit && (afterSpace || isDigit(code))) && !(beforeSpace && !afterSpace);
    if (closes) {
      run.close();
      effects.exit("paperMath");
      return ok(code);
    }
    if (beforeDigit || beforeSpace) return nok(code);
    afterSpace = false;
    return inside(code);
  }
}

/**
 * A display in lines of its own: `$$…$$`, on one line or several, begun at the start of a line and with nothing after
 * its end. A blank line ends the attempt, so that a display being typed does not swallow the paper.
 * @param text the text that is read: nothing is begun that no `$$` closes before a blank line
 */
export function displayIn(text: string): Construct {
  return {
    name: "paperDisplay",
    concrete: true,
    tokenize(effects, ok, nok) {
      const start = tokenizeDisplay.call(this, effects, ok, nok);
      return isClosed(text, this.now().offset) ? start : nok;
    },
  };
}

/** Whether `$$` stands between a display's beginning and the next blank line. */
function isClosed(text: string, from: number): boolean {
  const next = /\$\$|(?:\r\n?|\n)[ \t>]*(?:\r\n?|\n)/g;
  next.lastIndex = from + 2;
  return next.exec(text)?.[0] === "$$";
}

function tokenizeDisplay(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
  const parser = this.parser;
  const now = () => this.now().line;
  const run = new SourceRun(effects);
  let dollars = 0;
  let blank = false;

  return (code) => {
    effects.enter("paperDisplay");
    return opening(code);
  };

  function opening(code: Code): State | undefined {
    if (code === dollar && dollars < 3) {
      dollars++;
      run.consume(code);
      return opening;
    }
    return dollars === 2 ? inside(code) : nok(code);
  }

  function inside(code: Code): State | undefined {
    if (code === null) return nok(code);
    if (markdownLineEnding(code)) {
      if (blank) return nok(code);
      blank = true;
      run.consume(code);
      return lineStart;
    }
    if (!markdownSpace(code)) blank = false;
    run.consume(code);
    if (code === backslash) return escaped;
    return code === dollar ? secondDollar : inside;
  }

  function lineStart(code: Code): State | undefined {
    return parser.lazy[now()] ? nok(code) : inside(code);
  }

  function escaped(code: Code): State | undefined {
    if (code !== dollar && code !== backslash) return inside(code);
    run.consume(code);
    return inside;
  }

  function secondDollar(code: Code): State | undefined {
    if (code !== dollar) return inside(code);
    run.consume(code);
    run.close();
    effects.exit("paperDisplay");
    return blankRestOfLine(effects, ok, nok);
  }
}

function isDigit(code: Code): boolean {
  return code !== null && code >= 48 && code <= 57;
}

function isSpace(code: Code): boolean {
  return code !== null && (markdownSpace(code) || markdownLineEnding(code));
}
