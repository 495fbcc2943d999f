import { useEffect, useMemo, useState } from "react";
import type { SheetAtHand } from "../keys/types.ts";
import type { ValueNow } from "../model/messages.ts";
import { useDeskView } from "../parts/use-desk-view.ts";
import { namesWritten } from "./names.ts";
import { formulasOf } from "./paper-offers.ts";
import type { CaseKnowledge } from "./types.ts";

/** How long typing rests before what is typed is tried as a formula, in ms. */
const REST_MS = 150;

/** What the case knows now; null until the paper is read. Present values come a little later. */
export function useCaseKnowledge({ desk, view }: SheetAtHand, query: string): CaseKnowledge | null {
  const model = useDeskView(desk, (shown) => shown.model);
  const [values, setValues] = useState<ReadonlyMap<string, ValueNow>>(new Map());
  const [typed, setTyped] = useState<ValueNow | null>(null);
  useEffect(() => {
    if (model === null) return;
    let here = true;
    void desk.valuesNow(formulasOf(model)).then((now) => here && setValues(byFormula(now)));
    return () => {
      here = false;
    };
  }, [desk, model]);
  const formula = query.trim();
  useEffect(() => {
    if (!/[\d)]/.test(formula)) return setTyped(null);
    let here = true;
    const ask = () => desk.valuesNow([formula]).then(([now]) => here && setTyped(now ?? null));
    const timer = setTimeout(() => void ask(), REST_MS);
    return () => {
      here = false;
      clearTimeout(timer);
    };
  }, [desk, formula]);
  return useMemo(() => {
    if (model === null) return null;
    const known = typed === null || typed.formula !== formula ? values : new Map([...values, [typed.formula, typed]]);
    return { ...model, values: known, taken: namesWritten(view.state.doc.toString()) };
  }, [model, values, typed, formula, view]);
}

function byFormula(values: readonly ValueNow[]): ReadonlyMap<string, ValueNow> {
  return new Map(values.map((value) => [value.formula, value]));
}
