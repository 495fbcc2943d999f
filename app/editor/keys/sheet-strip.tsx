import { lazy, Suspense } from "react";
import { ErrataList } from "../finding/errata-list.tsx";
import { FindStrip } from "../finding/find-strip.tsx";
import { useAxesStrip } from "../plates/use-axes-strip.ts";
import { bindingWords } from "./binding.ts";
import { CommandList } from "./command-list.tsx";
import { Strip } from "./strip.tsx";
import type { SheetAtHand, StripName } from "./types.ts";
import { useStrips } from "./use-strips.ts";

interface Props {
  readonly sheet: SheetAtHand;
  readonly personId: string | null;
}

const reading = () => import("../finding/reading-strips.ts");
const OutlineStrip = lazy(async () => ({ default: (await reading()).OutlineStrip }));
const RenameStrip = lazy(async () => ({ default: (await reading()).RenameStrip }));
const CaseStrip = lazy(async () => ({ default: (await import("../case/case-strip.tsx")).CaseStrip }));
const AxesStrip = lazy(async () => ({ default: (await import("../plates/axes-strip.tsx")).AxesStrip }));
const QuoteStrip = lazy(async () => ({ default: (await import("../quoting/quote-strip.tsx")).QuoteStrip }));
const FETCHING = <p className="hl-strip-words">Reading the paper</p>;

/** What opens above the tail line; a parameter's entry opens beneath the rule. */
type TailStrip = Exclude<StripName, "parameter">;

const TITLES: Readonly<Record<TailStrip, string>> = {
  commands: "Commands",
  find: "Find",
  rename: "Rename",
  outline: "Outline",
  errata: "Errata",
  axes: "Axes",
  case: "The case",
  quote: "Quote a value",
};

/** What stands above the tail line: the strip that is open, and word of the composing key while it waits. */
export function SheetStrip({ sheet, personId }: Props) {
  useAxesStrip(sheet);
  const open = useStrips(sheet.strips, (strips) => strips.open);
  const composing = useStrips(sheet.strips, (strips) => strips.composing);
  const binding = useStrips(sheet.strips, (strips) => strips.binding);
  return (
    <>
      {open === null || open === "parameter" ? null : (
        <Strip key={open} title={TITLES[open]} onClose={() => sheet.strips.set({ open: null })}>
          <Body open={open} sheet={sheet} personId={personId} />
        </Strip>
      )}
      {composing ? (
        <p className="hl-composing" aria-hidden="true">
          <kbd>{bindingWords(binding)}</kbd> and a letter; <kbd>?</kbd> lists them, <kbd>Esc</kbd> leaves
        </p>
      ) : null}
    </>
  );
}

function Body({ open, sheet, personId }: Props & { readonly open: TailStrip }) {
  switch (open) {
    case "errata":
      return <ErrataList sheet={sheet} />;
    case "find":
      return <FindStrip sheet={sheet} />;
    case "outline":
      return (
        <Suspense fallback={FETCHING}>
          <OutlineStrip sheet={sheet} />
        </Suspense>
      );
    case "rename":
      return (
        <Suspense fallback={FETCHING}>
          <RenameStrip sheet={sheet} />
        </Suspense>
      );
    case "quote":
      return (
        <Suspense fallback={FETCHING}>
          <QuoteStrip sheet={sheet} />
        </Suspense>
      );
    case "case":
      return (
        <Suspense fallback={FETCHING}>
          <CaseStrip sheet={sheet} />
        </Suspense>
      );
    case "axes":
      return (
        <Suspense fallback={FETCHING}>
          <AxesStrip sheet={sheet} />
        </Suspense>
      );
    case "commands":
      return <CommandList sheet={sheet} personId={personId} />;
  }
}
