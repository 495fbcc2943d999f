import { useState } from "react";
import { Command } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import type { PlateFace, PlateValue } from "./plate.ts";

interface Props {
  readonly sheet: string;
  /** Under which the plate's files lie. */
  readonly files: string;
  readonly face: PlateFace;
}

/** What stands beside a plate: its values, what they hang from, where they are quoted, and what can be taken away. */
export function PlateBeside({ sheet, files, face }: Props) {
  const { figure, markup, values, parameters, quotations } = face;
  return (
    <aside className="plate-beside" aria-label="About this plate">
      {values.length > 0 ? <Values values={values} /> : null}
      {parameters.length > 0 ? (
        <section>
          <h2>Hangs from</h2>
          <dl className="plate-list">
            {parameters.map(({ name, note, html }) => (
              <div key={name}>
                <dt {...ourMarkup(html)} />
                <dd>{note}</dd>
              </div>
            ))}
          </dl>
        </section>
      ) : null}
      {quotations.length > 0 ? (
        <section>
          <h2>Quoted in</h2>
          <dl className="plate-list">
            {quotations.map(({ line, formula }) => (
              <div key={`${line} ${formula}`}>
                <dt>
                  <a className="command" href={`${sheet}#line-${line}`}>{`line ${line}`}</a>
                </dt>
                <dd>
                  <code>{formula}</code>
                </dd>
              </div>
            ))}
          </dl>
        </section>
      ) : null}
      <section>
        <h2>Take away</h2>
        <ul className="plate-files">
          {figure ? <File href={`${files}/plate.svg`}>Plate as SVG</File> : null}
          {figure ? <File href={`${files}/plate.pdf`}>Plate as PDF, 120 mm wide</File> : null}
          {figure ? <File href={`${files}/points.csv`}>The points, as CSV</File> : null}
          {markup.table !== "" ? <File href={`${files}/table.csv`}>The table, as CSV</File> : null}
          <File href={`${files}/result.json`}>The whole result, as JSON</File>
        </ul>
      </section>
    </aside>
  );
}

/** A plain link: what it leads to is a file, not a page. */
function File({ href, children }: { readonly href: string; readonly children: string }) {
  return (
    <li>
      <a className="command" href={href} download>
        {children}
      </a>
    </li>
  );
}

function Values({ values }: { readonly values: readonly PlateValue[] }) {
  const [copied, setCopied] = useState("");
  const quote = (text: string) => {
    navigator.clipboard.writeText(text).then(
      () => setCopied(`${text} is on the clipboard: put it into a sentence.`),
      () => setCopied(`Write ${text} into a sentence.`),
    );
  };
  return (
    <section>
      <h2>Values</h2>
      <dl className="plate-list plate-values">
        {values.map(({ name, meaning, printed, words, quote: text }) => (
          <div key={name} className={printed === null && text === "" ? "plate-refused" : undefined}>
            <dt title={meaning}>
              <code>{name}</code>
            </dt>
            <dd>
              {printed === null ? (
                words
              ) : (
                <span className="plate-number">
                  {printed.known}
                  {printed.unknown === "" ? null : <span className="plate-unsupported">{printed.unknown}</span>}
                  {printed.rest}
                </span>
              )}
              {text === "" ? null : (
                <Command onClick={() => quote(text)} aria-label={`Quote ${name}`}>
                  Quote
                </Command>
              )}
            </dd>
          </div>
        ))}
      </dl>
      <p className="plate-said" role="status">
        {copied}
      </p>
    </section>
  );
}
