import { markdownLineEnding } from "micromark-util-character";
import type { Code, Effects } from "micromark-util-types";

declare module "micromark-util-types" {
  interface TokenTypeMap {
    paperSource: "paperSource";
  }
}

/**
 * Consumes the characters of a mark that may go over several lines: line endings become tokens of their own, as the
 * tokenizer demands, and what stands between them tokens of source.
 */
export class SourceRun {
  private open = false;

  constructor(private readonly effects: Effects) {}

  consume(code: Code): void {
    if (markdownLineEnding(code)) {
      this.close();
      this.effects.enter("lineEnding");
      this.effects.consume(code);
      this.effects.exit("lineEnding");
      return;
    }
    if (!this.open) this.effects.enter("paperSource");
    this.open = true;
    this.effects.consume(code);
  }

  /** Call before the mark's own token ends, and before anything else is attempted. */
  close(): void {
    if (this.open) this.effects.exit("paperSource");
    this.open = false;
  }
}
