import type { FrontMatter } from "../../paper/index.ts";
import { ourMarkup } from "../../ui/markup.ts";
import type { Phrase } from "./phrases.server.ts";

/** The paper's front matter as it will be printed: title, authors, abstract, keywords. */
export function FrontMatterBlock({
  front,
  name,
  title,
  abstract,
}: {
  readonly front: Pick<FrontMatter, "authors" | "keywords" | "msc">;
  /** What the paper is called where its title says nothing. */
  readonly name: string;
  readonly title: readonly Phrase[];
  /** A paragraph each. */
  readonly abstract: readonly (readonly Phrase[])[];
}) {
  const { authors, keywords, msc } = front;
  return (
    <header className="front">
      <h1>{title.length > 0 ? <Phrases phrases={title} /> : name}</h1>
      <ul className="front-authors">
        {authors.map((author) => (
          <li key={`${author.name} ${author.orcid ?? author.affiliation ?? ""}`}>
            {author.name}
            {author.affiliation ? <span>{author.affiliation}</span> : null}
            {author.orcid ? <span>ORCID {author.orcid}</span> : null}
          </li>
        ))}
      </ul>
      {abstract.map((phrases) => (
        <p key={phrases[0]?.at ?? 0} className="front-abstract">
          <Phrases phrases={phrases} />
        </p>
      ))}
      {keywords.length > 0 ? <p className="front-small">Keywords: {keywords.join(", ")}</p> : null}
      {msc.length > 0 ? <p className="front-small">Mathematics Subject Classification: {msc.join(", ")}</p> : null}
    </header>
  );
}

function Phrases({ phrases }: { readonly phrases: readonly Phrase[] }) {
  return phrases.map((phrase) =>
    "html" in phrase ? <span key={phrase.at} {...ourMarkup(phrase.html)} /> : phrase.text,
  );
}
