import type { ReactNode } from "react";
import { Mark } from "./mark.tsx";

/** The line at the head of every page: the mark, the paper's short title, and where one may go. */
export function RunningHead({
  home,
  left,
  title,
  right,
}: {
  /** Where the mark leads. */
  readonly home: string;
  readonly left?: ReactNode;
  readonly title?: ReactNode;
  readonly right?: ReactNode;
}) {
  return (
    <header className="head">
      <div className="head-side">
        <Mark to={home} />
        {left}
      </div>
      <div className="head-title">{title}</div>
      <nav className="head-side" aria-label="Places">
        {right}
      </nav>
    </header>
  );
}

/** The line at the foot: how many, what is kept, what is wrong. */
export function TailLine({
  left,
  middle,
  right,
}: {
  readonly left?: ReactNode;
  readonly middle?: ReactNode;
  readonly right?: ReactNode;
}) {
  return (
    <footer className="tail">
      <div>{left}</div>
      <div>{middle}</div>
      <div>{right}</div>
    </footer>
  );
}
