import type { Token } from "./tokens.ts";
import type { FormulaProblem } from "./types.ts";
import { FOREIGN_WORDS, functionNamed, WORD_OPERATORS } from "./words.ts";

/** Deepest nesting of brackets, and most signs that bind to the right (powers, minus signs, nots), in one formula. */
const DEEPEST = 60;

interface Bracket {
  readonly token: Token;
  /** What it is the call of, or null for a bracket that groups. */
  readonly callee: string | null;
}

const isWordOperator = (token: Token): boolean => token.type === "name" && WORD_OPERATORS.has(token.text);
const isPrefix = (token: Token): boolean =>
  (token.type === "operator" && (token.text === "-" || token.text === "+")) ||
  (token.type === "name" && token.text === "not");
const isBinary = (token: Token): boolean =>
  token.type === "operator" || (token.type === "name" && (token.text === "and" || token.text === "or"));

/**
 * Checks that words and signs follow each other as the language wants, so that every mistake is found at its place
 * and told in our own words. Two states: an operand is expected, or an operator is.
 */
export function checkOrder(tokens: readonly Token[], length: number): FormulaProblem | null {
  const brackets: Bracket[] = [];
  let operandExpected = true;
  let rightBinding = 0;
  for (let i = 0; i < tokens.length; i++) {
    const token = tokens[i] as Token;
    const before = tokens[i - 1];
    const problem = operandExpected ? checkOperand(token, before, brackets) : checkOperator(tokens, i, brackets);
    if (problem) return problem;
    if ((operandExpected && isPrefix(token)) || token.text === "^") rightBinding += 1;
    if (token.type === "open") {
      const callee = !operandExpected && before ? before.text : null;
      brackets.push({ token, callee });
      operandExpected = true;
    } else if (token.type === "close") {
      brackets.pop();
      operandExpected = false;
    } else if (token.type === "comma" || token.type === "dot") {
      operandExpected = true;
    } else {
      const isOperator = token.type === "operator" || isWordOperator(token);
      operandExpected = before?.type === "dot" ? false : isOperator;
    }
    if (brackets.length > DEEPEST || rightBinding > DEEPEST * 2) {
      return {
        message: `The formula is nested too deeply; at most ${DEEPEST} brackets may be open at once. Name parts of it in a formula cell.`,
        from: token.from,
        to: token.to,
      };
    }
  }
  return checkEnd(tokens, brackets, operandExpected, length);
}

function checkOperand(token: Token, before: Token | undefined, brackets: readonly Bracket[]): FormulaProblem | null {
  const place = { from: token.from, to: token.to };
  if (before?.type === "dot") {
    if (token.type === "name") return null;
    return { message: `After a cell's name and a point the name of one of its values is expected.`, ...place };
  }
  if (token.type === "name" && FOREIGN_WORDS.has(token.text)) {
    return { message: FOREIGN_WORDS.get(token.text) ?? "", ...place };
  }
  if (token.type === "number" || token.type === "open" || isPrefix(token)) return null;
  if (token.type === "name" && !isWordOperator(token)) return null;
  const open = brackets.at(-1);
  if (token.type === "close" && before?.type === "open" && open !== undefined) {
    const what =
      open.callee === null ? "There is nothing between these brackets." : `${open.callee}() has no argument.`;
    return { message: `${what} A number, a name or a formula is expected there.`, ...place };
  }
  if (before === undefined) {
    return {
      message: `A formula cannot begin with ${token.text}; a number or a name is expected before it.`,
      ...place,
    };
  }
  return { message: `Between ${before.text} and ${token.text} a number, a name or a bracket is missing.`, ...place };
}

function checkOperator(tokens: readonly Token[], i: number, brackets: readonly Bracket[]): FormulaProblem | null {
  const token = tokens[i] as Token;
  const before = tokens[i - 1] as Token;
  const place = { from: token.from, to: token.to };
  if (token.type === "name" && token.text !== "not" && FOREIGN_WORDS.has(token.text)) {
    return { message: FOREIGN_WORDS.get(token.text) ?? "", ...place };
  }
  if (isBinary(token)) return null;
  if (token.type === "open") {
    const isName = before.type === "name" && !WORD_OPERATORS.has(before.text);
    if (isName) return null;
    return implicitProduct(before, token);
  }
  if (token.type === "close") {
    if (brackets.length > 0) return null;
    return { message: "This bracket closes nothing; leave it out, or open one before it.", ...place };
  }
  if (token.type === "comma") {
    const open = brackets.at(-1);
    if (open && open.callee !== null) return null;
    return {
      message: "A comma separates the arguments of a function; a decimal number has a point, as 1.5.",
      ...place,
    };
  }
  if (token.type === "dot") {
    const isFirstDot = before.type === "name" && tokens[i - 2]?.type !== "dot";
    if (isFirstDot && functionNamed(before.text) === undefined) return null;
    const message =
      before.type === "name" && isFirstDot
        ? `${before.text} is a function and has no values of its own.`
        : "A point stands between a cell's name and the name of one of its values, as in K.mean.";
    return { message, ...place };
  }
  return implicitProduct(before, token);
}

function implicitProduct(before: Token, token: Token): FormulaProblem {
  const left = before.type === "close" ? "(...)" : before.text;
  const right = token.type === "open" ? "(...)" : token.text;
  return {
    message: `Between ${left} and ${right} an operator is missing; a product is written with *, as ${left}*${right}.`,
    from: before.from,
    to: token.to,
  };
}

function checkEnd(
  tokens: readonly Token[],
  brackets: readonly Bracket[],
  operandExpected: boolean,
  length: number,
): FormulaProblem | null {
  const last = tokens.at(-1);
  if (last === undefined) {
    return { message: "The formula is empty; a number, a name or a formula is expected.", from: 0, to: length };
  }
  if (operandExpected) {
    const message = `The formula ends after ${last.text}; a number, a name or a bracket is missing there.`;
    return { message, from: last.from, to: last.to };
  }
  const open = brackets.at(-1);
  if (open) return { message: "This bracket is never closed.", from: open.token.from, to: open.token.to };
  return null;
}
