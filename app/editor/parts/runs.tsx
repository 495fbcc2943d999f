import { useCallback } from "react";
import type { Run } from "../model/types.ts";
import { runs as setRuns } from "../text/contents.ts";

interface Props {
  readonly runs: readonly Run[];
  readonly macros: Readonly<Record<string, string>>;
  readonly className?: string;
}

/**
 * Running text with mathematics and numbers, set by the same hand as in the text itself. Each answer of the worker
 * brings new objects of the same content; set anew at each keystroke, they would have the whole page laid out again.
 */
export function Runs({ runs, macros, className }: Props) {
  const content = JSON.stringify({ runs, macros });
  const set = useCallback(
    (place: HTMLSpanElement | null) => {
      const same: Pick<Props, "runs" | "macros"> = JSON.parse(content);
      place?.replaceChildren(setRuns(same.runs, same.macros));
    },
    [content],
  );
  return <span className={className} ref={set} />;
}
