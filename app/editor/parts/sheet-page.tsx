import { lazy, Suspense, useEffect, useState } from "react";
import type { DeskOptions } from "../live/desk.ts";
import "katex/dist/katex.min.css";
import "../sheet.css";
import { SheetPreface } from "./sheet-preface.tsx";

export interface SheetPageProps extends DeskOptions {
  readonly title: string;
  /** Said on the page of one who may try but not keep: a way to sign in, or "". */
  readonly signIn: string;
  readonly nonce: string;
}

const Sheet = lazy(() => import("./sheet.tsx"));

/**
 * The sheet of one paper. The server sends the text in plain setting, so that it can be read before the live sheet is
 * here; the page then lays the live sheet over it.
 */
export function SheetPage(props: SheetPageProps) {
  const [here, setHere] = useState(false);
  useEffect(() => setHere(true), []);
  const preface = <SheetPreface title={props.title} text={props.first.text} />;
  if (!here) return <div className="hl-sheet">{preface}</div>;
  return (
    <Suspense fallback={<div className="hl-sheet">{preface}</div>}>
      <Sheet key={props.paperId} {...props} />
    </Suspense>
  );
}
