/** What no paper's own text has outside mathematics, and LaTeX has. */
const OF_LATEX =
  /\\(?:(?:sub)*section|emph|text(?:bf|it|tt)|(?:paren|text)?cite[pt]?|(?:eq|c|C|auto)?ref|footnote|item)\b|\\begin\{|\\\(|\\\[/;
/** What a paper's text has and LaTeX has not. */
const OF_A_PAPER = /^:::|^#{1,6} |^ {0,3}```|:(?:value|ref|cite)\[/m;

/** Whether a text is LaTeX that may be converted, by its look: what a paper itself holds never is. */
export function looksLikeLatex(text: string): boolean {
  return OF_LATEX.test(text.replace(/\$\$[\s\S]*?\$\$|\$[^$\n]*\$/g, "")) && !OF_A_PAPER.test(text);
}
