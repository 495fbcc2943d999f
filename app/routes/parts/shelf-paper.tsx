import { Form, Link } from "react-router";
import { Command, CommandLink, When } from "../../ui/index.ts";
import { authorsInWords, type ShelfPaper } from "./shelf-groups.ts";

const STANDING: Readonly<Record<ShelfPaper["role"], string>> = {
  owner: "",
  author: "You are an author",
  referee: "You are a referee",
  reader: "You are a reader",
};

/** A paper on the shelf, with what may be done with it. */
export function ShelfPaperRow({
  paper,
  you,
  now,
}: {
  readonly paper: ShelfPaper;
  /** Name of whose shelf it is. */
  readonly you: string;
  readonly now: string;
}) {
  const { id, title, authors, role, putBy, changedAt } = paper;
  return (
    <li className="shelf-paper">
      <div>
        <h3 className="shelf-title">
          <Link to={`/papers/${id}`}>{title}</Link>
        </h3>
        {authors ? <p className="shelf-authors">{authorsInWords(authors, you)}</p> : null}
      </div>
      <div className="shelf-state">
        <p>
          Changed <When moment={changedAt} now={now} />
        </p>
        {STANDING[role] ? <p>{STANDING[role]}</p> : null}
        <Form method="post" className="shelf-commands">
          <input type="hidden" name="paper" value={id} />
          {putBy ? null : (
            <Command type="submit" name="intent" value="duplicate">
              Duplicate
            </Command>
          )}
          <Command type="submit" name="intent" value={putBy ? "bring-back" : "put-by"}>
            {putBy ? "Bring back" : "Put by"}
          </Command>
          {putBy && role === "owner" ? (
            <CommandLink to={`?delete=${id}`} preventScrollReset>
              Delete for ever
            </CommandLink>
          ) : null}
        </Form>
      </div>
    </li>
  );
}
