import type { CellFace, CellStateName } from "../model/types.ts";
import type { CellCommands, SheetHost } from "../text/host.ts";
import { Runs } from "./runs.tsx";
import { aboutSeconds } from "./words.ts";

interface Props {
  readonly face: CellFace;
  readonly open: boolean;
  readonly host: SheetHost;
}

type Offer = "recompute" | "compute" | "cancel" | "letStand" | "doNotWait" | "showNeeded" | "goToLine";

/** What each state is called in rubric, and what may be done about it. Current is silent. */
const STATES: Readonly<Record<CellStateName, { lead: string; offers: readonly Offer[] }>> = {
  current: { lead: "", offers: [] },
  outOfDate: { lead: "† Out of date.", offers: ["recompute", "letStand"] },
  stands: { lead: "", offers: ["recompute"] },
  computing: { lead: "", offers: ["cancel"] },
  waiting: { lead: "", offers: ["showNeeded", "doNotWait"] },
  failed: { lead: "‡", offers: ["goToLine", "recompute"] },
  cancelled: { lead: "†", offers: ["recompute"] },
  empty: { lead: "", offers: ["compute"] },
  preview: { lead: "", offers: [] },
};

/** The line beneath a caption: how the result came to be or what is the matter with it, and the commands for it. */
export function StateLine({ face, open, host }: Props) {
  const { lead, offers } = STATES[face.state];
  // With the working open, a fault of it is said at its line.
  const saidBelow = open && face.state === "failed" && !face.sound;
  const telling = face.words.length > 0 && !saidBelow;
  return (
    <div className={`hl-state hl-state-${face.state}`}>
      {face.progress === null ? null : <Bar {...face.progress} />}
      {lead === "" ? null : <b className="hl-lead">{lead} </b>}
      {saidBelow ? <span className="hl-state-words">Its working is at fault, as is said there.</span> : null}
      {telling ? <Runs className="hl-state-words" runs={face.words} macros={host.macros} /> : null}
      {face.finding === null ? null : <Said finding={face.finding} />}
      {face.state === "current" || face.state === "preview" ? (
        <Runs className="hl-provenance" runs={face.provenance} macros={host.macros} />
      ) : null}
      {face.hangs === "" ? null : <span className="hl-said">, {face.hangs}. </span>}
      <span className="hl-offers">
        {offers.map((offer) => (
          <OfferOf key={offer} offer={offer} face={face} host={host} />
        ))}
        <Command
          quiet
          name={open ? "Put away" : "Show working"}
          of={face.title}
          onPress={() => (open ? host.commands.putAway(face.slot) : host.commands.showWorking(face.slot))}
        />
        {face.provenance.length > 0 && face.state !== "preview" && !hasFigure(face) ? (
          <a
            className="command hl-small hl-quiet"
            href={host.plateOf(face.id)}
            aria-label={`Open as plate, ${face.title}`}
          >
            Open as plate
          </a>
        ) : null}
      </span>
    </div>
  );
}

/** A figure has its own commands beneath it. */
function hasFigure({ parts }: CellFace): boolean {
  return parts.some(({ part }) => part === "figure");
}

/** What the result itself says, whatever the state of its cell; what is grave bears the mark. */
function Said({ finding: { isGrave, words } }: { readonly finding: NonNullable<CellFace["finding"]> }) {
  return (
    <>
      {isGrave ? <b className="hl-lead">‡ </b> : null}
      <span className="hl-state-words">{words} </span>
    </>
  );
}

function OfferOf({ offer, face, host }: { readonly offer: Offer; readonly face: CellFace; readonly host: SheetHost }) {
  const { commands } = host;
  const writing = WRITING.has(offer);
  if ((writing && !host.writes) || !PRESENT[offer](face)) return null;
  const name = NAMES[offer](face);
  return (
    <>
      <Command name={name} of={face.title} onPress={() => PRESSED[offer](face, commands)} />
      {offer === "recompute" || offer === "compute" ? <Duration seconds={face.seconds} /> : null}
    </>
  );
}

const WRITING: ReadonlySet<Offer> = new Set<Offer>(["recompute", "compute", "cancel", "letStand", "doNotWait"]);

const NAMES: Readonly<Record<Offer, (face: CellFace) => string>> = {
  recompute: () => "Recompute",
  compute: () => "Compute",
  cancel: () => "Cancel",
  letStand: () => "Let it stand",
  doNotWait: () => "Do not wait",
  showNeeded: (face) => `Show ${face.needs?.title ?? ""}`,
  goToLine: (face) => `Go to line ${(face.failureLine ?? face.line) - face.line + 1}`,
};

const PRESENT: Readonly<Record<Offer, (face: CellFace) => boolean>> = {
  recompute: (face) => face.sound,
  compute: (face) => face.sound,
  cancel: () => true,
  letStand: (face) => face.hasResult,
  doNotWait: () => true,
  showNeeded: (face) => face.needs !== null,
  goToLine: () => true,
};

const PRESSED: Readonly<Record<Offer, (face: CellFace, commands: CellCommands) => void>> = {
  recompute: (face, commands) => commands.recompute(face),
  compute: (face, commands) => commands.recompute(face),
  cancel: (face, commands) => commands.cancel(face),
  letStand: (face, commands) => commands.letStand(face),
  doNotWait: (face, commands) => commands.cancel(face),
  showNeeded: (face, commands) => face.needs !== null && commands.goToCell(face.needs.slot),
  goToLine: (face, commands) => commands.goToLine(face.failureLine ?? face.line),
};

interface CommandProps {
  readonly name: string;
  /** What the command is about, for those who hear it alone. */
  readonly of: string;
  readonly quiet?: boolean;
  onPress(): void;
}

function Command({ name, of, quiet, onPress }: CommandProps) {
  return (
    <button
      type="button"
      className={quiet ? "command hl-small hl-quiet" : "command hl-small"}
      // The caret stays where it is, or the working would close under the pointer.
      onMouseDown={(event) => event.preventDefault()}
      onClick={onPress}
      aria-label={`${name}, ${of}`}
    >
      {name}
    </button>
  );
}

function Duration({ seconds }: { readonly seconds: number | null }) {
  const words = aboutSeconds(seconds);
  return words === "" ? null : <span className="hl-duration">, {words}</span>;
}

function Bar({ done, total }: { readonly done: number; readonly total: number }) {
  const share = total > 0 ? Math.min(1, done / total) : 0;
  return (
    <span
      className="hl-bar"
      role="progressbar"
      aria-label="Done so far"
      aria-valuemin={0}
      aria-valuemax={total}
      aria-valuenow={done}
    >
      <i style={{ width: `${share * 100}%` }} />
    </span>
  );
}
