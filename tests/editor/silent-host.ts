import { hostAtRest, type SheetHost } from "../../app/editor/text/host.ts";

/** A page around a text under test: every command does nothing. */
export function silentHost(): SheetHost {
  const nothing = () => {};
  return {
    commands: {
      recompute: nothing,
      cancel: nothing,
      letStand: nothing,
      showWorking: nothing,
      putAway: nothing,
      goToCell: nothing,
      goToLine: nothing,
    },
    plateOf: (id) => `/papers/p/plates/${id}`,
    writes: true,
    tell: nothing,
    edit: nothing,
    ...hostAtRest(),
  };
}
