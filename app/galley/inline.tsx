import type { PhrasingContent } from "mdast";
import type { ReactNode } from "react";
import type { BoundNumber, CitationNode, ReferenceNode } from "../paper/index.ts";
import { citationText, mathTex, readInline, referenceText } from "../paper/index.ts";
import type { Note } from "../print/index.ts";
import { NumberText } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import { renderMath } from "../ui/math.ts";
import { anchor, type Setting } from "./setting.ts";

interface InlineProps {
  readonly nodes: readonly PhrasingContent[];
  readonly setting: Setting;
}

/** Running text. */
export function Inline({ nodes, setting }: InlineProps): ReactNode {
  return nodes.map((node, i) => (
    <InlineNode key={node.position?.start.offset ?? `n${i}`} node={node} setting={setting} />
  ));
}

function InlineNode({ node, setting }: { readonly node: PhrasingContent; readonly setting: Setting }): ReactNode {
  switch (node.type) {
    case "text":
    case "html":
      return node.value;
    case "emphasis":
      return (
        <em>
          <Inline nodes={node.children} setting={setting} />
        </em>
      );
    case "strong":
      return (
        <strong>
          <Inline nodes={node.children} setting={setting} />
        </strong>
      );
    case "delete":
      return (
        <del>
          <Inline nodes={node.children} setting={setting} />
        </del>
      );
    case "inlineCode":
      return <code>{node.value}</code>;
    case "break":
      return <br />;
    case "link":
      return (
        <a href={node.url} rel="noreferrer">
          <Inline nodes={node.children} setting={setting} />
        </a>
      );
    case "linkReference":
      return <Inline nodes={node.children} setting={setting} />;
    case "image":
    case "imageReference":
      return <span className="g-missing">{`[picture: ${node.alt ?? ""}]`}</span>;
    case "inlineMath":
      return <Formula tex={mathTex(node, (number) => numberTex(number, setting))} setting={setting} />;
    case "footnoteReference":
      return <FootnoteMark identifier={node.identifier} setting={setting} />;
    case "reference":
      return <Reference node={node} />;
    case "citation":
      return <Citation node={node} />;
    case "boundNumber":
      return <BoundNumberText number={node.number} setting={setting} />;
  }
}

/** A formula; its HTML is made by KaTeX from untrusted TeX with trust off (see app/ui/math.ts). */
export function Formula({
  tex,
  display = false,
  setting,
}: {
  readonly tex: string;
  readonly display?: boolean;
  readonly setting: Setting;
}) {
  const html = renderMath(tex, display, setting.macros);
  return <span className={display ? "g-display" : "g-formula"} {...ourMarkup(html)} />;
}

/** A number within a formula: daggers are raised, what is missing says so. */
export function numberTex(number: BoundNumber, { set }: Setting): string {
  const { printed, note } = set.number(number);
  if (!printed) return "\\text{no value}^{\\ddagger}";
  return note ? `{${printed.tex}}^{${"\\dagger".repeat(note.mark.length)}}` : printed.tex;
}

function BoundNumberText({ number, setting }: { readonly number: BoundNumber; readonly setting: Setting }) {
  const { printed, note, reason } = setting.set.number(number);
  if (!printed)
    return (
      <span className="g-none" title={reason}>
        no value<sup>‡</sup>
      </span>
    );
  return (
    <span className="g-number">
      <NumberText text={printed.text} />
      {note ? <NoteMark note={note} /> : null}
    </span>
  );
}

export function NoteMark({ note }: { readonly note: Note }) {
  return (
    <sup className="g-dagger">
      <a href={`#${anchor.note(note.mark)}`} aria-label="Out of date">
        {note.mark}
      </a>
    </sup>
  );
}

/** Words of ours, with math between dollars. */
export function Words({ words, setting }: { readonly words: string; readonly setting: Setting }) {
  return <Inline nodes={readInline(words, 0)} setting={setting} />;
}

function FootnoteMark({ identifier, setting }: { readonly identifier: string; readonly setting: Setting }) {
  const footnote = setting.footnotes.get(identifier);
  if (!footnote) return null;
  return (
    <sup>
      <a href={`#${anchor.footnote(footnote.number)}`}>{footnote.number}</a>
    </sup>
  );
}

function Reference({ node }: { readonly node: ReferenceNode }) {
  if (!node.target) return <span className="g-missing">{`[${node.label}]`}</span>;
  return (
    <a className="g-reference" href={`#${anchor.label(node.target.label)}`}>
      {referenceText(node.target)}
    </a>
  );
}

function Citation({ node }: { readonly node: CitationNode }) {
  const [first] = node.entries;
  const text = citationText(node.entries, { as: node.as, at: node.at });
  return first ? (
    <a className="g-reference" href={`#${anchor.work(first.key)}`}>
      {text}
    </a>
  ) : (
    <span className="g-missing">{text}</span>
  );
}
