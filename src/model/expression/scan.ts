/**
 * A pass over the text before it is parsed: length, nesting, characters, and every juxtaposition that could
 * be read in two ways. It is linear, it knows columns, and what it lets through is within the language.
 */
import { type Culprit, InputError } from '../../errors/index.ts';
import { FUNCTION_NAMES } from './ast.ts';
import { nearest } from './nearest.ts';

/** Where a text comes from, for messages. */
export interface Where {
  readonly file?: string;
  readonly key?: string;
}

export const LENGTH_LIMIT = 256 * 1024;
export const NESTING_LIMIT = 200;

const FUNCTIONS: ReadonlySet<string> = new Set(FUNCTION_NAMES);
/** Words that the grammar takes for values or operators. */
const WORDS: ReadonlySet<string> = new Set('true false null undefined NaN Infinity mod to in and xor or not'.split(' '));
/** Letters that the tokenizer of the grammar accepts in names, without operators that share their blocks. */
const NAME = /(?:(?=[\u00C0-\u02AF\u0370-\u03FF\u210F])\p{L}|[A-Za-z_])(?:(?=[\u00C0-\u02AF\u0370-\u03FF\u210F])\p{L}|[A-Za-z_0-9])*/uy;
const NUMBER = /(?:\d+(?:\.(?![*/^]))?\d*|\.\d+)(?:[eE][+-]?\d+)?/y;
const CLOSED = /^[0-9.]+[A-Za-z_]/;

/** What to write instead of a character that is not in the language. */
const INSTEAD: ReadonlyMap<string, string> = new Map([
  ['\u2212', 'write - for the minus sign'],
  ['\u2013', 'write - for the minus sign'],
  ['\u00D7', 'write * for the product'],
  ['\u00B7', 'write * for the product'],
  ['\u22C5', 'write * for the product'],
  ['\u00F7', 'write / for the quotient'],
  ['\u2044', 'write / for the quotient'],
  ['\u00B9', 'write ^1'],
  ['\u00B2', 'write ^2'],
  ['\u00B3', 'write ^3'],
  ['\u2074', 'write ^4'],
  ['\u221A', 'write sqrt(…)'],
  ['\u03C0', 'write pi'],
  ['[', 'use round brackets'],
  [']', 'use round brackets'],
  ['{', 'use round brackets'],
  ['}', 'use round brackets'],
  ['%', 'write /100 for a percentage'],
  ['!', 'write the factorial out as a number'],
  ['=', 'put definitions under define'],
  [';', 'write one expression only'],
  [',', 'functions take one argument; write decimals with a point'],
  ['#', 'put comments outside the expression'],
  ['.', 'write numbers as 0.5 and products as *'],
]);
/** Functions that people try, and how the language says them. */
const SPELLINGS: ReadonlyMap<string, string> = new Map([
  ['ln', 'write log(…) for the natural logarithm'],
  ['log10', 'write log(…)/log(10)'],
  ['log2', 'write log(…)/log(2)'],
  ['cbrt', 'write (…)^(1/3)'],
  ['pow', 'write base^exponent'],
  ['abs', 'write sqrt((…)^2)'],
  ['cot', 'write 1/tan(…)'],
  ['sec', 'write 1/cos(…)'],
  ['csc', 'write 1/sin(…)'],
  ['coth', 'write 1/tanh(…)'],
  ['sech', 'write 1/cosh(…)'],
  ['csch', 'write 1/sinh(…)'],
]);

/** A piece of the text around an index, for messages. */
function excerpt(text: string, index: number): string {
  if (text.length <= 60) return text;
  const from = Math.max(0, index - 25);
  const to = Math.min(text.length, index + 25);
  return `${from > 0 ? '…' : ''}${text.slice(from, to)}${to < text.length ? '…' : ''}`;
}

/** "column 5", or "line 2, column 5" in a text of several lines (one-based). */
function place(text: string, index: number): string {
  if (!/[\r\n]/.test(text)) return `column ${index + 1}`;
  const lines = text.slice(0, index).split(/\r\n|\r|\n/);
  return `line ${lines.length}, column ${lines.at(-1)!.length + 1}`;
}

/** An InputError about the character at `index`. */
export function errorAt(text: string, index: number, what: string, where: Where, culprit: Culprit = {}): InputError {
  return new InputError(`${what} (${place(text, index)})`, { ...where, value: excerpt(text, index), ...culprit });
}

/** Whether a text can be a name (`pi` and the words of the grammar cannot). */
export function isName(text: string): boolean {
  NAME.lastIndex = 0;
  return NAME.test(text) && NAME.lastIndex === text.length && !text.includes('\u03C0') && text !== 'pi' && !WORDS.has(text);
}

interface Level {
  readonly index: number;
  /** A `/` stands to the left in this product. */
  divided: boolean;
  /** The operand at hand is an exponent. */
  exponent: boolean;
  /** Signs and powers that the parser has open. */
  chain: number;
}
type Last = 'none' | 'operator' | 'number' | 'name' | 'call' | 'close';

/**
 * The text as the grammar may read it: every blank a space. Throws InputError otherwise.
 * Brackets nest up to NESTING_LIMIT, and so do signs and powers in a row (`2^2^2`, `- - x`).
 */
