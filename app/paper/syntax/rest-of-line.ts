import { markdownLineEnding, markdownSpace } from "micromark-util-character";
import type { Code, Effects, State } from "micromark-util-types";

/** What may follow a construct in lines of its own: spaces to the end of its last line, and nothing else. */
export function blankRestOfLine(effects: Effects, ok: State, nok: State): State {
  function rest(code: Code): State | undefined {
    if (code === null || markdownLineEnding(code)) return ok(code);
    if (!markdownSpace(code)) return nok(code);
    effects.enter("whitespace");
    effects.consume(code);
    effects.exit("whitespace");
    return rest;
  }
  return rest;
}
