const GREEK = new Set(
  (
    "alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon phi chi psi omega " +
    "Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega varepsilon vartheta varrho varsigma varphi"
  ).split(" "),
);

/**
 * The TeX symbol of a parameter that gives none: Greek where its name is a Greek letter, what follows an underscore or
 * final digits as its subscript, several letters upright. "mu" → \mu, "x0" → x_{0}, "beta_max" → \beta_{\mathrm{max}}.
 */
export function defaultSymbol(name: string): string {
  const parts = /^([A-Za-z]+?)_?(\d+)$/.exec(name) ?? /^([A-Za-z]+)_(\w+)$/.exec(name);
  const [, stem, subscript] = parts ?? [];
  if (stem === undefined || subscript === undefined) return letters(name);
  return `${letters(stem)}_{${subscript.split("_").map(letters).join(",")}}`;
}

function letters(word: string): string {
  if (GREEK.has(word)) return `\\${word}`;
  return word.length === 1 || /^\d+$/.test(word) ? word : `\\mathrm{${word.replaceAll("_", "\\_")}}`;
}
