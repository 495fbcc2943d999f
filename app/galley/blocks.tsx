import type { Heading, List, ListItem, Paragraph, RootContent, Table } from "mdast";
import type { ReactNode } from "react";
import { ENVIRONMENTS, type EnvironmentNode, mathTex } from "../paper/index.ts";
import { CellParts } from "./cell.tsx";
import { Formula, Inline, numberTex } from "./inline.tsx";
import { anchor, type Setting } from "./setting.ts";

interface BlocksProps {
  readonly nodes: readonly RootContent[];
  readonly setting: Setting;
}

/** Blocks of prose, one under the other. */
export function ProseBlocks({ nodes, setting }: BlocksProps): ReactNode {
  return nodes.map((node, i) => <Block key={node.position?.start.offset ?? `b${i}`} node={node} setting={setting} />);
}

function Block({ node, setting }: { readonly node: RootContent; readonly setting: Setting }): ReactNode {
  switch (node.type) {
    case "paragraph":
      return <ParagraphBlock node={node} setting={setting} />;
    case "heading":
      return <HeadingBlock node={node} setting={setting} />;
    case "math":
      return <Equation node={node} setting={setting} />;
    case "environment":
      return <EnvironmentBlock node={node} setting={setting} />;
    case "cell":
      return <CellParts node={node} setting={setting} />;
    case "list":
      return <ListBlock node={node} setting={setting} />;
    case "blockquote":
      return (
        <blockquote>
          <ProseBlocks nodes={node.children} setting={setting} />
        </blockquote>
      );
    case "code":
      return (
        <pre>
          <code>{node.value}</code>
        </pre>
      );
    case "html":
      return <p>{node.value}</p>;
    case "table":
      return <TableBlock node={node} setting={setting} />;
    case "thematicBreak":
      return <hr />;
    default:
      // The front matter stands in the title; footnotes stand at the foot of their galley.
      return null;
  }
}

/** @param end the box of a proof that ends in this paragraph */
function ParagraphBlock({ node, setting, end = false }: EndedProps<Paragraph>) {
  return (
    <p className={node.data?.continues ? "g-continues" : undefined}>
      <Inline nodes={node.children} setting={setting} />
      {end ? <Box /> : null}
    </p>
  );
}

interface EndedProps<Node> {
  readonly node: Node;
  readonly setting: Setting;
  readonly end?: boolean;
}

function HeadingBlock({ node, setting }: { readonly node: Heading; readonly setting: Setting }) {
  const { number = null, label = null } = node.data ?? {};
  const level = number === null ? node.depth : number.split(".").length + 1;
  // The paper's title is the page's first heading; sections begin at the second level.
  const Level = `h${Math.min(Math.max(level, 2), 6)}` as "h2" | "h3" | "h4" | "h5" | "h6";
  return (
    <Level id={label ? anchor.label(label) : undefined}>
      {number === null ? null : <span className="g-section-number">{number}</span>}
      <Inline nodes={node.children} setting={setting} />
    </Level>
  );
}

type DisplayMath = Extract<RootContent, { type: "math" }>;

/** @param end the box of a proof that ends in this display */
function Equation({ node, setting, end = false }: EndedProps<DisplayMath>) {
  const { number, label } = node.data ?? {};
  return (
    <div className="g-equation" id={number !== undefined && label ? anchor.label(label) : undefined}>
      <Formula tex={mathTex(node, (value) => numberTex(value, setting))} display setting={setting} />
      {number === undefined ? null : <span className="g-equation-number">{`(${number})`}</span>}
      {end ? <Box /> : null}
    </div>
  );
}

const Box = () => (
  <span className="g-box" role="img" aria-label="end of proof">
    □
  </span>
);

/** Statements are set in italics, definitions and remarks upright, as mathematicians are used to. */
const UPRIGHT = new Set<EnvironmentNode["environment"]>(["definition", "assumption", "example", "remark", "proof"]);
const QUIET = new Set<EnvironmentNode["environment"]>(["remark", "proof"]);

function EnvironmentBlock({ node, setting }: { readonly node: EnvironmentNode; readonly setting: Setting }) {
  const noun = ENVIRONMENTS[node.environment];
  const isProof = node.environment === "proof";
  const [first, ...rest] = node.children;
  const opening = first?.type === "paragraph" ? first : null;
  const following = opening ? rest : node.children;
  const last = following.at(-1);
  const boxed = isProof && (last?.type === "math" || last?.type === "paragraph") ? last : null;
  const title = node.title.length > 0 ? <Inline nodes={node.title} setting={setting} /> : null;
  return (
    <div
      className={UPRIGHT.has(node.environment) ? "g-environment" : "g-environment g-statement"}
      id={node.label ? anchor.label(node.label) : undefined}
    >
      <p>
        <span className={QUIET.has(node.environment) ? "g-head-quiet" : "g-head"}>
          {noun}
          {node.number === null ? null : ` ${node.number}`}
          {isProof && title ? <> {title}</> : null}
          {title && !isProof ? null : "."}
        </span>
        {title && !isProof ? <span className="g-head-title"> ({title}).</span> : null}{" "}
        {opening ? <Inline nodes={opening.children} setting={setting} /> : null}
        {isProof && following.length === 0 ? <Box /> : null}
      </p>
      <ProseBlocks nodes={boxed ? following.slice(0, -1) : following} setting={setting} />
      {boxed?.type === "math" ? <Equation node={boxed} setting={setting} end /> : null}
      {boxed?.type === "paragraph" ? <ParagraphBlock node={boxed} setting={setting} end /> : null}
      {isProof && following.length > 0 && !boxed ? (
        <p className="g-box-line">
          <Box />
        </p>
      ) : null}
    </div>
  );
}

function ListBlock({ node, setting }: { readonly node: List; readonly setting: Setting }) {
  const items = node.children.map((item, i) => (
    <Item key={item.position?.start.offset ?? `i${i}`} node={item} setting={setting} />
  ));
  return node.ordered ? <ol start={node.start ?? 1}>{items}</ol> : <ul>{items}</ul>;
}

function Item({ node, setting }: { readonly node: ListItem; readonly setting: Setting }) {
  const [only] = node.children;
  const tick = node.checked === null || node.checked === undefined ? null : node.checked ? "☑ " : "☐ ";
  return (
    <li>
      {tick}
      {node.children.length === 1 && only?.type === "paragraph" ? (
        <Inline nodes={only.children} setting={setting} />
      ) : (
        <ProseBlocks nodes={node.children} setting={setting} />
      )}
    </li>
  );
}

/** A wide table scrolls by itself; Tab reaches it, so that the arrows can move it. */
const reachable = { tabIndex: 0 };

function TableBlock({ node, setting }: { readonly node: Table; readonly setting: Setting }) {
  const [head, ...rows] = node.children;
  const side = (k: number) => ({ textAlign: node.align?.[k] ?? "left" }) as const;
  return (
    <section className="paper-grid" aria-label={`Table in line ${node.position?.start.line ?? 0}`} {...reachable}>
      <table className="paper-table">
        <thead>
          <tr>
            {head?.children.map((entry, k) => (
              <th key={entry.position?.start.offset ?? `h${k}`} scope="col" style={side(k)}>
                <Inline nodes={entry.children} setting={setting} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, i) => (
            <tr key={row.position?.start.offset ?? `r${i}`}>
              {row.children.map((entry, k) => (
                <td key={entry.position?.start.offset ?? `d${k}`} style={side(k)}>
                  <Inline nodes={entry.children} setting={setting} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
