/** What a paper can be begun from, as the page around the sheet knows it. */
export interface Starts {
  readonly all: readonly { readonly id: string; readonly words: string }[];
  /** The whole text and bibliography with a start in place of an empty body; null where it would take something away. */
  lay(id: string, text: string, author: string): { readonly text: string; readonly bibliography: string } | null;
}
