import { LIMITS } from '../schema/limits';
import { FUNCTION_NAMES, type FunctionName } from '../schema/symbols';
import { nearestSymbol } from './nearest-symbol';
import type { Token } from './tokens';
import type { FormulaFailure } from './tree';

/** How many arguments each function takes. */
export const ARITY: Readonly<Record<FunctionName, { readonly least: number; readonly most: number }>> = {
  exp: { least: 1, most: 1 },
  log: { least: 1, most: 1 },
  sqrt: { least: 1, most: 1 },
  abs: { least: 1, most: 1 },
  sin: { least: 1, most: 1 },
  cos: { least: 1, most: 1 },
  tanh: { least: 1, most: 1 },
  min: { least: 2, most: 16 },
  max: { least: 2, most: 16 },
};

export function isFunctionName(text: string): text is FunctionName {
  return (FUNCTION_NAMES as readonly string[]).includes(text);
}

/** An open parenthesis: what it belongs to, and what has been met inside it. */
interface Frame {
  readonly open: Token | null;
  readonly call: FunctionName | null;
  commas: number;
  /** Question marks that still wait for their colon. */
  readonly questions: Token[];
  /** All question marks of this frame: `a ? b : c ? d : e` nests to the right. */
  nested: number;
}

/**
 * Checks the order of a formula's words before it is parsed: operands and operators in turn,
 * parentheses and conditionals closed, functions known and given as many arguments as they take,
 * nesting within `LIMITS.formulaDepth`. Works without recursion, so no nesting can exhaust the stack.
 * Returns null where all is well, else the first refusal.
 */
export function checkGrammar(tokens: readonly Token[], text: string): FormulaFailure | null {
  if (tokens.length === 0)
    return failure('The formula is empty; write a number, a symbol or an expression.', 0, text.length);
  const frames: Frame[] = [{ open: null, call: null, commas: 0, questions: [], nested: 0 }];
  let operandDue = true;
  let signs = 0;
  for (let k = 0; k < tokens.length; k += 1) {
    const token = tokens[k] as Token;
    const previous = tokens[k - 1] ?? null;
    const next = tokens[k + 1] ?? null;
    const frame = frames[frames.length - 1] as Frame;
    const opensCall = token.kind === 'symbol' && next?.kind === 'open';
    if (token.kind === 'number' || token.kind === 'symbol' || token.kind === 'open') {
      if (!operandDue) return implicitProduct(previous as Token, token, text);
      signs = 0;
      if (token.kind === 'open') {
        frames.push({ open: token, call: callName(previous), commas: 0, questions: [], nested: 0 });
        if (frames.length + frame.nested > LIMITS.formulaDepth) return tooDeep(token);
      } else if (opensCall) {
        if (!isFunctionName(token.text)) return noFunction(token);
      } else {
        if (isFunctionName(token.text)) return barefunction(token);
        operandDue = false;
      }
      continue;
    }
    if (operandDue && token.kind === 'operator' && token.text === '-') {
      signs += 1;
      if (signs > LIMITS.formulaDepth) return tooDeep(token);
      continue;
    }
    if (operandDue) return missingOperand(previous, token);
    operandDue = true;
    signs = 0;
    if (token.kind === 'comma') {
      if (frame.call === null) return strayComma(tokens, k, text);
      if (frame.questions.length > 0) return noColon(frame.questions);
      frame.commas += 1;
      frame.nested = 0;
    } else if (token.kind === 'question') {
      frame.questions.push(token);
      frame.nested += 1;
      if (frames.length + frame.nested > LIMITS.formulaDepth) return tooDeep(token);
    } else if (token.kind === 'colon') {
      if (frame.questions.pop() === undefined) {
        return failure(
          'This colon has no question mark before it; a conditional is written condition ? a : b.',
          token.from,
          token.to,
        );
      }
    } else if (token.kind === 'close') {
      const problem = closeFrame(frames, tokens, token);
      if (problem !== null) return problem;
      operandDue = false;
    }
  }
  return checkEnd(frames, tokens[tokens.length - 1] as Token, operandDue);
}

function checkEnd(frames: readonly Frame[], last: Token, operandDue: boolean): FormulaFailure | null {
  if (operandDue)
    return failure(
      `The formula ends after ${last.text} where a value is due; add it or remove ${last.text}.`,
      last.from,
      last.to,
    );
  const frame = frames[frames.length - 1] as Frame;
  if (frame.questions.length > 0) return noColon(frame.questions);
  if (frame.open !== null)
    return failure('This parenthesis is never closed; add ).', frame.open.from, frame.open.to);
  return null;
}

