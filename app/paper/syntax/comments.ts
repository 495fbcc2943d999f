import { markdownLineEnding } from "micromark-util-character";
import type { Code, Construct, Effects, State, TokenizeContext } from "micromark-util-types";
import { blankRestOfLine } from "./rest-of-line.ts";
import { SourceRun } from "./source-run.ts";

const opening = [60, 33, 45, 45]; // <!--
const dash = 45;
const greater = 62;

declare module "micromark-util-types" {
  interface TokenTypeMap {
    paperComment: "paperComment";
  }
}

/**
 * Comments `<!-- … -->`: among words, and in lines of their own (there they may hold blank lines). A comment that is
 * not closed is text. Made anew for each reading, since each remembers where no closing is left: else a text of many
 * openings would take quadratic time.
 * @param text the text that is read: nothing is begun that its end leaves open
 */
export function comments(text: string): { amongWords: Construct; inLines: Construct } {
  const lastClosing = text.lastIndexOf("-->");
  return { amongWords: commentConstruct(false, lastClosing), inLines: commentConstruct(true, lastClosing) };
}

function commentConstruct(inLines: boolean, lastClosing: number): Construct {
  /** No comment that opens between these offsets is closed. */
  let unclosed = { from: -1, to: -1 };

  function tokenize(this: TokenizeContext, effects: Effects, ok: State, nok: State): State {
    const parser = this.parser;
    const now = () => this.now();
    const start = now().offset;
    const run = new SourceRun(effects);
    let matched = 0;
    let dashes = 0;

    return (code) => {
      if (start > lastClosing || (start >= unclosed.from && start <= unclosed.to)) return nok(code);
      effects.enter("paperComment");
      return inOpening(code);
    };

    function inOpening(code: Code): State | undefined {
      if (code !== opening[matched]) return nok(code);
      run.consume(code);
      matched++;
      if (matched < opening.length) return inOpening;
      // The dashes of the opening may be those of the end: <!--> is a comment in CommonMark.
      dashes = 2;
      return inside;
    }

    function inside(code: Code): State | undefined {
      if (code === null) {
        unclosed = { from: start, to: now().offset };
        return nok(code);
      }
      if (code === greater && dashes >= 2) {
        run.consume(code);
        run.close();
        effects.exit("paperComment");
        return inLines ? blankRestOfLine(effects, ok, nok) : ok;
      }
      dashes = code === dash ? dashes + 1 : 0;
      if (markdownLineEnding(code)) {
        run.consume(code);
        return inLines ? lineStart : inside;
      }
      run.consume(code);
      return inside;
    }

    function lineStart(code: Code): State | undefined {
      return parser.lazy[now().line] ? nok(code) : inside(code);
    }
  }

  return { name: "paperComment", tokenize, concrete: inLines };
}
