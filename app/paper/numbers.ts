import type { Attributes } from "./attributes.ts";
import { didYouMean } from "./spelling.ts";
import type { BoundNumber } from "./types.ts";

type Options = { -readonly [Key in keyof BoundNumber["options"]]: BoundNumber["options"][Key] };

/** A mistake in the attributes of a number, at indices of the attributes' source. */
export interface OptionFault {
  readonly from: number;
  readonly to: number;
  readonly message: string;
}

const mostDigits = 15;

/** What may stand in the braces after a number, for checking, completion and the manual. */
export const NUMBER_ATTRIBUTES: readonly { readonly form: string; readonly meaning: string }[] = [
  { form: "digits=6", meaning: "significant digits, 1 to 15; 6 when nothing is said" },
  { form: "decimals=3", meaning: "digits after the decimal point, 0 to 15" },
  { form: "as=scientific", meaning: "plain, scientific or percent" },
  { form: "with=se", meaning: "the standard error in brackets after the number: 11.4(3)" },
  { form: "unit=yes", meaning: "with the unit of the parameter it reads" },
];

const attributeNames = NUMBER_ATTRIBUTES.map(({ form }) => form.split("=")[0] ?? "");

/** How a number is to be printed, from its attributes; what is not allowed is left out and reported. */
export function readNumberOptions(attributes: Attributes): { options: Options; faults: OptionFault[] } {
  const options: Options = {};
  const faults: OptionFault[] = [];
  for (const { name, value, from, to } of attributes.values) {
    const message = readOption(options, name, value);
    if (message !== null) faults.push({ from, to, message });
  }
  if (options.digits !== undefined && options.decimals !== undefined) {
    faults.push({ from: 0, to: 0, message: "Give “digits” or “decimals”, not both." });
  }
  if (attributes.rest !== "" || attributes.label !== null) {
    const what = attributes.rest || `#${attributes.label}`;
    faults.push({
      from: 0,
      to: 0,
      message: `“${what}” means nothing here. A number takes ${listed(attributeNames)}, each as name=value.`,
    });
  }
  return { options, faults };
}

function readOption(options: Options, name: string, value: string): string | null {
  switch (name) {
    case "digits":
    case "decimals": {
      const least = name === "digits" ? 1 : 0;
      const count = /^\d{1,3}$/.test(value) ? Number(value) : -1;
      if (count < least || count > mostDigits) return `“${name}” is a whole number from ${least} to ${mostDigits}.`;
      options[name] = count;
      return null;
    }
    case "as":
      if (value !== "plain" && value !== "scientific" && value !== "percent") {
        return `“as” is plain, scientific or percent.${didYouMean(value, ["plain", "scientific", "percent"])}`;
      }
      options.as = value;
      return null;
    case "with":
      if (value !== "se") return "“with” is se: the standard error in brackets after the number.";
      options.withError = true;
      return null;
    case "unit":
      if (value !== "yes" && value !== "no") return "“unit” is yes or no.";
      options.withUnit = value === "yes";
      return null;
    default:
      return `A number has no attribute “${name}”. It takes ${listed(attributeNames)}.${didYouMean(name, attributeNames)}`;
  }
}

function listed(words: readonly string[]): string {
  return `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}
