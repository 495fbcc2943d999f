import type { FrontMatter } from "../../paper/index.ts";

/** The paper's front matter as it will be printed: title, authors, abstract, keywords. */
export function FrontMatterBlock({
  front,
  abstract,
}: {
  readonly front: Pick<FrontMatter, "title" | "authors" | "keywords" | "msc">;
  /** In plain words. */
  readonly abstract: string;
}) {
  const { title, authors, keywords, msc } = front;
  return (
    <header className="front">
      <h1>{title || "Untitled paper"}</h1>
      <ul className="front-authors">
        {authors.map((author) => (
          <li key={`${author.name} ${author.orcid ?? author.affiliation ?? ""}`}>
            {author.name}
            {author.affiliation ? <span>{author.affiliation}</span> : null}
            {author.orcid ? <span>ORCID {author.orcid}</span> : null}
          </li>
        ))}
      </ul>
      {abstract ? <p className="front-abstract">{abstract}</p> : null}
      {keywords.length > 0 ? <p className="front-small">Keywords: {keywords.join(", ")}</p> : null}
      {msc.length > 0 ? <p className="front-small">Mathematics Subject Classification: {msc.join(", ")}</p> : null}
    </header>
  );
}
