/** Names, labels and algebras in LaTeX, and plain text made safe for LaTeX. */
import { latexName as asciiName } from '../../model/expression/writing.ts';

const SPECIAL: ReadonlyMap<string, string> = new Map(
  Object.entries({
    '\\': '\\textbackslash{}',
    '{': '\\{',
    '}': '\\}',
    $: '\\$',
    '&': '\\&',
    '#': '\\#',
    '%': '\\%',
    _: '\\_',
    '^': '\\textasciicircum{}',
    '~': '\\textasciitilde{}',
    '<': '\\textless{}',
    '>': '\\textgreater{}',
    '|': '\\textbar{}',
    '"': "''",
    '`': '\\textasciigrave{}',
    '–': '--',
    '—': '---',
    '−': '$-$',
    '·': '$\\cdot$',
    '×': '$\\times$',
    '±': '$\\pm$',
    '∓': '$\\mp$',
    '°': '$^{\\circ}$',
    '≤': '$\\le$',
    '≥': '$\\ge$',
    '≠': '$\\ne$',
    '≈': '$\\approx$',
    '≅': '$\\cong$',
    '≇': '$\\ncong$',
    '∞': '$\\infty$',
    '∇': '$\\nabla$',
    '∂': '$\\partial$',
    '√': '$\\surd$',
    '∈': '$\\in$',
    '⊕': '$\\oplus$',
    '⊗': '$\\otimes$',
    '→': '$\\to$',
    '↦': '$\\mapsto$',
    '∘': '$\\circ$',
    '²': '$^{2}$',
    '³': '$^{3}$',
    '¹': '$^{1}$',
    '½': '$\\tfrac{1}{2}$',
    '†': '\\dag{}',
    '§': '\\S{}',
    '…': '\\dots{}',
    '’': "'",
    '‘': '`',
    '“': '``',
    '”': "''",
    '„': '``',
    '«': '``',
    '»': "''",
    '\u00a0': '~',
    '\u2009': '\\,',
    ß: '\\ss{}',
    æ: '\\ae{}',
    Æ: '\\AE{}',
    œ: '\\oe{}',
    Œ: '\\OE{}',
    ø: '\\o{}',
    Ø: '\\O{}',
    ł: '\\l{}',
    Ł: '\\L{}',
    ı: '\\i{}',
    å: '\\aa{}',
    Å: '\\AA{}',
  }),
);
/** Combining marks as accents; under- and cedilla-like marks included. */
const ACCENTS: ReadonlyMap<string, string> = new Map([
  ['\u0300', '`'],
  ['\u0301', "'"],
  ['\u0302', '^'],
  ['\u0303', '~'],
  ['\u0304', '='],
  ['\u0306', 'u'],
  ['\u0307', '.'],
  ['\u0308', '"'],
  ['\u030a', 'r'],
  ['\u030b', 'H'],
  ['\u030c', 'v'],
  ['\u0327', 'c'],
  ['\u0323', 'd'],
  ['\u0331', 'b'],
]);
const GREEK_LETTERS = 'α β γ δ ε ζ η θ ι κ λ μ ν ξ ρ ς σ τ υ φ χ ψ ω Γ Δ Θ Λ Ξ Π Σ Υ Φ Ψ Ω π ϑ ϕ ϱ ϵ ℏ'.split(' ');

/** Words longer than this may be broken anywhere. */
const UNBROKEN = 24;

function latexCharacter(sign: string): string {
  const known = SPECIAL.get(sign);
  if (known !== undefined) return known;
  if (/^[\x20-\x7e]$/.test(sign)) return sign;
  if (GREEK_LETTERS.includes(sign)) return `$${sign === 'π' ? '\\pi' : asciiName(sign)}$`;
  if (/^\s$/.test(sign)) return ' ';
  const [base, mark] = [...sign.normalize('NFD')];
  const accent = mark === undefined ? undefined : ACCENTS.get(mark);
  if (accent !== undefined && /^[A-Za-z]$/.test(base!)) return `\\${accent}{${base === 'i' ? '\\i' : base}}`;
  // no letter of the standard fonts: said by its code point rather than lost
  return `\\texttt{[U+${sign.codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0')}]}`;
}

