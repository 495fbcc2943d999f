import { asciiAlpha, markdownLineEnding, markdownSpace } from "micromark-util-character";
import type { Code, Construct, Effects, State, TokenizeContext } from "micromark-util-types";
import { SourceRun } from "./source-run.ts";

const colon = 58;
const openBracket = 91;
const closeBracket = 93;
const openBrace = 123;
const closeBrace = 125;
const quotationMark = 34;

/** Longest label and longest attributes, in characters: bounds the work that an unclosed bracket costs. */
const longestLabel = 2000;
const longestAttributes = 400;

const names = ["value", "ref", "cite"];
const longestName = Math.max(...names.map((name) => name.length));

declare module "micromark-util-types" {
  interface TokenTypeMap {
    paperDirective: "paperDirective";
    paperAttributes: "paperAttributes";
    paperFence: "paperFence";
  }
}

/**
 * `:value[…]{…}`, `:ref[…]`, `:cite[…]{…}`: one token each, whose label is not read as Markdown, so that stars and
 * underscores of a formula stay what they are. Every other colon is plain text.
 */
export const directive: Construct = { name: "paperDirective", tokenize: tokenizeDirective, previous: notAfterColon };

const attributes: Construct = { tokenize: tokenizeAttributes, partial: true };

function notAfterColon(this: TokenizeContext, code: Code): boolean {
  return code !== colon || this.events.at(-1)?.[1].type === "characterEscape";
}

function tokenizeDirective(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
  const run = new SourceRun(effects);
  let name = "";
  let depth = 0;
  let length = 0;

  return (code) => {
    effects.enter("paperDirective");
    run.consume(code);
    return inName;
  };

  function inName(code: Code): State | undefined {
    if (code === openBracket && names.includes(name)) return inLabel(code);
    if (code === null || !asciiAlpha(code) || name.length >= longestName) return nok(code);
    name += String.fromCharCode(code);
    run.consume(code);
    return inName;
  }

  function inLabel(code: Code): State | undefined {
    if (code === null || ++length > longestLabel) return nok(code);
    if (code === openBracket) depth++;
    if (code === closeBracket) depth--;
    run.consume(code);
    return depth === 0 ? afterLabel : inLabel;
  }

  function afterLabel(code: Code): State | undefined {
    run.close();
    return code === openBrace ? effects.attempt(attributes, done, done)(code) : done(code);
  }

  function done(code: Code): State | undefined {
    run.close();
    effects.exit("paperDirective");
    return ok(code);
  }
}

function tokenizeAttributes(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
  const run = new SourceRun(effects);
  let quoted = false;
  let length = 0;

  return (code) => {
    effects.enter("paperAttributes");
    run.consume(code);
    return inside;
  };

  function inside(code: Code): State | undefined {
    if (code === null || ++length > longestAttributes) return nok(code);
    if (code === quotationMark) quoted = !quoted;
    run.consume(code);
    if (code !== closeBrace || quoted) return inside;
    run.close();
    effects.exit("paperAttributes");
    return ok;
  }
}

/**
 * A line that opens (`:::theorem[Shift]{#shift}`) or closes (`:::`) surroundings. Only the line is a token; opening and
 * closing lines are paired in the tree, so that surroundings of equally many colons nest.
 */
export const environmentFence: Construct = { name: "paperFence", tokenize: tokenizeFence };

function tokenizeFence(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
  let colons = 0;

  return (code) => {
    effects.enter("paperFence");
    return inColons(code);
  };

  function inColons(code: Code): State | undefined {
    if (code === colon) {
      colons++;
      effects.consume(code);
      return inColons;
    }
    const begins = code === null || asciiAlpha(code) || markdownSpace(code) || markdownLineEnding(code);
    if (colons < 3 || !begins) return nok(code);
    return asciiAlpha(code) ? inLine(code) : inEnd(code);
  }

  function inLine(code: Code): State | undefined {
    if (code === null || markdownLineEnding(code)) return end(code);
    effects.consume(code);
    return inLine;
  }

  function inEnd(code: Code): State | undefined {
    if (code === null || markdownLineEnding(code)) return end(code);
    if (!markdownSpace(code)) return nok(code);
    effects.consume(code);
    return inEnd;
  }

  function end(code: Code): State | undefined {
    effects.exit("paperFence");
    return ok(code);
  }
}
