/**
 * From text to expression: scan, parse by the grammar of mathjs, then a walk that admits a node only if it is
 * on the list of what the language has. The walk is iterative: a sum of n terms is a tree of depth n there.
 */
import { InputError } from '../../errors/index.ts';
import { rational } from '../../field/index.ts';
import { type Expression, FUNCTION_NAMES, type FunctionName } from './ast.ts';
import { type GrammarNode, Literal, parseTree } from './grammar.ts';
import { errorAt, scan, type Where } from './scan.ts';

/** The largest power of ten in a literal. */
export const EXPONENT_LIMIT = 400;
/** The most digits of a literal; beyond, reducing the fraction takes a noticeable time. */
export const DIGIT_LIMIT = 4000;

/**
 * Reads one expression. `where` is repeated in errors.
 * Throws InputError for whatever is not in the language, with the column where it is known.
 */
export function parseExpression(text: string, where: Where = {}): Expression {
  const scanned = scan(text, where);
  let tree: GrammarNode;
  try {
    tree = parseTree(scanned);
  } catch (error) {
    if (error instanceof RangeError)
      throw new InputError('the expression is nested too deeply', {
        ...where,
        expected: 'fewer nested brackets',
        next: 'name inner parts by define',
      });
    if (!(error instanceof SyntaxError)) throw error;
    const column = (error as SyntaxError & { char?: number }).char;
    const index = Math.min(Math.max(0, (column ?? 1) - 1), text.length - 1);
    throw errorAt(text, index, 'the expression cannot be read', where, {
      expected: 'an expression such as (p1^2 + q1^2)/2',
      next: 'check the operators here',
    });
  }
  return convert(tree, text, where);
}

/** Exact value of a decimal literal. Throws InputError if its exponent is out of bounds. */
export function parseLiteral(literal: string, text = literal, where: Where = {}): Expression {
  const parts = /^(\d*)\.?(\d*)(?:[eE]([+-]?\d+))?$/.exec(literal);
  if (parts === null || (parts[1] === '' && parts[2] === ''))
    throw errorAt(text, Math.max(0, text.indexOf(literal)), `'${literal}' is not a decimal number`, where, {
      expected: 'a number such as 12, 0.5 or 1e-3',
    });
  if (literal.length > DIGIT_LIMIT)
    throw errorAt(text, Math.max(0, text.indexOf(literal)), 'a number has too many digits', where, {
      expected: `at most ${DIGIT_LIMIT} digits`,
      next: 'write it as a quotient or round it',
    });
  const digits = BigInt(parts[1]! + parts[2]!);
  const exponent = Number(parts[3] ?? '0');
  if (Math.abs(exponent) > EXPONENT_LIMIT)
    throw errorAt(text, Math.max(0, text.indexOf(literal)), `the exponent of '${literal.slice(0, 40)}' is out of bounds`, where, {
      expected: `an exponent from -${EXPONENT_LIMIT} to ${EXPONENT_LIMIT}`,
      next: 'choose other units',
    });
  const shift = exponent - parts[2]!.length;
  const r = shift >= 0 ? rational(digits * 10n ** BigInt(shift)) : rational(digits, 10n ** BigInt(-shift));
  return { kind: 'number', n: r.n, d: r.d };
}

const OPERATORS: ReadonlySet<unknown> = new Set(['add', 'subtract', 'multiply', 'divide', 'pow', 'unaryMinus', 'unaryPlus']);
const FUNCTIONS: ReadonlySet<unknown> = new Set(FUNCTION_NAMES);
const isSum = (n: GrammarNode) => n.type === 'OperatorNode' && (n.fn === 'add' || n.fn === 'subtract');
const isProduct = (n: GrammarNode) => n.type === 'OperatorNode' && (n.fn === 'multiply' || n.fn === 'divide');

