import type { Desk } from "../live/desk.ts";
import { useDeskView } from "../parts/use-desk-view.ts";
import { StrandGloss } from "./gloss-text.tsx";
import { StrandsDrawing } from "./strands-drawing.tsx";
import { useStrands } from "./use-strands.ts";
import type { StrandWatch } from "./watch.ts";

interface Props {
  readonly desk: Desk;
  readonly watch: StrandWatch;
}

/** What lies with the text in the margin: strands, cords, and the gloss about what is lit. */
export function SheetStrands({ desk, watch }: Props) {
  const parameters = useDeskView(desk, ({ model }) => model?.parameters ?? null);
  const view = useStrands(watch, (each) => each);
  if (parameters === null) return null;
  return (
    <>
      <StrandsDrawing watch={watch} parameters={parameters} />
      <StrandGloss view={view} />
    </>
  );
}
