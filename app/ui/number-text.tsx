import type { ReactNode } from "react";

const RAISED = "⁰¹²³⁴⁵⁶⁷⁸⁹⁻";
const RAISED_PLAIN = "0123456789−";

/** A printed number; the exponent's own characters differ from face to face, so the digits are raised instead. */
export function NumberText({ text }: { readonly text: string }): ReactNode {
  const at = text.search(/[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]/);
  if (at < 0) return text;
  const exponent = /^[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]+/.exec(text.slice(at))?.[0] ?? "";
  return (
    <>
      {text.slice(0, at)}
      <sup>{[...exponent].map((char) => RAISED_PLAIN[RAISED.indexOf(char)]).join("")}</sup>
      {text.slice(at + exponent.length)}
    </>
  );
}