/** The operands of a chain of + and - (or * and /), from left to right; `inverse` marks those after - (or /). */
function chainOf(root: GrammarNode, belongs: (n: GrammarNode) => boolean): Array<{ node: GrammarNode; inverse: boolean }> {
  const out: Array<{ node: GrammarNode; inverse: boolean }> = [];
  let node = root;
  while (belongs(node)) {
    out.push({ node: node.args![1]!, inverse: node.fn === 'subtract' || node.fn === 'divide' });
    node = node.args![0]!;
  }
  out.push({ node, inverse: false });
  return out.reverse();
}

const negative = (e: Expression): Expression =>
  e.kind === 'number' ? { kind: 'number', n: -e.n, d: e.d } : { kind: 'negate', argument: e };

/** a/b*c/d as the product of a/b and c/d, a/b/c as a/(b*c): the value is the same and the depth bounded. */
function product(parts: readonly Expression[], inverse: readonly boolean[]): Expression {
  const factors: Expression[] = [];
  for (let i = 0; i < parts.length; ) {
    const numerator = parts[i++]!;
    const below: Expression[] = [];
    while (i < parts.length && inverse[i]) below.push(parts[i++]!);
    if (below.length === 0) factors.push(numerator);
    else factors.push({ kind: 'quotient', numerator, denominator: below.length === 1 ? below[0]! : { kind: 'product', factors: below } });
  }
  return factors.length === 1 ? factors[0]! : { kind: 'product', factors };
}

function convert(root: GrammarNode, text: string, where: Where): Expression {
  const refuse = (what: string) =>
    new InputError(`${what} is not in the language of expressions`, {
      ...where,
      value: text.slice(0, 60),
      expected: 'numbers, names, + - * / ^, round brackets and functions',
      next: 'write it with these',
    });
  const results: Expression[] = [];
  // an entry either opens a node or, when its operands are on `results`, closes it
  const stack: Array<{ node: GrammarNode; close?: { count: number; build: (parts: Expression[]) => Expression } }> = [{ node: root }];
  while (stack.length > 0) {
    const { node, close } = stack.pop()!;
    if (close !== undefined) {
      results.push(close.build(results.splice(results.length - close.count, close.count)));
      continue;
    }
    const open = (operands: readonly GrammarNode[], build: (parts: Expression[]) => Expression) => {
      stack.push({ node, close: { count: operands.length, build } });
      for (let i = operands.length - 1; i >= 0; i--) stack.push({ node: operands[i]! });
    };
    switch (node.type) {
      case 'ConstantNode':
        if (!(node.value instanceof Literal)) throw refuse(`'${String(node.value)}'`);
        results.push(parseLiteral(node.value.text, text, where));
        break;
      case 'SymbolNode':
        results.push(node.name === 'pi' ? { kind: 'pi' } : { kind: 'symbol', name: node.name! });
        break;
      case 'ParenthesisNode':
        stack.push({ node: node.content! });
        break;
      case 'FunctionNode': {
        const called = node.fn as GrammarNode;
        const name = called.type === 'SymbolNode' ? called.name : undefined;
        if (!FUNCTIONS.has(name) || node.args!.length !== 1) throw refuse(`this call of ${name ?? 'an expression'}`);
        open(node.args!, (parts) => ({ kind: 'call', name: name as FunctionName, argument: parts[0]! }));
        break;
      }
      case 'OperatorNode':
        if (!OPERATORS.has(node.fn)) throw refuse(`the operator ${String(node.fn)}`);
        if (isSum(node)) {
          const chain = chainOf(node, isSum);
          open(
            chain.map((x) => x.node),
            (parts) => ({ kind: 'sum', terms: parts.map((p, i) => (chain[i]!.inverse ? negative(p) : p)) }),
          );
        } else if (isProduct(node)) {
          const chain = chainOf(node, isProduct);
          const inverse = chain.map((x) => x.inverse);
          open(
            chain.map((x) => x.node),
            (parts) => product(parts, inverse),
          );
        } else if (node.fn === 'pow') open(node.args!, (parts) => ({ kind: 'power', base: parts[0]!, exponent: parts[1]! }));
        else if (node.fn === 'unaryMinus') open(node.args!, (parts) => negative(parts[0]!));
        else stack.push({ node: node.args![0]! });
        break;
      default:
        throw refuse(node.type);
    }
  }
  return results[0]!;
}
