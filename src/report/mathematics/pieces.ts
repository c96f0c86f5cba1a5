/**
 * Formulas in pieces, none wider than asked for by a cautious estimate. A line may be broken between any two
 * of them: that keeps long sums inside the margin in print, and lets them wrap in a browser, which breaks no
 * formula by itself.
 */
import { latexText } from './names.ts';
import type { Tree } from './tree.ts';
import { operator, relationSign, SMALL, typeset } from './typeset.ts';

export interface Piece {
  readonly latex: string;
  readonly ems: number;
  /** A space stands before it where the line is not broken. */
  readonly gap: boolean;
  /** The words themselves, where the piece is nothing but words. */
  readonly words?: string;
}

/** The pieces of a formula; one where it fits as a whole. */
export function piecesOf(tree: Tree, limit: number): readonly Piece[] {
  const whole = typeset(tree);
  if (whole.ems <= limit)
    return [{ latex: whole.latex, ems: whole.ems, gap: false, ...(tree.kind === 'words' ? { words: tree.text } : {}) }];
  switch (tree.kind) {
    case 'sum':
      return tree.terms.flatMap((term, i) => {
        const sign = i === 0 ? (term.negative ? '-' : '') : term.negative ? '{}-' : '{}+';
        const inner = needsBrackets(term.tree);
        return spaced(wrap(`${sign}${inner ? '(' : ''}`, piecesOf(term.tree, limit - 2), inner ? ')' : ''), i > 0);
      });
    case 'product':
      return factorPieces(tree.factors, limit);
    case 'quotient':
      return quotientPieces(tree.numerator, tree.denominator, limit);
    case 'power':
      return powerPieces(tree.base, tree.exponent, limit);
    case 'call': {
      const root = tree.name === 'sqrt';
      const head = root ? '' : operator(tree.name).latex;
      return wrap(`${head}(`, listPieces(tree.parts, limit - 4), root ? ')^{1/2}' : ')');
    }
    case 'relation':
      return [
        ...piecesOf(tree.left, limit),
        ...spaced(wrap(`{}${relationSign(tree.relation)} `, piecesOf(tree.right, limit - 2), ''), true),
      ];
    case 'list':
      return wrap(tree.open, listPieces(tree.items, limit - 2, tree.separator), tree.close);
    case 'words':
      return wordPieces(tree.text, limit);
    case 'number':
      return cut(tree.digits, limit).map((digits) => ({ latex: digits, ems: digits.length * 0.5, gap: false }));
    case 'name':
      return cut(tree.name, limit).map((part) => ({ latex: `\\mathit{\\text{${latexText(part)}}}`, ems: part.length * 0.6, gap: false }));
    case 'sign':
      return [{ latex: whole.latex, ems: whole.ems, gap: false }];
  }
}

const needsBrackets = (tree: Tree): boolean => tree.kind === 'sum' || tree.kind === 'relation';

function wrap(before: string, pieces: readonly Piece[], after: string): readonly Piece[] {
  const last = pieces.length - 1;
  return pieces.map((piece, i) => {
    const head = i === 0 ? before : '';
    const tail = i === last ? after : '';
    if (head === '' && tail === '') return piece;
    if (head === '' && tail === '') return piece;
    return { latex: `${head}${piece.latex}${tail}`, ems: piece.ems + (head === '' ? 0 : 1) + (tail === '' ? 0 : 0.5), gap: piece.gap };
  });
}

const spaced = (pieces: readonly Piece[], gap: boolean): readonly Piece[] =>
  pieces.map((piece, i) => (i === 0 ? { ...piece, gap } : piece));

function listPieces(parts: readonly Tree[], limit: number, separator = ','): readonly Piece[] {
  const behind = separator === ',';
  return parts.flatMap((part, i) =>
    spaced(wrap(i === 0 || behind ? '' : `{}${separator}`, piecesOf(part, limit), behind && i < parts.length - 1 ? ',' : ''), i > 0),
  );
}

/** Words one by one; a word that is too long is cut. */
function wordPieces(text: string, limit: number): readonly Piece[] {
  return text
    .split(/\s+/)
    .filter((word) => word !== '')
    .flatMap((word) =>
      cut(word, Math.min(limit, 8)).map(
        (part, i): Piece => ({ latex: `\\text{${latexText(part)}}`, ems: part.length * 0.75, gap: i === 0, words: part }),
      ),
    );
}

/** Factors side by side, as many in a piece as fit. */
function factorPieces(factors: readonly Tree[], limit: number): readonly Piece[] {
  const out: Piece[] = [];
  let run: Tree[] = [];
  const flush = () => {
    if (run.length > 0) out.push(...piecesOf(run.length === 1 ? run[0]! : { kind: 'product', factors: run }, limit));
    run = [];
  };
  factors.forEach((factor, i) => {
    const grown: Tree = { kind: 'product', factors: [...run, factor] };
    if (typeset(grown).ems <= limit) {
      run.push(factor);
      return;
    }
    flush();
    if (typeset(factor).ems <= limit - 2 && !needsBrackets(factor) && !(i > 0 && factor.kind === 'number')) run.push(factor);
    else {
      const inner = needsBrackets(factor);
      out.push(
        ...wrap(`${i > 0 && factor.kind === 'number' ? '\\cdot ' : ''}${inner ? '(' : ''}`, piecesOf(factor, limit - 2), inner ? ')' : ''),
      );
    }
  });
  flush();
  return out;
}

/** A sum over a short denominator becomes a fraction times the sum; what remains is written with a slash. */
function quotientPieces(numerator: Tree, denominator: Tree, limit: number): readonly Piece[] {
  const factors = numerator.kind === 'product' ? numerator.factors : [numerator];
  const sums = factors.filter((f) => f.kind === 'sum');
  const rest = factors.filter((f) => f.kind !== 'sum');
  const above: Tree =
    rest.length === 0 ? { kind: 'number', digits: '1' } : rest.length === 1 ? rest[0]! : { kind: 'product', factors: rest };
  if (sums.length > 0 && typeset(denominator).ems < limit / 2 && typeset(above).ems < limit / 2)
    return factorPieces([{ kind: 'quotient', numerator: above, denominator }, ...sums], limit);
  const simple = denominator.kind === 'number' || denominator.kind === 'name' || denominator.kind === 'call';
  return [...factorPieces(factors, limit), ...wrap(simple ? '/' : '/(', piecesOf(denominator, limit - 2), simple ? '' : ')')];
}

function powerPieces(base: Tree, exponent: Tree, limit: number): readonly Piece[] {
  const power = typeset(exponent, true);
  const simple = base.kind === 'number' || base.kind === 'name';
  if (power.ems * SMALL < limit / 2)
    return wrap(simple ? '' : '(', piecesOf(base, limit - 2 - power.ems * SMALL), `${simple ? '' : ')'}^{${power.latex}}`);
  return [...wrap('(', piecesOf(base, limit - 3), ')\\uparrow'), ...wrap('(', piecesOf(exponent, limit - 2), ')')];
}

/** Digits or letters in parts that fit. */
function cut(text: string, limit: number): readonly string[] {
  const signs = [...text];
  const length = Math.max(1, Math.min(30, Math.floor(limit / 0.7)));
  return Array.from({ length: Math.ceil(signs.length / length) }, (_, i) => signs.slice(i * length, (i + 1) * length).join(''));
}