export function scan(text: string, where: Where = {}): string {
  if (text.length > LENGTH_LIMIT)
    throw new InputError('the expression is too long', {
      ...where,
      value: `${text.length} characters`,
      expected: `at most ${LENGTH_LIMIT} characters`,
      next: 'shorten it by define, or give the quadratic form as a matrix',
    });
  const fail = (index: number, what: string, expected: string, next: string) => errorAt(text, index, what, where, { expected, next });
  const levels: Level[] = [{ index: -1, divided: false, exponent: false, chain: 0 }];
  let chains = 0;
  let last: Last = 'none';
  let lastText = '';
  const deep = (index: number) =>
    fail(index, 'the expression is nested too deeply', `at most ${NESTING_LIMIT} levels`, 'name inner parts by define');
  for (let i = 0; i < text.length; ) {
    const c = text[i]!;
    if (/\s/.test(c)) {
      i++;
      continue;
    }
    const level = levels.at(-1)!;
    const operand = last === 'number' || last === 'name' || last === 'close';
    NUMBER.lastIndex = i;
    NAME.lastIndex = i;
    if (NUMBER.test(text)) {
      const token = text.slice(i, NUMBER.lastIndex);
      const rest = text.slice(i, NUMBER.lastIndex + 1);
      if (/^0[box]$/i.test(rest) || (CLOSED.test(rest) && rest.endsWith('_')))
        throw fail(i, 'this is not a decimal number', 'a number such as 12, 0.5 or 1e-3', 'write it in decimal digits without separators');
      if (operand) throw fail(i, 'two operands without an operator between them', 'an operator', `write ${lastText}*${token}`);
      last = 'number';
      lastText = token;
      i += token.length;
    } else if (NAME.test(text)) {
      const token = text.slice(i, NAME.lastIndex);
      if (token.includes('\u03C0')) throw fail(i + token.indexOf('\u03C0'), "'\u03C0' is not in the language", 'pi', 'write pi');
      if (WORDS.has(token)) throw fail(i, `'${token}' cannot be used as a name`, 'a number, a name or a function', 'choose another name');
      let after = NAME.lastIndex;
      while (after < text.length && /\s/.test(text[after]!)) after++;
      const called = text[after] === '(';
      if (called && !FUNCTIONS.has(token)) {
        const spelling = SPELLINGS.get(token);
        const guess = nearest(token, FUNCTION_NAMES);
        throw fail(
          i,
          spelling === undefined && guess === undefined ? `'${token}' is followed by a bracket` : `unknown function '${token}'`,
          `one of ${FUNCTION_NAMES.join(', ')} before a bracket`,
          spelling ??
            (guess === undefined ? `write ${token}*(…) for a product` : `did you mean ${guess}(…)? write ${token}*(…) for a product`),
        );
      }
      if (last === 'name' && FUNCTIONS.has(lastText))
        throw fail(i, `'${lastText}' needs brackets`, `${lastText}(…)`, `write ${lastText}(${token})`);
      if (operand) {
        const spelled = last === 'close' ? `(…)*${token}` : `${lastText}*${token}`;
        if (last !== 'number') throw fail(i, 'two operands without an operator between them', 'an operator', `write ${spelled}`);
        if (level.divided)
          throw fail(
            i,
            'a product without * after a division can be read in two ways',
            'brackets or *',
            `write /(${spelled}) or put * where you mean it`,
          );
        if (level.exponent)
          throw fail(
            i,
            'a product without * in an exponent can be read in two ways',
            'brackets or *',
            `write ^${spelled} or ^(${spelled})`,
          );
      }
      last = called ? 'call' : 'name';
      lastText = token;
      i += token.length;
    } else if (c === '(') {
      if (operand) {
        const left = last === 'close' ? '(…)' : lastText;
        throw fail(i, 'two operands without an operator between them', 'an operator', `write ${left}*(…)`);
      }
      levels.push({ index: i, divided: false, exponent: false, chain: 0 });
      if (levels.length - 1 > NESTING_LIMIT) throw deep(i);
      last = 'none';
      i++;
    } else if (c === ')') {
      if (levels.length === 1) throw fail(i, 'this bracket closes nothing', 'as many ( as )', 'remove it or open it earlier');
      if (!operand) throw fail(i, 'a value is missing here', 'a number, a name, a function or a bracket', 'complete the expression');
      levels.pop();
      chains -= level.chain;
      last = 'close';
      i++;
    } else if (c === '+' || c === '-' || c === '*' || c === '/' || c === '^') {
      if (operand) {
        if (c === '*' && text[i + 1] === '*') throw fail(i, "'**' is not in the language", '^', 'write ^ for powers');
        if (c !== '^') {
          chains -= level.chain;
          level.chain = 0;
          level.exponent = false;
        } else {
          level.exponent = true;
          level.chain++;
          chains++;
        }
        if (c === '/') level.divided = true;
        else if (c === '+' || c === '-') level.divided = false;
      } else {
        if (c !== '+' && c !== '-')
          throw fail(i, `'${c}' has nothing to its left`, 'a value before the operator', 'complete the expression');
        level.chain++;
        chains++;
      }
      if (chains > NESTING_LIMIT) throw deep(i);
      last = 'operator';
      i++;
    } else {
      const shown = String.fromCodePoint(text.codePointAt(i)!);
      throw fail(
        i,
        `'${shown}' is not in the language`,
        'numbers, names, + - * / ^, round brackets and functions',
        INSTEAD.get(shown) ?? 'remove it',
      );
    }
  }
  if (last === 'none' && levels.length === 1)
    throw new InputError('the expression is empty', {
      ...where,
      value: text.slice(0, 60),
      expected: 'an expression',
      next: 'write 0 if zero is meant',
    });
  if (levels.length > 1) throw fail(levels.at(-1)!.index, 'this bracket is not closed', 'as many ) as (', 'close it');
  if (last === 'operator') throw fail(text.length - 1, 'the expression ends too early', 'a value after the last operator', 'complete it');
  return text.replace(/\s/g, ' ');
}
