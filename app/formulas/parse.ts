import { create, type MathNode, parseDependencies } from "mathjs/number";
import { nearestSpelling } from "../spelling/index.ts";
import { checkOrder } from "./grammar.ts";
import { child, children, field, placeholderIndex } from "./math-node.ts";
import { isBracketed, readTokens, type Token } from "./tokens.ts";
import { isIf, isTruth } from "./truths.ts";
import type { Formula, FormulaProblem, ParsedFormula } from "./types.ts";
import { BINDERS, CONSTANTS, FUNCTIONS, functionNamed, RESERVED_NAMES, WORD_OPERATORS } from "./words.ts";

/** Longest formula, in characters: its tree is then never deeper than the stack of a worker bears. */
const LONGEST = 2000;

/** mathjs' parser alone, without anything that could evaluate. */
const { parse: mathParse } = create(parseDependencies ?? {});

const OPERATORS: ReadonlyMap<string, string> = new Map([
  ["add", "add"],
  ["subtract", "subtract"],
  ["multiply", "multiply"],
  ["divide", "divide"],
  ["pow", "power"],
  ["unaryMinus", "negate"],
  ["smaller", "lt"],
  ["smallerEq", "le"],
  ["larger", "gt"],
  ["largerEq", "ge"],
  ["equal", "eq"],
  ["unequal", "ne"],
  ["and", "and"],
  ["or", "or"],
  ["not", "not"],
]);
const LOGICAL: ReadonlySet<string> = new Set(["and", "or", "not"]);

/** A mistake found while the tree is read; caught by `parseFormula`. */
class Mistake extends Error {
  readonly problem: FormulaProblem;
  constructor(problem: FormulaProblem) {
    super(problem.message);
    this.problem = problem;
  }
}

/** A checked tree and the tokens it covers, first and last. */
interface Part {
  readonly formula: Formula;
  readonly first: number;
  readonly last: number;
}

/**
 * Reads the source text of a formula into a checked tree.
 * The order of words and signs is checked first; then mathjs' parser finds the structure. It is handed placeholders
 * only (`t0 + t1*t2`), so no word of the text can mean anything to it, and each placeholder leads back to its place.
 * Never throws; a mistake comes back with its offsets, what is allowed and the nearest right spelling.
 */
export function parseFormula(source: string): ParsedFormula {
  if (source.length > LONGEST) {
    const message = `The formula is longer than ${LONGEST} characters; name parts of it in a formula cell.`;
    return { ok: false, problem: { message, from: LONGEST, to: source.length } };
  }
  const read = readTokens(source);
  if (!read.ok) return read;
  const problem = checkOrder(read.tokens, source.length);
  if (problem) return { ok: false, problem };
  try {
    const tree = mathParse(read.tokens.map(placeholder).join(" "));
    const part = new TreeReader(read.tokens).read(tree);
    return { ok: true, formula: part.formula };
  } catch (error) {
    if (error instanceof Mistake) return { ok: false, problem: error.problem };
    // The order check leaves the parser nothing to refuse; should it do so all the same, the whole formula is meant.
    const message = "The formula cannot be read; write it with more brackets, or in parts in a formula cell.";
    return { ok: false, problem: { message, from: 0, to: source.length } };
  }
}

function placeholder(token: Token, index: number, tokens: readonly Token[]): string {
  const isMember = tokens[index - 1]?.type === "dot";
  if (token.type === "number") return String(index);
  if (token.type === "name" && (isMember || !WORD_OPERATORS.has(token.text))) return `t${index}`;
  return token.text;
}

class TreeReader {
  private readonly tokens: readonly Token[];

  constructor(tokens: readonly Token[]) {
    this.tokens = tokens;
  }

