/** Faces that formulas of a paper are mostly set in, as their style sheet names them. */
const FACES = [
  "1em KaTeX_Main",
  "italic 1em KaTeX_Math",
  "1em KaTeX_AMS",
  "1em KaTeX_Size1",
  "1em KaTeX_Size2",
] as const;

/**
 * Fetches the faces of formulas before the first formula is set: set in another face, lines break elsewhere, and the
 * text moves when the right one comes. Never fails: without them formulas are set as they can be.
 */
export async function fetchMathFonts(): Promise<void> {
  if (!("fonts" in document)) return;
  await Promise.allSettled(FACES.map((face) => document.fonts.load(face)));
}
