import { useEffect, useMemo, useRef, useState } from "react";
import {
  addsParameter,
  changesParameter,
  nameFault,
  PARAMETER_FIELDS,
  type ParameterEdit,
  type ParameterField,
  type ParameterFields,
  type ParameterProblem,
  parameterFields,
} from "../../cells/index.ts";
import { toDouble } from "../../formulas/index.ts";
import { mathFault } from "../../ui/math.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { isPlainNumber, shownValue } from "../model/scale.ts";
import { made, paperNow, plainWords } from "./edit-rule.ts";

/** How long typing rests before the paper is read with it, in ms. */
const REST_MS = 250;

/** What is being written of one parameter, or of a new one. */
export interface Entry {
  readonly name: string;
  readonly fields: ParameterFields;
  /** null: nothing stands against it, as far as it was looked at. */
  readonly problem: ParameterProblem | null;
  /** What a formula comes to; "" for a plain number, and before it was looked at. */
  readonly comesTo: string;
  setName(name: string): void;
  set(field: ParameterField, words: string): void;
  /** Makes the edit. @returns what was done, in words; null when a problem stands against it */
  settle(): string | null;
}

const NOTHING: ParameterFields = { value: "", min: "", max: "", step: "", symbol: "", unit: "", note: "", se: "" };

/**
 * An entry of the rule while it is written: looked at when the typing rests, tried privately where its value is sound,
 * made as one edit. Fields that were not touched are left as they are in the text by then.
 * @param name of the parameter; null: a new one
 */
export function useEntry(sheet: SheetAtHand, name: string | null): Entry | null {
  const base = useMemo(() => (name === null ? NOTHING : parameterFields(paperNow(sheet).paper, name)), [sheet, name]);
  const [fields, setFields] = useState(base ?? NOTHING);
  const [newName, setNewName] = useState("");
  const [seen, setSeen] = useState<ParameterEdit | ParameterProblem | null>(null);
  const tried = useRef(false);
  const { desk } = sheet;

  const edit = useMemo(
    () => (): ParameterEdit | ParameterProblem => {
      const { paper, bibliography } = paperNow(sheet);
      const unset = mathFault(fields.symbol, paper.front.macros);
      if (unset !== "") return { problem: unset, field: "symbol" };
      if (name === null) return addsParameter(paper, bibliography, newName, fields);
      return changesParameter(paper, bibliography, name, changesOf(base ?? NOTHING, fields));
    },
    [sheet, name, newName, base, fields],
  );
  useEffect(() => {
    const timer = setTimeout(() => {
      const begun = name !== null || (newName !== "" && fields.value.trim() !== "");
      const found = begun ? edit() : newName === "" ? null : nameProblem(sheet, newName);
      setSeen(found);
      const tries = found !== null && !("problem" in found) && name !== null && fields.value !== base?.value;
      if (tries) desk.tryParameter(name, fields.value);
      else if (tried.current && name !== null) desk.tryParameter(name, null);
      tried.current = tries;
    }, REST_MS);
    return () => clearTimeout(timer);
  }, [sheet, desk, name, newName, base, fields, edit]);
  // What was tried ends with the entry.
  useEffect(
    () => () => {
      if (tried.current && name !== null) desk.tryParameter(name, null);
    },
    [desk, name],
  );

  if (base === null) return null;
  return {
    name: name ?? newName,
    fields,
    problem: seen !== null && "problem" in seen ? { ...seen, problem: plainWords(seen.problem) } : null,
    comesTo: comesTo(seen, fields.value),
    setName: setNewName,
    set: (field, words) => setFields((before) => ({ ...before, [field]: words })),
    settle() {
      const now = edit();
      setSeen(now);
      if (!made(sheet, now)) return null;
      tried.current = false;
      if (name === null) return `${newName} is a parameter now; one step to undo.`;
      return now.edits.length === 0 ? "" : `${name} is changed; one step to undo.`;
    },
  };
}

function changesOf(base: ParameterFields, fields: ParameterFields): Partial<ParameterFields> {
  const changed = PARAMETER_FIELDS.filter((field) => fields[field] !== base[field]);
  return Object.fromEntries(changed.map((field) => [field, fields[field]]));
}

function nameProblem(sheet: SheetAtHand, name: string): ParameterProblem | null {
  const problem = nameFault(paperNow(sheet).paper, name);
  return problem === "" ? null : { problem, field: "name" };
}

function comesTo(seen: ParameterEdit | ParameterProblem | null, source: string): string {
  if (seen === null || "problem" in seen || isPlainNumber(source)) return "";
  const value = seen.after?.value;
  return value?.type === "number" ? shownValue(toDouble(value.quantity), seen.after?.source ?? "", null) : "";
}
