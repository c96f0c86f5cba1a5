/** A formula with its two faces: the text of a terminal and the LaTeX of a document. */
import type { Value } from '../../study/result.ts';
import { labelLatex, latexAlgebra } from './names.ts';
import { type Piece, piecesOf } from './pieces.ts';
import { readTree, type Tree } from './tree.ts';
import { typeset } from './typeset.ts';

export interface Formula {
  /** In the language of model files, or near it. */
  readonly text: string;
  readonly tree: Tree;
}

/** Significant digits of floating numbers in documents; the JSON result keeps all of them. */
const DIGITS = 12;

/** A formula in the language of model files; a text outside of it is kept as typed. */
export function formula(value: Value): Formula {
  const text = typeof value === 'number' ? numberText(value) : value.trim();
  const tree = readTree(text);
  if (tree === null) return words(text);
  return { text: spacedSum(text), tree };
}

/** Upright words. */
export const words = (text: string): Formula => ({ text, tree: { kind: 'words', text } });

/** A floating number to the digits shown. */
export function numberText(value: number): string {
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'not a number' : value > 0 ? 'infinity' : '-infinity';
  if (Number.isInteger(value) && Math.abs(value) < 1e15) return String(value);
  return String(Number(value.toPrecision(DIGITS)));
}

/** Blanks around the signs of the outermost sum, so that lines can be broken there. */
function spacedSum(text: string): string {
  let depth = 0;
  let out = '';
  for (let i = 0; i < text.length; i++) {
    const sign = text[i]!;
    if (sign === '(') depth++;
    else if (sign === ')') depth--;
    const binary = depth === 0 && (sign === '+' || sign === '-') && /[\p{L}\p{N})_.]\s*$/u.test(out) && !/[\d.][eE]$/.test(out.slice(-2));
    out += binary ? `${out.endsWith(' ') ? '' : ' '}${sign}${text[i + 1] === ' ' ? '' : ' '}` : sign;
  }
  return out;
}

/** Ready-made LaTeX with its plain text; `ems` is its width. */
export function sign(text: string, latex: string, ems = [...text].length * 0.6): Formula {
  return { text, tree: { kind: 'sign', latex, ems } };
}

/** `left relation right`, as in `H = …`; relations: = < > <= >= != ~ in ->. */
export function relation(left: Formula, sort: string, right: Formula): Formula {
  return { text: `${left.text} ${sort} ${right.text}`, tree: { kind: 'relation', left: left.tree, relation: sort, right: right.tree } };
}

/** A list in brackets. */
export function list(items: readonly Formula[], open = '(', close = ')'): Formula {
  const latex = (bracket: string) => (bracket === '{' ? '\\{' : bracket === '}' ? '\\}' : bracket);
  return {
    text: `${open}${items.map((i) => i.text).join(', ')}${close}`,
    tree: { kind: 'list', items: items.map((i) => i.tree), open: latex(open), close: latex(close), separator: ',' },
  };
}

/** The label of an irreducible, or several joined by plus signs. */
export function label(text: string): Formula {
  if (text.includes(' + ')) return labels(text.split(' + '));
  const latex = labelLatex(text);
  return latex === null ? words(text) : sign(text, latex, 0.7 + text.length * 0.45);
}

/** A classical Lie algebra. */
export const algebra = (text: string): Formula => (text.length > 60 ? words(text) : sign(text, latexAlgebra(text), text.length * 0.55));

/** Labels side by side, joined as a direct sum. */
export function labels(texts: readonly string[]): Formula {
  return {
    text: texts.join(' + '),
    tree: { kind: 'list', items: texts.map((t) => label(t).tree), open: '', close: '', separator: '\\oplus ' },
  };
}

/** LaTeX of a formula in one piece, without dollars. */
export const latexOf = (f: Formula): string => typeset(f.tree).latex;
/** Estimated width in em. */
export const emsOf = (f: Formula): number => typeset(f.tree).ems;
/** LaTeX in pieces of at most `limit` em. */
export const latexPieces = (f: Formula, limit: number): readonly Piece[] => piecesOf(f.tree, limit);
