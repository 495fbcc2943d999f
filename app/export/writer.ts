/** A mistake that keeps the paper from print, at the paper's line. */
export interface PrintProblem {
  readonly line: number;
  readonly message: string;
}

/** Lines of LaTeX, each with the line of the paper it comes from (0: from none). */
export class LatexWriter {
  private readonly lines: string[] = [""];
  private readonly origins: number[] = [0];
  private origin = 0;

  /** What is written from here on comes from this line of the paper. */
  from(line: number): void {
    this.origin = line;
    if (this.lines.at(-1) === "") this.origins[this.origins.length - 1] = line;
  }

  write(text: string): void {
    const [first = "", ...rest] = text.split("\n");
    this.lines[this.lines.length - 1] += first;
    for (const line of rest) {
      this.lines.push(line);
      this.origins.push(this.origin);
    }
  }

  /** Text on lines of its own. */
  line(text: string): void {
    this.startLine();
    this.write(text);
    this.startLine();
  }

  startLine(): void {
    if (this.lines.at(-1) !== "") this.write("\n");
  }

  /** An empty line ends a paragraph; never two in a row. */
  paragraph(): void {
    this.startLine();
    if (this.lines.length > 1 && this.lines.at(-2) !== "") this.write("\n");
  }

  text(): string {
    return `${this.lines.join("\n").trimEnd()}\n`;
  }

  /** Line of the paper for a line of the source (both from 1); null where it comes from none. */
  originOf(texLine: number): number | null {
    return this.origins[texLine - 1] || null;
  }
}
