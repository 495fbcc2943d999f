import type { ReactNode } from "react";
import type { ValueNow } from "../model/messages.ts";
import { wordsWithMath } from "../writing/set-words.ts";
import type { Compartment, Offer } from "./types.ts";

interface Props {
  readonly compartments: readonly Compartment[];
  readonly active: string | null;
  readonly macros: Readonly<Record<string, string>>;
  onPoint(offer: Offer): void;
  onSet(offer: Offer): void;
}

export const LIST_ID = "hl-case-list";

/** So many compartments hold boxes; the others are lists. */
const PLACED = 2;

/** The element of an offer, for the field that chooses among them. */
export function offerElementId(id: string): string {
  return `hl-case-${encodeURIComponent(id).replaceAll("%", "_")}`;
}

/** All compartments in their places. What is not asked for is pale, and cannot be chosen. */
export function Compartments({ compartments, ...props }: Props) {
  return (
    <div className="hl-case-lay" id={LIST_ID} role="listbox" aria-label="What can be set">
      {compartments.slice(0, PLACED).map((compartment) => (
        <CompartmentOf key={compartment.name} compartment={compartment} {...props} />
      ))}
      <div className="hl-case-lists" role="presentation">
        {compartments.slice(PLACED).map((compartment) => (
          <CompartmentOf key={compartment.name} compartment={compartment} {...props} />
        ))}
      </div>
    </div>
  );
}

function CompartmentOf({
  compartment: { name, title, offers, more },
  active,
  ...props
}: Omit<Props, "compartments"> & { readonly compartment: Compartment }) {
  const wanted = offers.filter(({ score }) => score > 0).length;
  return (
    <fieldset className={`hl-case-${name}`} aria-label={title} data-empty={wanted === 0 ? "" : undefined}>
      <span className="hl-case-name" aria-hidden="true">
        {title}
      </span>
      {offers.map((offer) => (
        <OfferBox key={offer.id} offer={offer} active={offer.id === active} {...props} />
      ))}
      {more > 0 ? (
        <span className="hl-case-more" aria-hidden="true">
          and {more} more: type on
        </span>
      ) : null}
    </fieldset>
  );
}

function OfferBox({
  offer,
  active,
  macros,
  onPoint,
  onSet,
}: Omit<Props, "compartments" | "active"> & { readonly offer: Offer; readonly active: boolean }) {
  const asked = offer.score > 0;
  return (
    // The keys stay with the field, which says by its active descendant which one is chosen.
    <button
      type="button"
      tabIndex={-1}
      id={offerElementId(offer.id)}
      className="hl-case-offer"
      role="option"
      aria-selected={active}
      aria-disabled={asked ? undefined : true}
      onMouseDown={(event) => event.preventDefault()}
      onMouseMove={() => asked && !active && onPoint(offer)}
      onClick={() => asked && onSet(offer)}
    >
      <b>{offer.title}</b>{" "}
      {offer.value === null ? (
        <Words words={offer.line} macros={macros} />
      ) : (
        <span className="hl-case-value">
          <Value value={offer.value} />
        </span>
      )}
    </button>
  );
}

/** A value as the sheet shows it: what its error does not support is grey. */
export function Value({ value: { known, unknown, rest, reason } }: { readonly value: ValueNow }): ReactNode {
  if (reason !== "") return <i>no value</i>;
  return (
    <>
      {known}
      {unknown === "" ? null : <span className="hl-unknown">{unknown}</span>}
      {rest}
    </>
  );
}

/** Words with their mathematics in dollars set. */
export function Words({ words, macros }: { readonly words: string; readonly macros: Props["macros"] }) {
  return <span key={words} ref={(place) => place?.replaceChildren(wordsWithMath(words, macros))} />;
}
