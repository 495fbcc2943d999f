import { Fragment } from "react";
import { ourMarkup } from "../../ui/markup.ts";
import { renderMath } from "../../ui/math.ts";
import { strandColour } from "../text/contents.ts";
import { type Gloss, glossInLine } from "./gloss.ts";
import type { StrandsView } from "./watch.ts";

/** What is said of what is lit, line under line. */
export function GlossText({ gloss }: { readonly gloss: Gloss }) {
  return (
    <>
      {gloss.lead.map((lead) => (
        <div key={lead.name} className="hl-gloss-lead">
          <Lead {...lead} />
        </div>
      ))}
      {gloss.lead.length === 0 || gloss.where === "" ? null : <div>{gloss.where}</div>}
      {gloss.parameters.length === 0 ? null : (
        <div className={gloss.lead.length === 0 ? "hl-gloss-lead" : ""}>
          <ParameterValues parameters={gloss.parameters} />
        </div>
      )}
      {gloss.lead.length > 0 || gloss.where === "" ? null : <div>{gloss.where}</div>}
      {gloss.also === "" ? null : <div>{gloss.also}</div>}
    </>
  );
}

export function Lead({ name, known, unknown }: Gloss["lead"][number]) {
  if (known + unknown === "") return name;
  return (
    <>
      {name} = {known}
      {unknown === "" ? null : <span className="hl-unknown">{unknown}</span>}
    </>
  );
}

/** "μ = 2.00, β = 1.00", each letter in its strand's colour. */
export function ParameterValues({ parameters }: Pick<Gloss, "parameters">) {
  return parameters.map(({ place, tex, shown }, at) => (
    <Fragment key={place}>
      {at === 0 ? "" : ", "}
      <span className="hl-gloss-value">
        <span style={{ color: strandColour(place) }} {...ourMarkup(renderMath(tex, false))} /> = {shown}
      </span>
    </Fragment>
  ));
}

/** In the far left margin, level with the tie of what is lit. */
export function StrandGloss({ view: { picture, gloss } }: { readonly view: StrandsView }) {
  const place = picture?.frame.gloss ?? null;
  if (picture === null || picture.gloss === null || gloss === null || place === null) return null;
  return (
    <aside className="hl-strand-gloss" aria-hidden="true" style={{ ...place, top: picture.gloss.y - 10 }}>
      <GlossText gloss={gloss} />
    </aside>
  );
}

/** In the tail line, where the margin has no room for it. */
export function GlossLine({ view: { picture, gloss } }: { readonly view: StrandsView }) {
  if (picture === null || picture.frame.size !== "middle" || gloss === null) return null;
  const { lead, rest } = glossInLine(gloss);
  return (
    <span className="hl-gloss-line" aria-hidden="true">
      {lead === "" ? <ParameterValues parameters={gloss.parameters} /> : <b>{lead}</b>}
      {rest === "" ? null : `, ${rest}`}
    </span>
  );
}
