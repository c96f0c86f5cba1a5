/** Trees of formulas as LaTeX in one piece, with a cautious estimate of the width. */
import { latexSymbol, latexText } from './names.ts';
import type { Tree } from './tree.ts';

/** LaTeX of a formula with the width it takes, in em of the text font. */
export interface Set {
  readonly latex: string;
  readonly ems: number;
  readonly level: Level;
  /** Higher than a line of text: brackets around it have to grow. */
  readonly tall: boolean;
}

/** How tightly a formula holds together. */
const RELATION = 0;
const SUM = 1;
const PRODUCT = 2;
const POWER = 3;
const ATOM = 4;
type Level = typeof RELATION | typeof SUM | typeof PRODUCT | typeof POWER | typeof ATOM;

/** Sums and functions up to this width stand on a fraction line; wider ones follow the fraction as a factor. */
const NARROW_SUM = 4;
/** Words of users may be all capitals or code points. */
const WIDE_SIGN = 0.75;
export const SMALL = 0.82;
const OPERATORS: ReadonlySet<string> = new Set(['exp', 'log', 'sin', 'cos', 'tan', 'sinh', 'cosh', 'tanh', 'arg', 'min', 'max']);
const RELATIONS: ReadonlyMap<string, string> = new Map(
  Object.entries({
    '=': '=',
    '<': '<',
    '>': '>',
    '<=': '\\le ',
    '>=': '\\ge ',
    '!=': '\\ne ',
    '~': '\\approx ',
    '->': '\\mapsto ',
    in: '\\in ',
  }),
);

const set = (latex: string, ems: number, level: Level, tall = false): Set => ({ latex, ems, level, tall });

const CACHES = [new WeakMap<Tree, Set>(), new WeakMap<Tree, Set>()] as const;

/**
 * The formula in one piece. `shallow` writes fractions with a slash, as in exponents. Trees are immutable and
 * parts are asked for again and again while lines are broken, so each is set once.
 */
export function typeset(tree: Tree, shallow = false): Set {
  const cache = CACHES[shallow ? 1 : 0];
  let result = cache.get(tree);
  if (result === undefined) {
    result = setTree(tree, shallow);
    cache.set(tree, result);
  }
  return result;
}

function setTree(tree: Tree, shallow: boolean): Set {
  switch (tree.kind) {
    case 'number':
      return number(tree.digits);
    case 'name':
      return set(latexSymbol(tree.name), symbolEms(tree.name), ATOM);
    case 'sign':
      return set(tree.latex, tree.ems, ATOM);
    case 'words':
      return set(`\\text{${latexText(tree.text)}}`, [...tree.text].length * WIDE_SIGN, ATOM);
    case 'sum': {
      let latex = '';
      let ems = 0;
      let tall = false;
      tree.terms.forEach((term, i) => {
        const part = bracketed(typeset(term.tree, shallow), PRODUCT);
        latex += i === 0 ? (term.negative ? '-' : '') : term.negative ? ' - ' : ' + ';
        latex += part.latex;
        ems += part.ems + (i === 0 ? (term.negative ? 0.8 : 0) : 1.25);
        tall ||= part.tall;
      });
      return set(latex, ems, SUM, tall);
    }
    case 'product':
      return product(tree.factors.map((f) => typeset(f, shallow)));
    case 'quotient':
      return quotient(tree.numerator, tree.denominator, shallow, tree.whole === true);
    case 'power': {
      const exponent = typeset(tree.exponent, true);
      if (tree.base.kind === 'call' && OPERATORS.has(tree.base.name)) {
        const part = bracket(typeset(tree.base.parts[0]!, shallow));
        return set(`\\${tree.base.name}^{${exponent.latex}}${part.latex}`, part.ems + 1.7 + exponent.ems * SMALL, POWER, part.tall);
      }
      const base = bracketed(typeset(tree.base, shallow), ATOM);
      return set(`${base.latex}^{${exponent.latex}}`, base.ems + exponent.ems * SMALL + 0.1, POWER, base.tall);
    }
    case 'call': {
      if (tree.name === 'sqrt' && tree.parts.length === 1) {
        const part = typeset(tree.parts[0]!, shallow);
        return set(`\\sqrt{${part.latex}}`, part.ems + 0.9, ATOM, part.tall);
      }
      const parts = tree.parts.map((p) => typeset(p, shallow));
      const inside = set(
        parts.map((p) => p.latex).join(', '),
        sumOf(parts) + parts.length * 0.5,
        SUM,
        parts.some((p) => p.tall),
      );
      const head = operator(tree.name);
      const tail = bracket(inside);
      return set(`${head.latex}${tail.latex}`, head.ems + tail.ems, POWER, tail.tall);
    }
    case 'relation': {
      const left = typeset(tree.left, shallow);
      const right = typeset(tree.right, shallow);
      return set(
        `${left.latex} ${relationSign(tree.relation)} ${right.latex}`,
        left.ems + right.ems + 1.4,
        RELATION,
        left.tall || right.tall,
      );
    }
    case 'list': {
      const items = tree.items.map((p) => typeset(p, shallow));
      const latex = `${tree.open}${items.map((p) => p.latex).join(`${tree.separator} `)}${tree.close}`;
      return set(
        latex,
        sumOf(items) + items.length * (tree.separator === ',' ? 0.5 : 1.3) + 1,
        ATOM,
        items.some((p) => p.tall),
      );
    }
  }
}

