import { useMemo } from "react";
import { Command, CommandLink, RunningHead } from "../../ui/index.ts";
import type { SheetAtHand, StripName } from "../keys/types.ts";
import type { Desk } from "../live/desk.ts";
import { ruleEditing, typedFault } from "../rule/rule-editing.ts";
import { RuleEntry } from "../rule/rule-entry.tsx";
import { ClosedNotice } from "./closed-notice.tsx";
import { ParameterRule } from "./parameter-rule.tsx";
import { Runs } from "./runs.tsx";
import type { SheetPageProps } from "./sheet-page.tsx";
import { RulePlace } from "./sheet-preface.tsx";
import { TrialNotice } from "./trial-notice.tsx";
import { useDeskView } from "./use-desk-view.ts";
import { listed } from "./words.ts";

interface Props {
  readonly desk: Desk;
  readonly props: SheetPageProps;
}

/** The running head. Like all that stands around the text it watches its own parts alone: a keystroke draws none anew. */
export function SheetHead({ desk, props, onCommand }: Props & { onCommand(open: StripName): void }) {
  return (
    <RunningHead
      home={props.person === null ? "/" : "/shelf"}
      left={
        <>
          {props.person === null ? null : (
            <CommandLink to="/shelf" className="hl-only-wide">
              Shelf
            </CommandLink>
          )}
          <Command className="hl-only-wide" onClick={() => onCommand("outline")}>
            Outline
          </Command>
          <Command className="hl-only-wide" onClick={() => onCommand("find")}>
            Find
          </Command>
        </>
      }
      title={<SheetTitle desk={desk} title={props.title} />}
      right={
        <>
          <People desk={desk} />
          {props.person === null ? null : (
            <CommandLink to={`/papers/${props.paperId}/title-page`} className="hl-only-wide">
              Title page
            </CommandLink>
          )}
          <CommandLink to="/manual" className="hl-only-wide">
            Manual
          </CommandLink>
          <CommandLink to={`/papers/${props.paperId}/galley`} className="hl-only-wide">
            Galley
          </CommandLink>
          <Command className="hl-only-wide" onClick={() => onCommand("commands")}>
            Commands
          </Command>
          <Command className="hl-only-narrow" onClick={() => onCommand("commands")}>
            More
          </Command>
        </>
      }
    />
  );
}

function SheetTitle({ desk, title }: { readonly desk: Desk; readonly title: string }) {
  const front = useDeskView(desk, ({ model }) => model?.front ?? null);
  const macros = useDeskView(desk, ({ model }) => model?.macros ?? null);
  if (front === null || macros === null) return title;
  return <Runs runs={front.title} macros={macros} />;
}

function People({ desk }: { readonly desk: Desk }) {
  const people = useDeskView(desk, (view) => view.people);
  return people.length === 0 ? null : <span className="head-name">{listed(people)} here</span>;
}

interface RuleProps {
  readonly desk: Desk;
  readonly text: string;
  /** null until the text is on the sheet. */
  readonly sheet: SheetAtHand | null;
}

/** The rule with the paper's parameters. */
export function SheetRule({ desk, text, sheet }: RuleProps) {
  const read = useDeskView(desk, ({ model }) => model !== null);
  const parameters = useDeskView(desk, ({ model }) => model?.parameters ?? NO_PARAMETERS);
  const borders = useDeskView(desk, (view) => view.borders);
  const editing = useMemo(() => ruleEditing(sheet), [sheet]);
  if (!read) return <RulePlace text={text} />;
  return (
    <ParameterRule
      parameters={parameters}
      borders={borders}
      onSay={desk.say}
      onTry={(name, source) => desk.tryParameter(name, source)}
      onSet={(name, source) => desk.setParameter(name, source)}
      onJudge={async (name, source) => (sheet === null ? "" : typedFault(sheet, name, source))}
      editing={editing}
    >
      {sheet === null ? null : <RuleEntry sheet={sheet} />}
    </ParameterRule>
  );
}

const NO_PARAMETERS: readonly never[] = [];

/** What is to be said between the rule and the text: why the page is no longer joined, and that trying keeps nothing. */
export function SheetNotices({ desk, props }: Props) {
  const connection = useDeskView(desk, (view) => view.connection);
  const tried = useDeskView(desk, ({ model }) => model?.parameters.some(({ overridden }) => overridden) ?? false);
  return (
    <>
      {connection.state === "closed" ? <ClosedNotice code={connection.code} onAgain={() => desk.joinAgain()} /> : null}
      {props.writes ? null : <TrialNotice desk={desk} signIn={props.signIn} tried={tried} />}
    </>
  );
}

/** Said to those who listen. */
export function SheetVoice({ desk }: { readonly desk: Desk }) {
  const heard = useDeskView(desk, (view) => view.heard);
  return (
    <div className="hl-said" role="status" aria-live="polite">
      {heard}
    </div>
  );
}
