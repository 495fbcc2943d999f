/** Faces that figures are set in: the page's own name, and the one that stands in a figure's file. */
const FACES: ReadonlyMap<string, string> = new Map([
  ["Commissioner Variable", "Commissioner"],
  ["KaTeX_Math", "KaTeX_Math"],
]);

/** The style by which a picture brings the page's faces with it: those parts alone that its words need. */
export async function facesFor(words: string): Promise<string> {
  const rules = [...document.styleSheets].flatMap((sheet) => faceRules(sheet).map((rule) => ({ rule, sheet })));
  const wanted = rules.flatMap(({ rule, sheet }) => {
    const family = FACES.get(rule.style.getPropertyValue("font-family").replaceAll(/["']/g, ""));
    const source = /url\(["']?([^"')]+)["']?\)/.exec(rule.style.getPropertyValue("src"))?.[1];
    if (family === undefined || source === undefined || !covers(rule.style.getPropertyValue("unicode-range"), words))
      return [];
    return [{ family, rule, address: new URL(source, sheet.href ?? document.baseURI).href }];
  });
  const faces = wanted.map(async ({ family, rule, address }) => {
    const [style, weight] = ["font-style", "font-weight"].map((name) => rule.style.getPropertyValue(name) || "normal");
    const data = await inBase64(await (await fetch(address)).arrayBuffer());
    return `@font-face{font-family:${family};font-style:${style};font-weight:${weight};src:url(data:font/woff2;base64,${data})}`;
  });
  return (await Promise.all(faces)).join("\n");
}

function faceRules(sheet: CSSStyleSheet): CSSFontFaceRule[] {
  try {
    return [...sheet.cssRules].filter((rule) => rule instanceof CSSFontFaceRule);
  } catch {
    // A sheet of another origin does not show its rules; none of ours is.
    return [];
  }
}

/** Whether some letter of the words lies in a range such as `U+0000-00FF, U+0131`; everything does in none. */
export function covers(ranges: string, words: string): boolean {
  if (ranges.trim() === "") return true;
  const ends = ranges.split(",").map((range) => {
    const [from = "", to = from] = range.trim().replace(/^u\+/i, "").split("-");
    return [Number.parseInt(from.replaceAll("?", "0"), 16), Number.parseInt(to.replaceAll("?", "F"), 16)] as const;
  });
  return [...words].some((letter) => {
    const code = letter.codePointAt(0) ?? 0;
    return ends.some(([from, to]) => code >= from && code <= to);
  });
}

function inBase64(data: ArrayBuffer): Promise<string> {
  const reader = new FileReader();
  return new Promise((give, refuse) => {
    reader.onload = () => give(String(reader.result).replace(/^[^,]*,/, ""));
    reader.onerror = () => refuse(new Error("A face could not be read."));
    reader.readAsDataURL(new Blob([data]));
  });
}
