import { useCallback } from "react";
import type { Run } from "../model/types.ts";
import { runs as setRuns } from "../text/contents.ts";

interface Props {
  readonly runs: readonly Run[];
  readonly macros: Readonly<Record<string, string>>;
  readonly className?: string;
}

/** Running text with mathematics and numbers, set by the same hand as in the text itself. */
export function Runs({ runs, macros, className }: Props) {
  const set = useCallback(
    (place: HTMLSpanElement | null) => place?.replaceChildren(setRuns(runs, macros)),
    [runs, macros],
  );
  return <span className={className} ref={set} />;
}
