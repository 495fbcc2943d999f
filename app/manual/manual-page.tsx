import "./manual.css";
import { CommandLink, RunningHead, TailLine } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import type { Entry, KindPages, ManualContents } from "./contents.server.ts";

interface Props {
  /** Where the mark leads. */
  readonly home: string;
  readonly contents: ManualContents;
}

/** What may be written in a paper: kinds of cells with their keys and values, numbers, formulas. */
export function ManualPage({ home, contents }: Props) {
  const { kinds, presentation, numbers, surroundings, functions } = contents;
  return (
    <>
      <RunningHead home={home} title="Manual" right={<CommandLink to="/specimen">Specimen paper</CommandLink>} />
      <main className="manual">
        <nav className="manual-contents" aria-label="Contents">
          <h2>Contents</h2>
          <ul>
            <li>
              <a href="#text">The text</a>
            </li>
            <li>
              <a href="#numbers">Numbers in sentences</a>
            </li>
            <li>
              <a href="#cells">Cells</a>
              <ul>
                {kinds.map(({ name, label }) => (
                  <li key={name}>
                    <a href={`#${name}`}>{label}</a>
                  </li>
                ))}
              </ul>
            </li>
            <li>
              <a href="#formulas">Formulas</a>
            </li>
          </ul>
        </nav>
        <div className="manual-pages">
          <h1>Manual</h1>
          <TextPages surroundings={surroundings} />
          <NumberPages attributes={numbers} />
          <CellPages presentation={presentation} />
          {kinds.map((kind) => (
            <KindSection key={kind.name} kind={kind} />
          ))}
          <FormulaPages functions={functions} />
        </div>
      </main>
      <TailLine left="Made from the definitions that check a paper" />
    </>
  );
}

function TextPages({ surroundings }: { readonly surroundings: readonly string[] }) {
  return (
    <section id="text">
      <h2>The text</h2>
      <p>
        A paper is one text in Markdown: headings, lists, tables, links and footnotes as usual. Mathematics is TeX
        between dollars; <code>\label{"{kpp}"}</code> within a display numbers it. A heading is labelled at its end, as
        in <code>## Model {"{#model}"}</code>; <code>:ref[model]</code> refers to it, to a theorem, to an equation or to
        a cell by its name, and finds the noun itself. <code>:cite[harris1963]</code> cites from the bibliography, with{" "}
        <code>{'{at="Theorem 1.2"}'}</code> for a place in it and <code>{"{as=text}"}</code> for “Harris (1963)”.
        Between <code>{"<!--"}</code> and <code>{"-->"}</code> stands what is printed nowhere.
      </p>
      <p>Surroundings open with three colons, a name, a title in brackets and a label, and close with three colons:</p>
      <pre>{":::theorem[Shift]{#shift}\n…\n:::"}</pre>
      <p>
        Their names are{" "}
        {surroundings.map((name, i) => (
          <span key={name}>
            {i === 0 ? "" : ", "}
            <code>{name}</code>
          </span>
        ))}
        .
      </p>
    </section>
  );
}

function NumberPages({ attributes }: { readonly attributes: readonly Entry[] }) {
  return (
    <section id="numbers">
      <h2>Numbers in sentences</h2>
      <p>
        A number of a result is never typed. <code>:value[K.mean]</code> stands for any formula’s value, and within a
        formula of TeX <code>\value{"{K.mean}"}</code> or <code>\value[digits=4]{"{K.mean}"}</code>. Digits that the
        error does not support are grey on the sheet and printed nowhere. In braces after it may stand:
      </p>
      <Entries caption="Attributes of a number" entries={attributes} />
    </section>
  );
}

function CellPages({ presentation }: { readonly presentation: readonly Entry[] }) {
  return (
    <section id="cells">
      <h2>Cells</h2>
      <p>
        A cell is a fenced block: three backticks, a kind and a name; then keys and what they are. Where a number is
        meant any formula will do; a list is <code>[a, b, c]</code>, an interval <code>a to b</code>. Where a key takes
        a name and its values, the name of a parameter <em>varies that parameter</em>, and all that is read is computed
        again for each value; any other name is a new variable. Every kind takes these keys, which change no result:
      </p>
      <Entries caption="Keys of every kind" entries={presentation} />
    </section>
  );
}

function KindSection({ kind }: { readonly kind: KindPages }) {
  return (
    <section id={kind.name} className="manual-kind">
      <h3>
        {kind.label} <code>{kind.name}</code>
      </h3>
      <p>{kind.summary}</p>
      <pre>{kind.example}</pre>
      {kind.plate === "" ? null : <div className="manual-plate" {...ourMarkup(kind.plate)} />}
      {kind.ownKeys ? <p>Its keys are names of your own; each takes a formula, or a map of these:</p> : null}
      <Entries caption={`Keys of ${kind.name}`} entries={kind.keys} />
      <Entries caption="Gives" entries={kind.values} />
      <Entries caption="In formulas" entries={kind.callables} />
      {kind.parts.length > 0 ? (
        <p className="manual-parts">
          <code>show</code> takes {kind.parts.join(", ")} or none.
        </p>
      ) : null}
    </section>
  );
}

function FormulaPages({ functions }: { readonly functions: readonly Entry[] }) {
  return (
    <section id="formulas">
      <h2>Formulas</h2>
      <p>
        Numbers, <code>+ - * / ^</code>, brackets, comparisons, <code>and or not</code>, the constants <code>pi</code>{" "}
        and <code>e</code>, parameters, values and what is called below. A product is written with its star. Errors and
        standard errors are carried along; <code>none</code> draws nothing.
      </p>
      <Entries caption="Functions" entries={functions} />
    </section>
  );
}

function Entries({ caption, entries }: { readonly caption: string; readonly entries: readonly Entry[] }) {
  if (entries.length === 0) return null;
  return (
    <table className="manual-entries">
      <caption>{caption}</caption>
      <tbody>
        {entries.map(({ term, meaning, remark }) => (
          <tr key={term}>
            <th scope="row">
              <code>{term}</code>
            </th>
            <td>
              {meaning}
              {remark === "" ? null : <span className="manual-remark">{remark}</span>}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
