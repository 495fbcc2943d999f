import { Command } from "../../ui/index.ts";
import type { Desk } from "../live/desk.ts";
import { followBack, followStrand } from "./follow.ts";
import { GlossLine } from "./gloss-text.tsx";
import { MODE_WORDS } from "./mode.ts";
import { useStrands } from "./use-strands.ts";
import type { StrandWatch } from "./watch.ts";

interface Props {
  readonly desk: Desk;
  readonly watch: StrandWatch;
}

/** In the tail line: what is lit and where it leads, the way back, and how much of the strands is shown. */
export function StrandsCommands({ desk, watch }: Props) {
  const view = useStrands(watch, (each) => each);
  const act = (action: typeof followStrand) => {
    const editor = desk.view;
    if (editor !== null) action(editor);
  };
  // What is lit by the caret or the keys stays lit while the pointer goes to the command.
  const keep = (event: React.MouseEvent) => event.preventDefault();
  const pointed = view.picture?.dim === true && view.gloss !== null;
  // What is pointed at for a moment takes the place of the commands where there is no room for both.
  if (pointed && view.picture?.frame.size === "middle") return <GlossLine view={view} />;
  return (
    <span className="hl-strands-commands">
      <GlossLine view={view} />
      {view.leads ? (
        <Command onMouseDown={keep} onClick={() => act(followStrand)}>
          Follow the strand
        </Command>
      ) : null}
      {view.backTo === null ? null : (
        <Command onMouseDown={keep} onClick={() => act(followBack)}>
          Back to line {view.backTo}
        </Command>
      )}
      <Command onMouseDown={keep} onClick={() => watch.cycleMode()}>
        <span className="hl-strands-what">Marks and strands: </span>
        {MODE_WORDS[view.mode]}
      </Command>
    </span>
  );
}
