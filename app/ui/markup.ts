/**
 * The one door through which ready-made HTML enters React. Only what a part of ours has made may pass: `renderMath`,
 * `renderGalley`. Never a text that somebody wrote.
 */
export function ourMarkup(html: string): { readonly dangerouslySetInnerHTML: { readonly __html: string } } {
  return { dangerouslySetInnerHTML: { __html: html } };
}
