import { Link } from "react-router";

/** The mark: a point and the ray that leaves it, a half-line. Leads to the first page that is one's own. */
export function Mark({ to }: { readonly to: string }) {
  return (
    <Link className="mark" to={to}>
      <svg width="34" height="12" viewBox="0 0 34 12" aria-hidden="true">
        <circle cx="5" cy="6" r="4" fill="currentColor" />
        <path d="M9 6H33" stroke="currentColor" strokeWidth="1.6" />
      </svg>
      Halfline
    </Link>
  );
}
