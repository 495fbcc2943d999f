import {
  lazy,
  type RefObject,
  Suspense,
  useEffect,
  useLayoutEffect,
  useRef,
  useState,
  useSyncExternalStore,
} from "react";
import { hasEmptyBody } from "../first/empty-body.ts";
import { keepFolds } from "../folding/kept-folds.ts";
import { SheetStrip } from "../keys/sheet-strip.tsx";
import type { SheetAtHand } from "../keys/types.ts";
import { useSheetAtHand } from "../keys/use-strips.ts";
import { Desk } from "../live/desk.ts";
import { NumberSlip } from "../strands/number-slip.tsx";
import { SheetStrands } from "../strands/sheet-strands.tsx";
import { StrandHeads } from "../strands/strand-heads.tsx";
import { useStrandWatch } from "../strands/use-strands.ts";
import type { StrandWatch } from "../strands/watch.ts";
import { BibliographyPlace } from "./bibliography-place.tsx";
import { SheetHead, SheetNotices, SheetRule, SheetVoice } from "./sheet-head.tsx";
import type { SheetProps } from "./sheet-page.tsx";
import { PlainText } from "./sheet-preface.tsx";
import { SheetTail } from "./sheet-tail.tsx";
import { useDeskView } from "./use-desk-view.ts";

/** The live sheet: running head, rule, text, bibliography, tail line, over one desk. */
export default function Sheet(props: SheetProps) {
  const place = useRef<HTMLDivElement>(null);
  const sheet = useRef<HTMLDivElement>(null);
  const desk = useDesk(props, place);
  const personId = props.person?.id ?? null;
  const strands = useStrandWatch(desk, sheet, personId);
  const ready = useReady(desk);
  const atHand = useSheetAtHand({ desk, strands, ready, writes: props.writes, paperId: props.paperId, personId });
  useKeptFolds(atHand, personId);
  return (
    <div className="hl-sheet" ref={sheet}>
      {desk === null ? null : (
        <>
          <SheetHead desk={desk} props={props} onCommand={(open) => atHand?.strips.set({ open })} />
          <SheetRule desk={desk} text={props.first.text} sheet={atHand} />
          {strands === null ? null : <Heads desk={desk} strands={strands} />}
          <SheetNotices desk={desk} props={props} />
          <SheetVoice desk={desk} />
        </>
      )}
      <main className="hl-column">
        {desk === null || strands === null ? null : <SheetStrands desk={desk} watch={strands} />}
        {desk === null ? null : <Preface desk={desk} props={props} place={place} />}
        <div ref={place} className="hl-text hl-untyped" />
        {desk === null || atHand === null || !props.writes ? null : (
          <WhileEmpty desk={desk} sheet={atHand} props={props} />
        )}
        {desk === null ? null : <BibliographyPlace desk={desk} />}
      </main>
      {desk === null ? null : (
        <div className="hl-foot">
          {atHand === null ? null : <SheetStrip sheet={atHand} personId={personId} />}
          <SheetTail desk={desk} writes={props.writes} strands={strands} />
        </div>
      )}
      {desk === null || strands === null ? null : (
        <NumberSlip desk={desk} watch={strands} sheet={sheet} writes={props.writes} />
      )}
    </div>
  );
}

/** What a person has folded in this paper on this machine. */
function useKeptFolds(sheet: SheetAtHand | null, personId: string | null): void {
  useEffect(() => (sheet === null ? undefined : keepFolds(sheet.view, sheet.paperId, personId)), [sheet, personId]);
}

/** Opens the desk when the place is on the page, and ends it with the page. */
function useDesk(props: SheetProps, place: RefObject<HTMLDivElement | null>): Desk | null {
  const [desk, setDesk] = useState<Desk | null>(null);
  const first = useRef(props);
  // Before the first paint, so that the head does not go and come.
  useLayoutEffect(() => {
    if (place.current === null) return;
    const { nonce, ...options } = first.current;
    const opened = new Desk(options, place.current, nonce);
    setDesk(opened);
    return () => opened.end();
  }, [place]);
  return desk;
}

/** Whether the text stands on the sheet. */
function useReady(desk: Desk | null): boolean {
  return useSyncExternalStore(
    (onChange) => desk?.store.watch(onChange) ?? (() => {}),
    () => desk?.store.get().ready ?? false,
  );
}

interface PartProps {
  readonly desk: Desk;
  readonly props: SheetProps;
}

/** The plain setting, until the text is typeset. The text's own place is the editor's, so its class is set by hand. */
function Preface({ desk, props, place }: PartProps & { readonly place: RefObject<HTMLDivElement | null> }) {
  const typeset = useDeskView(desk, ({ ready, model }) => ready && model !== null);
  useEffect(() => {
    place.current?.classList.toggle("hl-untyped", !typeset);
  }, [typeset, place]);
  return typeset ? null : (
    <div className="hl-preface">
      <PlainText title={props.title} text={props.first.text} />
    </div>
  );
}

const EmptyPaper = lazy(async () => ({ default: (await import("../first/empty-paper.tsx")).EmptyPaper }));

function WhileEmpty({ desk, sheet, props }: PartProps & { readonly sheet: SheetAtHand }) {
  const empty = useDeskView(desk, ({ model }) => model !== null && hasEmptyBody(sheet.view.state.doc));
  return empty ? (
    <Suspense fallback={null}>
      <EmptyPaper sheet={sheet} author={props.person?.name ?? ""} loadStarts={props.loadStarts} />
    </Suspense>
  ) : null;
}

function Heads({ desk, strands }: { readonly desk: Desk; readonly strands: StrandWatch }) {
  const parameters = useDeskView(desk, ({ model }) => model?.parameters ?? null);
  return parameters === null || parameters.length === 0 ? null : (
    <StrandHeads watch={strands} parameters={parameters} />
  );
}