/** LaTeX of a relation such as `<=`; an unknown one is printed as text. */
export const relationSign = (relation: string): string => RELATIONS.get(relation) ?? `\\mathrel{\\text{${latexText(relation)}}}`;

const sumOf = (parts: readonly Set[]): number => parts.reduce((total, part) => total + part.ems, 0);

function number(digits: string): Set {
  const [mantissa, exponent] = digits.toLowerCase().split('e') as [string, string | undefined];
  if (exponent === undefined) return set(mantissa, mantissa.length * 0.5, ATOM);
  const power = String(Number(exponent));
  return set(`${mantissa}\\cdot 10^{${power}}`, mantissa.length * 0.5 + 1.8 + power.length * 0.4, PRODUCT);
}

/** Italic letters: m, w, capitals of that kind and wide Greek letters against the rest. */
function lettersEms(word: string): number {
  if (/^(omega|psi|phi|varpi|Omega|Phi|Psi|Theta|Xi|Upsilon|Gamma|Lambda|Sigma|Delta|Pi)$/.test(word)) return 0.85;
  if (latexSymbol(word).startsWith('\\mathit'))
    return [...word].reduce((total, sign) => total + (/[mwMW_]/.test(sign) || sign > '\u007f' ? 1.05 : /[A-Z]/.test(sign) ? 0.85 : 0.6), 0);
  return /^[mwMWQONGDHKUVXAY]$/.test(word) ? 1.1 : 0.68;
}

function symbolEms(name: string): number {
  const match = /^(\p{L}+?)_?(\d+)$/u.exec(name) ?? /^(\p{L}+)_(.+)$/u.exec(name);
  if (match === null) return lettersEms(name);
  const index = /^\d+$/.test(match[2]!) ? match[2]!.length * 0.42 : lettersEms(match[2]!) * SMALL;
  return lettersEms(match[1]!) + index + 0.05;
}

export function operator(name: string): Set {
  if (OPERATORS.has(name)) return set(`\\${name}`, name.length * 0.55, ATOM);
  if (name === 'Re' || name === 'Im') return set(`\\operatorname{${name}}`, 1.2, ATOM);
  return set(latexSymbol(name), symbolEms(name), ATOM);
}

function bracket(part: Set): Set {
  const latex = part.tall ? `\\left(${part.latex}\\right)` : `(${part.latex})`;
  return set(latex, part.ems + (part.tall ? 1.3 : 0.8), ATOM, part.tall);
}

const bracketed = (part: Set, level: Level): Set => (part.level >= level ? part : bracket(part));

function product(factors: readonly Set[]): Set {
  const parts = factors.map((f) => bracketed(f, PRODUCT));
  let latex = '';
  let ems = 0;
  parts.forEach((part, i) => {
    const dot = i > 0 && /^(\d|\\frac|\\tfrac)/.test(part.latex);
    latex += i === 0 ? part.latex : `${dot ? ' \\cdot ' : /^\(|^\\left/.test(part.latex) ? '' : ' '}${part.latex}`;
    ems += part.ems + (dot ? 0.8 : 0.17);
  });
  return set(
    latex,
    ems,
    PRODUCT,
    parts.some((p) => p.tall),
  );
}

/** A fraction; the sums of its numerator follow it as factors where the fraction line would grow long. */
function quotient(numerator: Tree, denominator: Tree, shallow: boolean, whole: boolean): Set {
  const below = typeset(denominator, shallow);
  if (shallow) {
    const above = bracketed(typeset(numerator, true), PRODUCT);
    const under = bracketed(below, POWER);
    return set(`${above.latex}/${under.latex}`, above.ems + under.ems + 0.5, PRODUCT, above.tall || under.tall);
  }
  const factors = numerator.kind === 'product' ? numerator.factors : [numerator];
  const factor = (f: Tree): boolean => (f.kind === 'sum' && f.terms.length > 1) || (f.kind === 'call' && f.name !== 'sqrt');
  const wide = (f: Tree): boolean => !whole && factor(f) && typeset(f).ems > NARROW_SUM;
  const behind = factors.filter(wide);
  const kept = factors.filter((f) => !wide(f));
  const above = kept.length === 0 ? set('1', 0.5, ATOM) : kept.length === 1 ? typeset(kept[0]!) : product(kept.map((f) => typeset(f)));
  const fraction = set(`\\frac{${above.latex}}{${below.latex}}`, Math.max(above.ems, below.ems) + 0.3, PRODUCT, true);
  return behind.length === 0 ? fraction : product([fraction, ...behind.map((f) => typeset(f))]);
}
