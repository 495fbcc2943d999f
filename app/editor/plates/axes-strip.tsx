import { useEffect, useId, useMemo, useState } from "react";
import { axesEdits, axesSaid, axisEnd, NO_AXES_SAID, paperScope, planPaper } from "../../cells/index.ts";
import { labelText } from "../../figures/index.ts";
import { type Paper, readPaper } from "../../paper/index.ts";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { type SheetHost, sheetHost } from "../text/host.ts";
import {
  type AxesAsked,
  type AxesGround,
  type AxisFields,
  type AxisName,
  askedOf,
  computedEnds,
  fieldsOf,
} from "./axes-fields.ts";
import { usePlates } from "./use-plates.ts";

interface Props {
  readonly sheet: SheetAtHand;
}

/** The fields for a figure's axes. What they ask for is looked at on the sheet at once, and written when it is set. */
export function AxesStrip({ sheet }: Props) {
  const host = sheet.view.state.facet(sheetHost);
  return host === null ? null : <OfOneFigure sheet={sheet} host={host} />;
}

function OfOneFigure({ sheet, host }: Props & { readonly host: SheetHost }) {
  const slot = usePlates(host.plates, (view) => view.axesOf);
  const ground = slot === null ? null : groundOf(sheet, host, slot);
  if (slot === null || ground === null)
    return <p className="hl-strip-words">The figure is not there any more, or its working cannot be read.</p>;
  return <Fields key={slot} sheet={sheet} host={host} slot={slot} first={ground} />;
}

interface FieldsProps extends Props {
  readonly host: SheetHost;
  readonly slot: string;
  readonly first: AxesGround;
}

function Fields({ sheet, host, slot, first }: FieldsProps) {
  const [ground] = useState(first);
  const [fields, setFields] = useState(() => fieldsOf(ground));
  const asked = useMemo(() => askedOf(ground, fields), [ground, fields]);
  const computed = useMemo(
    () => computedEnds(ground, { x: fields.x.scale, y: fields.y.scale }),
    [ground, fields.x.scale, fields.y.scale],
  );
  const title = titleOf(sheet, slot);
  useTrial(host, slot, ground, asked);
  const { desk, strips } = sheet;
  const write = (said: NonNullable<AxesAsked["said"]>, words: string) => {
    // In the text as it is now: others may have written since.
    const paper = paperNow(sheet);
    const cell = paper.cells.find((each) => each.slot === slot);
    const edits = cell === undefined ? [] : axesEdits(paper.text, cell, said);
    if (edits.length > 0) {
      desk.edit({ changes: edits, userEvent: "input.axes" });
      // Stays on the plate until the sheet has it from the text.
      host.plates.set({ axesOf: null });
    }
    strips.set({ open: null });
    desk.tell(edits.length > 0 ? `${words} One step to undo.` : `The axes of ${title} are as they were.`);
  };
  return (
    <form
      className="hl-axes"
      onSubmit={(event) => {
        event.preventDefault();
        if (asked.said !== null) write(asked.said, `The axes of ${title} are set.`);
      }}
    >
      {(["x", "y"] as const).map((axis) => (
        <OneAxis
          key={axis}
          axis={axis}
          name={nameOf(ground, axis)}
          fields={fields[axis]}
          computed={computed[axis]}
          faults={asked.faults}
          onChange={(change) => setFields((now) => ({ ...now, [axis]: { ...now[axis], ...change } }))}
        />
      ))}
      <div className="hl-find-line">
        <Command type="submit" disabled={asked.said === null}>
          Set the axes
        </Command>
        <Command
          disabled={!saysSomething(ground)}
          onClick={() => write(NO_AXES_SAID, `The axes of ${title} are the computed ones again.`)}
        >
          Back to the computed range
        </Command>
      </div>
    </form>
  );
}

/** Shows on the sheet what is asked for, as long as the fields are open. */
function useTrial(host: SheetHost, slot: string, { figure }: AxesGround, { tried }: AxesAsked): void {
  useEffect(() => host.plates.set({ tried: { slot, figure, ...tried } }), [host, slot, figure, tried]);
  useEffect(
    () => () => {
      if (host.plates.get().axesOf === slot) host.plates.set({ axesOf: null, tried: null });
    },
    [host, slot],
  );
}

interface OneAxisProps {
  readonly axis: AxisName;
  readonly name: string;
  readonly fields: AxisFields;
  readonly computed: readonly [string, string];
  readonly faults: AxesAsked["faults"];
  onChange(change: Partial<AxisFields>): void;
}

function OneAxis({ axis, name, fields, computed, faults, onChange }: OneAxisProps) {
  const id = useId();
  const fault = faults.get(`${axis} from`) ?? faults.get(`${axis} to`) ?? faults.get(`${axis} scale`) ?? "";
  const described = (field: keyof AxisFields) =>
    faults.has(`${axis} ${field}`) ? { "aria-invalid": true, "aria-describedby": id } : {};
  const end = (field: "from" | "to", placeholder: string) => (
    <label>
      {field}{" "}
      <input
        {...(axis === "x" && field === "from" ? { "data-first": "" } : {})}
        {...described(field)}
        className="hl-strip-field hl-axes-end"
        value={fields[field]}
        placeholder={placeholder}
        onChange={({ target }) => onChange({ [field]: target.value })}
        inputMode="text"
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
      />
    </label>
  );
  return (
    <fieldset className="hl-axes-axis">
      <legend>{name}</legend>
      {end("from", computed[0])}
      {end("to", computed[1])}
      {(["linear", "log"] as const).map((scale) => (
        <label key={scale} className="hl-tick">
          <input
            {...described("scale")}
            type="radio"
            name={`${id} scale`}
            checked={fields.scale === scale}
            onChange={() => onChange({ scale })}
          />
          {scale === "log" ? "logarithmic" : "linear"}
        </label>
      ))}
      <span className="hl-axes-fault hl-amiss" id={id} role="status">
        {fault}
      </span>
    </fieldset>
  );
}

/** "Across, x": where the axis lies, and its variable. */
function nameOf({ figure }: AxesGround, axis: AxisName): string {
  const variable = labelText(figure[axis].label);
  const where = axis === "x" ? "Across" : "Upwards";
  return variable === "" ? where : `${where}, ${variable}`;
}

function saysSomething({ said }: AxesGround): boolean {
  return [said.x, said.y].some(({ range, scale }) => range !== null || scale !== null);
}

function titleOf({ desk }: SheetAtHand, slot: string): string {
  return desk.store.get().model?.cells.find((cell) => cell.slot === slot)?.title ?? "The figure";
}

function paperNow({ desk, view }: SheetAtHand): Paper {
  return readPaper(view.state.doc.toString(), desk.bibliographyNow());
}

function groundOf(sheet: SheetAtHand, host: SheetHost, slot: string): AxesGround | null {
  const figure = host.views.get(slot)?.view.figure ?? null;
  const paper = paperNow(sheet);
  const cell = paper.cells.find((each) => each.slot === slot);
  if (figure === null || cell === undefined || cell.body === null) return null;
  const scope = paperScope(planPaper(paper), new Map());
  return { figure, said: axesSaid(cell), numberOf: (source) => axisEnd(source, scope) };
}
