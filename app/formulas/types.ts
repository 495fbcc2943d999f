/**
 * What a formula is and what it gives. Nothing here imports the rest of the program.
 *
 * Life of a formula: source text ──parse──▶ Formula (a checked tree, JSON-safe) ──compile──▶ closure ──call──▶ Value.
 */

/**
 * A computed number. It stands for `mantissa · 2^exponent`, so that 10^-741 is an ordinary number here;
 * `exponent` is 0 wherever the double's range suffices. `error` and `se` are in units of `2^exponent`.
 */
export interface Quantity {
  readonly mantissa: number;
  readonly exponent: number;
  /** Half-width of an absolute bound on the numerical error, for the inputs as given. 0 for parameters and whole numbers. */
  readonly error: number;
  /** Standard error where data or chance enter; else 0. */
  readonly se: number;
  /**
   * Independent sources of chance: name → the signed standard error that it contributes, in units of `2^exponent`;
   * `se` is the root of the sum of their squares. So x - x has se 0, and the unknowns of one fit keep their covariance
   * (a fit gives each unknown its row of the covariance matrix's Cholesky factor). Absent where `se` is 0.
   */
  readonly sources?: Readonly<Record<string, number>>;
}

/** What a value of a cell, or a formula, gives. A refused value never prints as 0: its reason prints instead. */
export type Value =
  | { readonly type: "number"; readonly quantity: Quantity }
  | { readonly type: "truth"; readonly holds: boolean | null /* null: undecided within the errors */ }
  | { readonly type: "text"; readonly text: string }
  | { readonly type: "none" }
  | { readonly type: "refused"; readonly reason: string };

/** A checked syntax tree, plain JSON, so that it can be hashed, stored and sent to a worker. */
export type Formula =
  | { readonly node: "number"; readonly value: number }
  | { readonly node: "none" }
  | { readonly node: "name"; readonly name: string; readonly at: number }
  /** `K.mean`, `tail.s0` */
  | { readonly node: "member"; readonly of: string; readonly member: string; readonly at: number }
  /** built-in function or operator; `name` is canonical: add subtract multiply divide power negate lt le gt ge eq ne and or not if sqrt exp … */
  | { readonly node: "apply"; readonly name: string; readonly args: readonly Formula[]; readonly at: number }
  /** `K(3)`, `K.above(3)`: a callable of a cell; member is "" for the cell itself */
  | {
      readonly node: "call";
      readonly of: string;
      readonly member: string;
      readonly args: readonly Formula[];
      readonly at: number;
    }
  /** sum integral derivative least: binds `variable` in `body` */
  | {
      readonly node: "bind";
      readonly binder: string;
      readonly body: Formula;
      readonly variable: string;
      readonly args: readonly Formula[];
      readonly at: number;
    };

/** A mistake in a formula; `from`..`to` are offsets in its source text. */
export interface FormulaProblem {
  readonly message: string;
  readonly from: number;
  readonly to: number;
}

export type ParsedFormula =
  | { readonly ok: true; readonly formula: Formula }
  | { readonly ok: false; readonly problem: FormulaProblem };

/** What the names in a formula mean when it is evaluated. */
export interface Scope {
  /** A parameter, dummy or earlier key; undefined when there is none of that name. */
  name(name: string): Value | undefined;
  /** `of.member`; undefined when there is no such cell, refused when the member has no meaning here. */
  member(of: string, member: string): Value | undefined;
  /** `of(args)` or `of.member(args)`. */
  call(of: string, member: string, args: readonly Quantity[]): Value | undefined;
}

/** Bounds the work of an evaluation: each operation and each call counts; throws FormulaError("budget") when used up. */
export interface Budget {
  left: number;
}

/** A number as printed, its digits parted into those the error supports and those it does not. */
export interface PrintedNumber {
  /** Whole text in plain Unicode, unsupported digits left out: "5.436 88", "2.58×10⁻⁷⁴¹", "11.4(3)", "13.1 %". */
  readonly text: string;
  /** The same as TeX, without dollars: `2.58\times10^{-741}`. */
  readonly tex: string;
  /** For siunitx: `\num{2.58e-741}` */
  readonly siunitx: string;
  /** Digits asked for but not supported: shown grey on the sheet, printed nowhere. "" when all are. */
  readonly unsupported: string;
  /** How many significant digits the error supports (Infinity for exact numbers, 0: "no digit known"). */
  readonly supported: number;
  /**
   * What the sheet shows: `known` in ink, `unknown` (= `unsupported`) grey, then `rest` ("×10⁻⁵", " %", "(3)").
   * `known` is not rounded where `unknown` follows, so that all of it together is the number to the digits asked.
   */
  readonly sheet: { readonly known: string; readonly unknown: string; readonly rest: string };
}

/** How a number is to be printed: the attributes of `:value`. */
export interface PrintOptions {
  readonly digits?: number;
  readonly decimals?: number;
  readonly as?: "plain" | "scientific" | "percent";
  readonly withError?: boolean;
  readonly unit?: string;
}
