import { askedFor } from "./asked.ts";
import { cellOffers } from "./cell-offers.ts";
import { citationOffers, numberOffers, parameterOffers, referenceOffers } from "./paper-offers.ts";
import { surroundingOffers } from "./surroundings.ts";
import { type CaseKnowledge, COMPARTMENTS, type Compartment, type CompartmentName, type Offer } from "./types.ts";

/** How many offers of what a paper has are shown: numbers, and each of the other compartments. */
const MOST_NUMBERS = 12;
const MOST_OTHERS = 4;

const CONTENTS: Readonly<Record<CompartmentName, { title: string; keepsPlaces: boolean; offers: typeof cellOffers }>> =
  {
    cells: { title: "Cells", keepsPlaces: true, offers: cellOffers },
    surroundings: { title: "Surroundings", keepsPlaces: true, offers: surroundingOffers },
    numbers: { title: "Numbers", keepsPlaces: false, offers: numberOffers },
    parameters: { title: "Parameters", keepsPlaces: false, offers: parameterOffers },
    references: { title: "References", keepsPlaces: false, offers: referenceOffers },
    citations: { title: "Citations", keepsPlaces: false, offers: citationOffers },
  };

/**
 * What the case offers for what is typed into it, compartment by compartment, always in the same order. Cells and
 * surroundings keep their places, those not asked for with the score 0; of the numbers, parameters, references and
 * citations there are those asked for, the best first.
 */
export function offers(query: string, knowledge: CaseKnowledge): readonly Compartment[] {
  const asked = askedFor(query);
  return COMPARTMENTS.map((name) => {
    const { title, keepsPlaces, offers: all } = CONTENTS[name];
    const found = all(asked, knowledge);
    if (keepsPlaces) return { name, title, offers: found, more: 0 };
    const wanted = found.filter(({ score }) => score > 0).sort((a, b) => b.score - a.score);
    const shown = wanted.slice(0, name === "numbers" ? MOST_NUMBERS : MOST_OTHERS);
    return { name, title, offers: shown, more: wanted.length - shown.length };
  });
}

/** All that is asked for, in the order of the case. */
export function wantedOffers(compartments: readonly Compartment[]): readonly Offer[] {
  return compartments.flatMap(({ offers: all }) => all.filter(({ score }) => score > 0));
}

/** The best answer; the first of those that are as good. null where nothing is asked, or nothing answers. */
export function bestOffer(query: string, compartments: readonly Compartment[]): Offer | null {
  if (query.trim() === "") return null;
  return wantedOffers(compartments).reduce<Offer | null>(
    (best, offer) => (best === null || offer.score > best.score ? offer : best),
    null,
  );
}
