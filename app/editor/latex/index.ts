/** LaTeX from elsewhere as text of a paper; fetched by the page when some is pasted. */
export { type Conversion, convertLatex } from "./convert.ts";
export { conversionWords } from "./told.ts";