  read(node: MathNode): Part {
    switch (node.type) {
      case "ConstantNode": {
        const index = Number(field(node, "value"));
        return { formula: { node: "number", value: Number(this.token(index).text) }, first: index, last: index };
      }
      case "ParenthesisNode": {
        const inner = this.read(child(node, "content"));
        return { formula: inner.formula, first: inner.first - 1, last: inner.last + 1 };
      }
      case "SymbolNode":
        return this.readName(node);
      case "AccessorNode":
        return this.readMember(node);
      case "OperatorNode":
        return this.readOperator(node);
      case "RelationalNode":
        return this.refuseChain(node);
      case "FunctionNode":
        return this.readCall(node);
      default:
        throw new Error(`unexpected node ${node.type}`);
    }
  }

  private readName(node: MathNode): Part {
    const index = placeholderIndex(node);
    const { text, from } = this.token(index);
    const place = { first: index, last: index };
    if (text === "none") return { formula: { node: "none" }, ...place };
    if (CONSTANTS.has(text)) return { formula: { node: "apply", name: text, args: [], at: from }, ...place };
    const word = functionNamed(text);
    if (word) this.fail(`${text} is a function and needs its brackets: ${word.form}.`, index, index);
    return { formula: { node: "name", name: text, at: from }, ...place };
  }

  private memberTokens(node: MathNode): { of: number; member: number } {
    const of = placeholderIndex(child(node, "object"));
    this.refuseReserved(of);
    return { of, member: of + 2 };
  }

  private readMember(node: MathNode): Part {
    const { of, member } = this.memberTokens(node);
    const owner = this.token(of);
    const formula: Formula = { node: "member", of: owner.text, member: this.token(member).text, at: owner.from };
    return { formula, first: of, last: member };
  }

  private readOperator(node: MathNode): Part {
    const args = children(node, "args").map((arg) => this.read(arg));
    const fn = String(field(node, "fn"));
    const first = args[0] as Part;
    const last = args[args.length - 1] as Part;
    if (fn === "unaryPlus") {
      this.refuseTruth(first, "+");
      return { ...first, first: first.first - 1 };
    }
    const name = OPERATORS.get(fn);
    if (name === undefined) throw new Error(`unexpected operator ${fn}`);
    const signIndex = args.length === 1 ? first.first - 1 : first.last + 1;
    const sign = this.token(signIndex);
    for (const arg of args) {
      if (LOGICAL.has(name)) this.refuseNumber(arg, sign.text);
      else this.refuseTruth(arg, sign.text);
    }
    const formula: Formula = { node: "apply", name, args: args.map((arg) => arg.formula), at: sign.from };
    return { formula, first: Math.min(signIndex, first.first), last: last.last };
  }

  private refuseChain(node: MathNode): never {
    const parts = children(node, "params").map((part) => this.read(part));
    const first = parts[0] as Part;
    const second = parts[1] as Part;
    const a = this.textOf(first);
    const b = this.textOf(second);
    const c = this.textOf(parts[2] as Part);
    const left = this.token(first.last + 1).text;
    const right = this.token(second.last + 1).text;
    return this.fail(
      `Comparisons do not chain; write ${a} ${left} ${b} and ${b} ${right} ${c}.`,
      first.first,
      (parts[parts.length - 1] as Part).last,
    );
  }