function closeFrame(frames: Frame[], tokens: readonly Token[], token: Token): FormulaFailure | null {
  const frame = frames[frames.length - 1] as Frame;
  if (frame.open === null)
    return failure('This closing parenthesis has no opening one; remove it.', token.from, token.to, '');
  if (frame.questions.length > 0) return noColon(frame.questions);
  frames.pop();
  if (frame.call === null) return null;
  const { least, most } = ARITY[frame.call];
  const count = frame.commas + 1;
  if (count >= least && count <= most) return null;
  const takes = least === most ? `takes one argument` : `takes ${least} to ${most} arguments`;
  const name = tokens[tokens.indexOf(frame.open) - 1] as Token;
  return failure(
    `${frame.call} ${takes}, and ${count === 1 ? 'only one is' : `${count} are`} given.`,
    name.from,
    token.to,
  );
}

function implicitProduct(previous: Token, token: Token, text: string): FormulaFailure {
  const left = previous.kind === 'close' ? '(...)' : previous.text;
  const right = token.kind === 'open' ? '(...)' : token.text;
  if (['and', 'or', 'not'].includes(token.text) || ['and', 'or', 'not'].includes(previous.text)) {
    const word = ['and', 'or', 'not'].includes(token.text) ? token : previous;
    return failure(
      `The word ${word.text} joins no conditions here; nest them instead: a < b ? (c < d ? x : y) : y.`,
      word.from,
      word.to,
    );
  }
  return failure(
    `There is no operator between ${left} and ${right}; write ${left}*${right} to multiply.`,
    previous.from,
    token.to,
    `${text.slice(previous.from, previous.to)}*${text.slice(token.from, token.to)}`,
  );
}

function missingOperand(previous: Token | null, token: Token): FormulaFailure {
  if (token.kind === 'operator' && token.text === '+') {
    return failure('A plus sign stands between two values; remove this one.', token.from, token.to, '');
  }
  const where = previous === null ? `before ${token.text}` : `between ${previous.text} and ${token.text}`;
  return failure(
    `A value is missing ${where}; add a number, a symbol or an expression.`,
    previous?.from ?? token.from,
    token.to,
  );
}

function strayComma(tokens: readonly Token[], k: number, text: string): FormulaFailure {
  const [before, comma, after] = [tokens[k - 1], tokens[k] as Token, tokens[k + 1]];
  const decimal = before?.kind === 'number' && after?.kind === 'number' && after.from - before.to === 1;
  if (decimal) {
    return failure(
      'Decimals are written with a point.',
      before.from,
      after.to,
      text.slice(before.from, after.to).replace(',', '.'),
    );
  }
  return failure(
    'A comma separates the arguments of min or max only; decimals are written with a point.',
    comma.from,
    comma.to,
  );
}

function noFunction(token: Token): FormulaFailure {
  const nearest = nearestSymbol(token.text, FUNCTION_NAMES);
  const hint =
    nearest === null
      ? `write ${token.text}*(...) to multiply`
      : `${nearest} may be meant, or ${token.text}*(...) to multiply`;
  return failure(
    `${token.text} is no function of the formula language (${FUNCTION_NAMES.join(', ')}); ${hint}.`,
    token.from,
    token.to,
    nearest,
  );
}

function barefunction(token: Token): FormulaFailure {
  return failure(
    `${token.text} is a function and needs its argument in parentheses, as in ${token.text}(x).`,
    token.from,
    token.to,
  );
}

function noColon(questions: readonly Token[]): FormulaFailure {
  const question = questions[questions.length - 1] as Token;
  return failure(
    'This conditional has no colon; it is written condition ? a : b.',
    question.from,
    question.to,
  );
}

function tooDeep(token: Token): FormulaFailure {
  return failure(
    `The formula is nested more than ${LIMITS.formulaDepth} deep; split it into intermediate formulas.`,
    token.from,
    token.to,
  );
}

function callName(token: Token | null): FunctionName | null {
  return token?.kind === 'symbol' && isFunctionName(token.text) ? token.text : null;
}

function failure(
  message: string,
  from: number,
  to: number,
  suggestion: string | null = null,
): FormulaFailure {
  return { message, range: { from, to }, suggestion };
}
