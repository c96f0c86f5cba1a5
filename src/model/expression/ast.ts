/**
 * Expressions: immutable trees, which may share subtrees. Every walk here is iterative and visits a shared
 * subtree once, so neither a sum of thousands of terms nor a tower of definitions can exhaust anything.
 */
import { InputError, LimitError } from '../../errors/index.ts';

/** The functions of the language. */
export const FUNCTION_NAMES = ['sqrt', 'exp', 'log', 'sin', 'cos', 'tan', 'sinh', 'cosh', 'tanh'] as const;
export type FunctionName = (typeof FUNCTION_NAMES)[number];

export type Expression =
  /** n/d in lowest terms, d > 0. */
  | { readonly kind: 'number'; readonly n: bigint; readonly d: bigint }
  | { readonly kind: 'pi' }
  | { readonly kind: 'symbol'; readonly name: string }
  | { readonly kind: 'sum'; readonly terms: readonly Expression[] }
  | { readonly kind: 'product'; readonly factors: readonly Expression[] }
  | { readonly kind: 'negate'; readonly argument: Expression }
  | { readonly kind: 'quotient'; readonly numerator: Expression; readonly denominator: Expression }
  | { readonly kind: 'power'; readonly base: Expression; readonly exponent: Expression }
  | { readonly kind: 'call'; readonly name: FunctionName; readonly argument: Expression };

const NONE: readonly Expression[] = [];

/** The direct subexpressions, in the order of writing. */
export function childrenOf(e: Expression): readonly Expression[] {
  switch (e.kind) {
    case 'number':
    case 'pi':
    case 'symbol':
      return NONE;
    case 'sum':
      return e.terms;
    case 'product':
      return e.factors;
    case 'negate':
    case 'call':
      return [e.argument];
    case 'quotient':
      return [e.numerator, e.denominator];
    case 'power':
      return [e.base, e.exponent];
  }
}

/** The value of `combine` at the root, from the leaves up; each distinct node once. */
export function fold<R>(root: Expression, combine: (e: Expression, parts: readonly R[]) => R): R {
  const done = new Map<Expression, R>();
  const stack: Expression[] = [root];
  while (stack.length > 0) {
    const e = stack.at(-1)!;
    if (done.has(e)) {
      stack.pop();
      continue;
    }
    const children = childrenOf(e);
    const before = stack.length;
    for (let i = children.length - 1; i >= 0; i--) if (!done.has(children[i]!)) stack.push(children[i]!);
    if (stack.length > before) continue;
    done.set(
      e,
      combine(
        e,
        children.map((c) => done.get(c)!),
      ),
    );
    stack.pop();
  }
  return done.get(root)!;
}

/** The names in an expression, in the order of first appearance. */
export function symbolsOf(root: Expression): Set<string> {
  const names = new Set<string>();
  const seen = new Set<Expression>();
  const stack: Expression[] = [root];
  while (stack.length > 0) {
    const e = stack.pop()!;
    if (seen.has(e)) continue;
    seen.add(e);
    if (e.kind === 'symbol') names.add(e.name);
    const children = childrenOf(e);
    for (let i = children.length - 1; i >= 0; i--) stack.push(children[i]!);
  }
  return names;
}

/** The same node over new parts; the old node itself if nothing changed. */
function rebuild(e: Expression, parts: readonly Expression[]): Expression {
  const children = childrenOf(e);
  if (children.every((c, i) => c === parts[i])) return e;
  switch (e.kind) {
    case 'sum':
      return { kind: 'sum', terms: parts };
    case 'product':
      return { kind: 'product', factors: parts };
    case 'negate':
      return { kind: 'negate', argument: parts[0]! };
    case 'call':
      return { kind: 'call', name: e.name, argument: parts[0]! };
    case 'quotient':
      return { kind: 'quotient', numerator: parts[0]!, denominator: parts[1]! };
    case 'power':
      return { kind: 'power', base: parts[0]!, exponent: parts[1]! };
    default:
      return e;
  }
}

/** Replaces names by expressions, all at once (the replacements are not searched again). Subtrees stay shared. */
export function substituteSymbols(root: Expression, values: ReadonlyMap<string, Expression>): Expression {
  if (values.size === 0) return root;
  return fold<Expression>(root, (e, parts) => (e.kind === 'symbol' ? (values.get(e.name) ?? e) : rebuild(e, parts)));
}

/**
 * Definitions with the definitions in them replaced, in any order of writing.
 * Throws InputError with the way round if they form a cycle.
 */
export function resolveDefinitions(definitions: ReadonlyMap<string, Expression>): Map<string, Expression> {
  const resolved = new Map<string, Expression>();
  const open = new Map<string, string[]>(); // name -> the definitions it still waits for
  for (const root of definitions.keys()) {
    const path: string[] = [root];
    while (path.length > 0) {
      const name = path.at(-1)!;
      if (resolved.has(name)) {
        path.pop();
        continue;
      }
      let waiting = open.get(name);
      if (waiting === undefined) {
        waiting = [...symbolsOf(definitions.get(name)!)].filter((s) => definitions.has(s));
        open.set(name, waiting);
      }
      const next = waiting.find((s) => !resolved.has(s));
      if (next === undefined) {
        resolved.set(name, substituteSymbols(definitions.get(name)!, resolved));
        path.pop();
      } else if (path.includes(next)) {
        const cycle = [...path.slice(path.indexOf(next)), next].join(' -> ');
        throw new InputError(`the definitions form a cycle: ${cycle}`, {
          key: `define.${next}`,
          value: cycle,
          expected: 'definitions that do not lead back to themselves',
          next: `write one of them without the others`,
        });
      } else path.push(next);
    }
  }
  return resolved;
}

/** The longest text an expression is written out to; shared subtrees can make it far longer than its memory. */
const TEXT_LIMIT = 1 << 24;

/** Refuses a text that is longer than can be of use. */
export function boundedText(text: string): string {
  if (text.length > TEXT_LIMIT)
    throw new LimitError('the expression is too long to be written out', {
      expected: `at most ${TEXT_LIMIT} characters`,
      next: 'write it with fewer nested definitions',
    });
  return text;
}
