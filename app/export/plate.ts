import { type Figure, figureToPgfplots } from "../figures/index.ts";
import type { SetPaper } from "../print/index.ts";
import type { LatexPaper } from "./latex.ts";
import { paperMacros } from "./macros.ts";
import { preamble } from "./preamble.ts";
import { Printing } from "./printing.ts";

const POINTS = "points.dat";

/**
 * The LaTeX source of one figure alone, on a page of its own size.
 * @param set the paper it belongs to, for its macros
 * @param line where its cell stands
 * @param widthMm 120, as wide as a column of text in print, or 76
 */
export function plateToLatex(figure: Figure, set: SetPaper, line: number, widthMm: number): LatexPaper {
  const macros = paperMacros(set.paper.front.macros);
  const printing = new Printing(set, macros.known, false);
  const { tex, data } = figureToPgfplots(figure, {
    dataFile: POINTS,
    widthMm,
    setMath: (label) => printing.math(label, line),
    setText: (label) => printing.text(label, line),
  });
  const head = preamble({
    cropped: true,
    lineNumbers: false,
    greek: /[\u0370-\u03ff\u1f00-\u1fff]/.test(tex),
    cyrillic: tex.includes("\\cyr{"),
    macros: macros.definitions,
  });
  const text = [...head, "\\begin{document}%", `${tex.trim()}%`, "\\end{document}", ""].join("\n");
  return {
    files: [
      { name: "main.tex", text },
      { name: POINTS, text: data },
    ],
    lineMap: () => line,
    problems: printing.problems,
  };
}