/** Any text as LaTeX that prints it: no command, no comment, no mathematics of its own; long words may be broken. */
export function latexText(text: string): string {
  return text
    .normalize('NFC')
    .split(/(\s+)/)
    .map((word) => {
      if (/^\s*$/.test(word)) return word === '' ? '' : ' ';
      const signs = [...word].map(latexCharacter);
      const long = signs.length > UNBROKEN;
      let out = '';
      signs.forEach((sign, i) => {
        if (long && i > 0 && i % 8 === 0) out += '\\allowbreak{}';
        // a ligature such as ?` or -- must not arise from two signs as typed
        if (i > 0 && /^[-`'?!,<>]/.test(sign) && /[-`'?!,<>]$/.test(signs[i - 1]!)) out += '{}';
        out += sign;
      });
      return out;
    })
    .join('');
}

/** A name of the model as LaTeX mathematics. */
export function latexSymbol(name: string): string {
  if (name === 'pi') return '\\pi';
  return asciiName(name).replace(/[^\x20-\x7e]+/gu, (signs) => `\\text{${latexText(signs)}}`);
}

/** A label of an irreducible: A1g becomes A_{1g}, E'' stays; null for what is not of that form. */
export function labelLatex(label: string): string | null {
  const match = /^([A-Z])([a-z]?)(\d*)([gu]?)((?:'|′|″)*)((?:[+-])?)$/.exec(label);
  if (match !== null) {
    const [, letter, small, digits, parity, primes, sign] = match;
    const index = `${small}${digits}${parity}`;
    return `${letter}${index === '' ? '' : `_{${index}}`}${primes!.replaceAll('′', "'").replaceAll('″', "''")}${sign === '' ? '' : `^{${sign}}`}`;
  }
  return null;
}

/** The same, with other labels set upright. */
export const latexLabel = (label: string): string => labelLatex(label) ?? `\\text{${latexText(label)}}`;

/** A classical Lie algebra such as sp(4,R), u(1,1), so*(4) in Fraktur; direct sums by + or ⊕. */
export function latexAlgebra(text: string): string {
  const parts = text.split(/\s*(?:\+|⊕)\s*/);
  const set = parts.map((part) => {
    const match = /^([a-z]{1,2})(\*?)\(([^()]*)\)(?:\^(\d+))?$/.exec(part);
    if (match === null) return `\\text{${latexText(part)}}`;
    const inside = match[3]!
      .split(/\s*,\s*/)
      .map((s) => (/^[RCH]$/.test(s) ? `\\mathbb{${s}}` : latexSafe(s)))
      .join(',');
    return `\\mathfrak{${match[1]}}${match[2] === '*' ? '^{*}' : ''}(${inside})${match[4] === undefined ? '' : `^{${match[4]}}`}`;
  });
  return set.join('\\oplus ');
}

const latexSafe = (text: string): string => (/^[\w ]*$/.test(text) && !text.includes('_') ? text : `\\text{${latexText(text)}}`);

/** LaTeX as the typesetters of browsers know it: signs that print needs to spell out are written themselves. */
export function browserLatex(latex: string): string {
  return latex
    .replaceAll('\\allowbreak{}', '')
    .replaceAll('\\textasciigrave{}', '\u2035')
    .replace(/\\texttt\{\[U\+([0-9A-F]{4,6})\]\}/g, (_, code: string) => String.fromCodePoint(Number.parseInt(code, 16)));
}

const GREEK_NAMES: ReadonlyMap<string, string> = new Map(
  GREEK_LETTERS.map((sign) => [(sign === 'π' ? '\\pi' : asciiName(sign)).slice(1), sign]),
);

/** A name of the model for a picture without LaTeX: omega_0 becomes ω₀. */
export function symbolText(name: string): string {
  const [, stem, digits] = /^(.*?)_?(\d*)$/u.exec(name)!;
  const head = GREEK_NAMES.get(stem!) ?? stem!;
  return head + [...digits!].map((d) => String.fromCodePoint(0x2080 + Number(d))).join('');
}
