import { lazy, Suspense } from "react";
import { Strip } from "../keys/strip.tsx";
import type { SheetAtHand } from "../keys/types.ts";
import { useStrips } from "../keys/use-strips.ts";

const ParameterEntry = lazy(async () => ({ default: (await import("./reading-rule.ts")).ParameterEntry }));

/** The entry that opens beneath the rule, or from below on a narrow page: one parameter, or a new one. */
export function RuleEntry({ sheet }: { readonly sheet: SheetAtHand }) {
  const open = useStrips(sheet.strips, (strips) => strips.open === "parameter");
  const about = useStrips(sheet.strips, (strips) => strips.about);
  if (!open) return null;
  return (
    <div className="hl-entry">
      <Strip key={about} title={about ?? "A new parameter"} onClose={() => sheet.strips.set({ open: null })}>
        <Suspense fallback={<p className="hl-strip-words">Reading the paper</p>}>
          <ParameterEntry sheet={sheet} name={about} />
        </Suspense>
      </Strip>
    </div>
  );
}
