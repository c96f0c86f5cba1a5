/**
 * Trees of formulas as they are set, not as they are computed with: decimals keep their point, products
 * their order. A text in the language of model files is read into such a tree; nothing is evaluated.
 */

/** A formula to be set. `sign` nodes carry ready-made LaTeX, for notions that the language of model files lacks. */
export type Tree =
  | { readonly kind: 'number'; readonly digits: string }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'sum'; readonly terms: readonly Term[] }
  | { readonly kind: 'product'; readonly factors: readonly Tree[] }
  /** A wide sum above the line is taken out as a factor, unless the fraction is to stay whole. */
  | { readonly kind: 'quotient'; readonly numerator: Tree; readonly denominator: Tree; readonly whole?: true }
  | { readonly kind: 'power'; readonly base: Tree; readonly exponent: Tree }
  | { readonly kind: 'call'; readonly name: string; readonly parts: readonly Tree[] }
  | { readonly kind: 'relation'; readonly left: Tree; readonly relation: string; readonly right: Tree }
  /** Items side by side; brackets and separator are LaTeX. */
  | { readonly kind: 'list'; readonly items: readonly Tree[]; readonly open: string; readonly close: string; readonly separator: string }
  /** Upright words inside a formula. */
  | { readonly kind: 'words'; readonly text: string }
  | { readonly kind: 'sign'; readonly latex: string; readonly ems: number };

export interface Term {
  readonly negative: boolean;
  readonly tree: Tree;
}

/** Deeper nesting than this is left as typed; a text of model files is bounded by the same number. */
const NESTING_LIMIT = 200;
const TOKEN = /\s+|\d+\.?\d*(?:[eE][+-]?\d+)?|\.\d+(?:[eE][+-]?\d+)?|[\p{L}_][\p{L}\p{M}\p{N}_]*|[-+*/^(),·−]/uy;

/** The tree of a text in the language of model files, or null where it is not in that language. */
export function readTree(text: string): Tree | null {
  const tokens = tokensOf(text);
  if (tokens === null || tokens.length === 0) return null;
  const reader = new Reader(tokens);
  const tree = reader.sum(0);
  return tree !== null && reader.ended ? tree : null;
}

function tokensOf(text: string): string[] | null {
  const tokens: string[] = [];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < text.length) {
    const match = TOKEN.exec(text);
    if (match === null) return null;
    const token = match[0];
    if (token.trim() === '') continue;
    tokens.push(token === '−' ? '-' : token === '·' ? '*' : token);
  }
  return tokens;
}

/** Recursive descent; sums and products are loops, so only brackets and powers go deeper. */
class Reader {
  private readonly tokens: readonly string[];
  private place = 0;

  constructor(tokens: readonly string[]) {
    this.tokens = tokens;
  }

  get ended(): boolean {
    return this.place === this.tokens.length;
  }

  private take(...wanted: readonly string[]): string | null {
    const token = this.tokens[this.place];
    if (token === undefined || !wanted.includes(token)) return null;
    this.place++;
    return token;
  }

  sum(depth: number): Tree | null {
    if (depth > NESTING_LIMIT) return null;
    const terms: Term[] = [];
    let sign: string | null = this.take('+', '-');
    do {
      let negative = sign === '-';
      while ((sign = this.take('+', '-')) !== null) negative = negative !== (sign === '-');
      const tree = this.product(depth);
      if (tree === null) return null;
      terms.push({ negative, tree });
      sign = this.take('+', '-');
    } while (sign !== null);
    return terms.length === 1 && !terms[0]!.negative ? terms[0]!.tree : { kind: 'sum', terms };
  }

  private product(depth: number): Tree | null {
    let factors: Tree[] = [];
    let operator: string | null = '*';
    do {
      const negative = this.take('-') !== null;
      const power = this.power(depth);
      if (power === null) return null;
      const factor: Tree = negative ? { kind: 'sum', terms: [{ negative, tree: power }] } : power;
      if (operator === '*') factors.push(factor);
      else factors = [{ kind: 'quotient', numerator: productOf(factors), denominator: factor }];
      operator = this.take('*', '/');
    } while (operator !== null);
    return productOf(factors);
  }

  private power(depth: number): Tree | null {
    if (depth > NESTING_LIMIT) return null;
    const base = this.atom(depth);
    if (base === null || this.take('^') === null) return base;
    const negative = this.take('-') !== null;
    const exponent = this.power(depth + 1);
    if (exponent === null) return null;
    return { kind: 'power', base, exponent: negative ? { kind: 'sum', terms: [{ negative, tree: exponent }] } : exponent };
  }

  private atom(depth: number): Tree | null {
    const token = this.tokens[this.place];
    if (token === undefined) return null;
    if (token === '(') {
      this.place++;
      const inside = this.sum(depth + 1);
      return inside === null || this.take(')') === null ? null : inside;
    }
    if (/^[\d.]/.test(token)) {
      this.place++;
      return { kind: 'number', digits: token };
    }
    if (!/^[\p{L}_]/u.test(token)) return null;
    this.place++;
    if (this.take('(') === null) return { kind: 'name', name: token };
    const parts: Tree[] = [];
    do {
      const part = this.sum(depth + 1);
      if (part === null) return null;
      parts.push(part);
    } while (this.take(',') !== null);
    return this.take(')') === null ? null : { kind: 'call', name: token, parts };
  }
}

function productOf(factors: readonly Tree[]): Tree {
  if (factors.length === 1) return factors[0]!;
  return { kind: 'product', factors: factors.flatMap((f, i) => (f.kind === 'product' && i === 0 ? f.factors : [f])) };
}
