/*! The bundled form of this module contains parts of mathjs (Jos de Jong and contributors, Apache License 2.0). */
/**
 * The tokenizer and the precedence rules of mathjs, and nothing else of it: `createParse` and five node
 * factories, with stand-ins for everything that parsing never calls. No evaluator is in the program.
 * A literal keeps its text, so that numbers can be read exactly. The scan in `scan.ts` comes first and
 * leaves only what these five nodes can express.
 *
 * The package as a whole loads some 1 200 files; the build and the test runner bundle this one module
 * (`.build/grammar.mjs`). Load and first parse, five runs on Node 20.20: whole package 620 to 1 000 ms, its single
 * browser file 150 to 250 ms, this module bundled 6 to 9 ms.
 */
import {
  createConstantNode,
  createFunctionNode,
  createNode,
  createOperatorNode,
  createParenthesisNode,
  createParse,
  createSymbolNode,
} from 'mathjs';

/** A number as it was typed. */
export class Literal {
  readonly text: string;
  constructor(text: string) {
    this.text = text;
  }
}

/** A node of the parser; which fields are there depends on `type`. */
export interface GrammarNode {
  readonly type: string;
  /** ConstantNode: a Literal. */
  readonly value?: unknown;
  /** SymbolNode. */
  readonly name?: string;
  /** OperatorNode: the operation as a string; FunctionNode: the called node. */
  readonly fn?: string | GrammarNode;
  readonly args?: readonly GrammarNode[];
  readonly implicit?: boolean;
  /** ParenthesisNode. */
  readonly content?: GrammarNode;
}

type Factory = (scope: Record<string, unknown>) => unknown;

// public exports of the package that its type declarations leave out
declare module 'mathjs' {
  export const createConstantNode: Factory;
  export const createFunctionNode: Factory;
  export const createNode: Factory;
  export const createOperatorNode: Factory;
  export const createParenthesisNode: Factory;
  export const createParse: Factory;
  export const createSymbolNode: Factory;
}

const absent = (name: string) =>
  class {
    constructor() {
      throw new SyntaxError(`${name} is not part of the language`);
    }
  };

function makeParser(): (text: string) => GrammarNode {
  const unused = () => {
    throw new Error('the parser evaluates nothing');
  };
  // the dispatch on argument types comes down to the one signature that is called
  const typed = Object.assign((_name: string, signatures: Record<string, unknown>) => signatures.string, {
    addConversion: () => undefined,
  });
  const scope: Record<string, unknown> = {
    typed,
    config: { number: 'number', numberFallback: 'number' },
    numeric: (text: string) => new Literal(text),
    math: {},
    mathWithTransform: {},
    isBounded: unused,
  };
  for (const name of [
    'Accessor',
    'Array',
    'Assignment',
    'Block',
    'Conditional',
    'FunctionAssignment',
    'Index',
    'Object',
    'Range',
    'Relational',
  ])
    scope[`${name}Node`] = absent(`${name}Node`);
  const make = (name: string, factory: Factory) => {
    scope[name] = factory(scope);
  };
  make('Node', createNode);
  make('ConstantNode', createConstantNode);
  make('SymbolNode', createSymbolNode);
  make('OperatorNode', createOperatorNode);
  make('ParenthesisNode', createParenthesisNode);
  make('FunctionNode', createFunctionNode);
  return createParse(scope) as (text: string) => GrammarNode;
}

let parser: ((text: string) => GrammarNode) | undefined;

/** The parse tree of a scanned text. Throws SyntaxError with a one-based `char`, RangeError if the stack is too small. */
export function parseTree(text: string): GrammarNode {
  parser ??= makeParser();
  return parser(text);
}
