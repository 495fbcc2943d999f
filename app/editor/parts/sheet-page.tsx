import { lazy, Suspense, useEffect, useRef, useState } from "react";
import type { Starts } from "../first/starts.ts";
import type { DeskOptions } from "../live/desk.ts";
import { ReaderAhead } from "../live/reader-ahead.ts";
import "katex/dist/katex.min.css";
import "../sheet.css";
import { SheetPreface } from "./sheet-preface.tsx";

export interface SheetPageProps extends Omit<DeskOptions, "takeReader"> {
  readonly title: string;
  /** Said on the page of one who may try but not keep: a way to sign in, or "". */
  readonly signIn: string;
  readonly nonce: string;
  /** Fetches what an empty paper can be begun from. */
  loadStarts(): Promise<Starts>;
}

export type SheetProps = SheetPageProps & Pick<DeskOptions, "takeReader">;

const loadSheet = () => import("./sheet.tsx");
const Sheet = lazy(loadSheet);
// On its way while the page is still being taken hold of; should it fail, the sheet asks again and says so.
if (typeof document !== "undefined") loadSheet().catch(() => undefined);

/**
 * The sheet of one paper. The server sends the text in plain setting, so that it can be read before the live sheet is
 * here; the page then lays the live sheet over it.
 */
export function SheetPage(props: SheetPageProps) {
  return <OnePaper key={props.paperId} {...props} />;
}

function OnePaper(props: SheetPageProps) {
  const [here, setHere] = useState(false);
  const [ahead] = useState(() => new ReaderAhead());
  const first = useRef(props.first);
  useEffect(() => {
    ahead.begin(first.current.text, first.current.bibliography);
    setHere(true);
    return () => ahead.end();
  }, [ahead]);
  const preface = <SheetPreface title={props.title} text={props.first.text} />;
  if (!here) return <div className="hl-sheet">{preface}</div>;
  return (
    <Suspense fallback={<div className="hl-sheet">{preface}</div>}>
      <Sheet {...props} takeReader={() => ahead.take()} />
    </Suspense>
  );
}