  private readCall(node: MathNode): Part {
    const callee = child(node, "fn");
    const args = children(node, "args").map((arg) => this.read(arg));
    const last = (args[args.length - 1] as Part).last + 1;
    if (callee.type === "AccessorNode") {
      const { of, member } = this.memberTokens(callee);
      const owner = this.token(of);
      this.refuseTruths(args, `${owner.text}.${this.token(member).text}`);
      const formula: Formula = {
        node: "call",
        of: owner.text,
        member: this.token(member).text,
        args: args.map((arg) => arg.formula),
        at: owner.from,
      };
      return { formula, first: of, last };
    }
    const first = placeholderIndex(callee);
    const { text, from } = this.token(first);
    const word = functionNamed(text);
    if (word === undefined) {
      this.refuseReserved(first);
      this.refuseTruths(args, text);
      return {
        formula: { node: "call", of: text, member: "", args: args.map((a) => a.formula), at: from },
        first,
        last,
      };
    }
    const [fewest, most] = word.arity;
    if (args.length < fewest || args.length > most) {
      const wanted = fewest === most ? `${fewest}` : `${fewest} to ${most}`;
      const noun = wanted === "1" ? "argument" : "arguments";
      this.fail(`${text} takes ${wanted} ${noun}, not ${args.length}: ${word.form}.`, first, last);
    }
    if (BINDERS.has(text)) return { formula: this.readBinder(text, args, from), first, last };
    if (text === "if") this.refuseNumber(args[0] as Part, "if");
    else this.refuseTruths(args, text);
    return { formula: { node: "apply", name: text, args: args.map((arg) => arg.formula), at: from }, first, last };
  }

  private readBinder(binder: string, args: readonly Part[], at: number): Formula {
    const [body, variable, ...rest] = args as [Part, Part, ...Part[]];
    if (variable.formula.node !== "name" || variable.first !== variable.last) {
      const form = functionNamed(binder)?.form;
      this.fail(
        `The second argument of ${binder} is the name of its variable: ${form}.`,
        variable.first,
        variable.last,
      );
    }
    if (binder === "least") this.refuseNumber(body, binder);
    else this.refuseTruth(body, binder);
    this.refuseTruths(rest, binder);
    const name = variable.formula.node === "name" ? variable.formula.name : "";
    return { node: "bind", binder, body: body.formula, variable: name, args: rest.map((arg) => arg.formula), at };
  }

  private refuseReserved(index: number): void {
    const { text } = this.token(index);
    if (!RESERVED_NAMES.has(text)) return;
    const near = nearestSpelling(
      text,
      FUNCTIONS.map((word) => word.name),
    );
    const hint = near !== null && near !== text ? ` Did you mean ${near}?` : "";
    this.fail(`${text} is a word of the language and cannot be called or asked for values.${hint}`, index, index);
  }

  private refuseTruths(args: readonly Part[], by: string): void {
    for (const arg of args) this.refuseTruth(arg, by);
  }

  private refuseTruth(part: Part, by: string): void {
    if (!isTruth(part.formula)) return;
    const text = this.textOf(part);
    const isNot = part.formula.node === "apply" && part.formula.name === "not";
    const cure = isNot
      ? "Put brackets round what not denies, as not (a < b)."
      : `Write if(${text}, 1, 0) for a number.`;
    this.fail(`${text} holds or does not; it is not a number that ${by} could take. ${cure}`, part.first, part.last);
  }

  private refuseNumber(part: Part, by: string): void {
    const { formula } = part;
    const mayBeTruth = isTruth(formula) || formula.node === "name" || formula.node === "member" || isIf(formula);
    if (mayBeTruth) return;
    const cure = by === "not" ? " Put brackets round what it denies, as not (a < b)." : "";
    this.fail(`${by} takes a comparison, such as x < 1, not ${this.textOf(part)}.${cure}`, part.first, part.last);
  }

  private textOf(part: Part): string {
    let text = "";
    let { first, last } = part;
    if (isBracketed(this.tokens.slice(first, last + 1))) {
      first += 1;
      last -= 1;
    }
    for (let i = first; i <= last; i++) {
      const token = this.token(i);
      const gap = i > first && token.from > this.token(i - 1).to ? " " : "";
      text += gap + token.text;
    }
    return text.length > 60 ? `${text.slice(0, 57)}...` : text;
  }

  private token(index: number): Token {
    const token = this.tokens[index];
    if (token === undefined) throw new Error(`no token ${index}`);
    return token;
  }

  private fail(message: string, first: number, last: number): never {
    throw new Mistake({ message, from: this.token(first).from, to: this.token(last).to });
  }
}
