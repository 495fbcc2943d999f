import { type RefObject, useEffect, useRef, useState } from "react";
import { CommandLink, RunningHead } from "../../ui/index.ts";
import { Desk } from "../live/desk.ts";
import type { SheetModel } from "../model/types.ts";
import { BibliographyPlace } from "./bibliography-place.tsx";
import { ClosedNotice } from "./closed-notice.tsx";
import { ParameterRule } from "./parameter-rule.tsx";
import { Runs } from "./runs.tsx";
import type { SheetPageProps } from "./sheet-page.tsx";
import { PlainText } from "./sheet-preface.tsx";
import { SheetTail } from "./sheet-tail.tsx";
import { TrialNotice } from "./trial-notice.tsx";
import { useDeskView } from "./use-desk-view.ts";
import { listed } from "./words.ts";

/** The live sheet: running head, rule, text, bibliography, tail line, over one desk. */
export default function Sheet(props: SheetPageProps) {
  const place = useRef<HTMLDivElement>(null);
  const desk = useDesk(props, place);
  return (
    <div className="hl-sheet">
      {desk === null ? null : <Around desk={desk} props={props} part="head" />}
      <main className="hl-column">
        {desk === null ? null : <Preface desk={desk} props={props} place={place} />}
        <div ref={place} className="hl-text hl-untyped" />
        {desk === null ? null : <BibliographyPlace desk={desk} />}
      </main>
      {desk === null ? null : <Around desk={desk} props={props} part="tail" />}
    </div>
  );
}

/** Opens the desk when the place is on the page, and ends it with the page. */
function useDesk(props: SheetPageProps, place: RefObject<HTMLDivElement | null>): Desk | null {
  const [desk, setDesk] = useState<Desk | null>(null);
  const first = useRef(props);
  useEffect(() => {
    if (place.current === null) return;
    const { nonce, ...options } = first.current;
    const opened = new Desk(options, place.current, nonce);
    setDesk(opened);
    return () => opened.end();
  }, [place]);
  return desk;
}

interface PartProps {
  readonly desk: Desk;
  readonly props: SheetPageProps;
}

/** The plain setting, until the text is typeset. The text's own place is the editor's, so its class is set by hand. */
function Preface({ desk, props, place }: PartProps & { readonly place: RefObject<HTMLDivElement | null> }) {
  const typeset = useDeskView(desk, ({ ready, model }) => ready && model !== null);
  useEffect(() => {
    place.current?.classList.toggle("hl-untyped", !typeset);
  }, [typeset, place]);
  return typeset ? null : (
    <div className="hl-preface">
      <PlainText title={props.title} text={props.first.text} />
    </div>
  );
}

function Around({ desk, props, part }: PartProps & { readonly part: "head" | "tail" }) {
  const view = useDeskView(desk, (each) => each);
  if (part === "tail") return <SheetTail desk={desk} view={view} writes={props.writes} />;
  const { model, people, connection, heard } = view;
  return (
    <>
      <RunningHead
        home={props.person === null ? "/" : "/shelf"}
        left={props.person === null ? null : <CommandLink to="/shelf">Shelf</CommandLink>}
        title={<TitleRuns model={model} title={props.title} />}
        right={
          <>
            {people.length === 0 ? null : <span className="head-name">{listed(people)} here</span>}
            {props.person === null ? null : (
              <CommandLink to={`/papers/${props.paperId}/title-page`}>Title page</CommandLink>
            )}
            <CommandLink to={`/papers/${props.paperId}/galley`}>Galley</CommandLink>
          </>
        }
      />
      <ParameterRule
        parameters={model?.parameters ?? []}
        onTry={(name, source) => desk.tryParameter(name, source)}
        onSet={(name, source) => desk.setParameter(name, source)}
      />
      {connection.state === "closed" ? <ClosedNotice code={connection.code} onAgain={() => desk.joinAgain()} /> : null}
      {props.writes ? null : (
        <TrialNotice
          desk={desk}
          signIn={props.signIn}
          tried={model?.parameters.some(({ overridden }) => overridden) ?? false}
        />
      )}
      <div className="hl-said" role="status" aria-live="polite">
        {heard}
      </div>
    </>
  );
}

function TitleRuns({ model, title }: { readonly model: SheetModel | null; readonly title: string }) {
  if (model === null || model.front.plainTitle === "") return title;
  return <Runs runs={model.front.title} macros={model.macros} />;
}
