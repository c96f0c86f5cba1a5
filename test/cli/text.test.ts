/** Lines, JSON, messages. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readableJson } from '../../src/cli/json.ts';
import { DEFECT, messageOf } from '../../src/cli/messages.ts';
import { columns, wrapParagraph, wrapText } from '../../src/cli/wrap.ts';
import { InputError, UndecidedError } from '../../src/errors/index.ts';

const words = fc.array(fc.stringMatching(/^[a-zé↦]{1,12}$/), { minLength: 1, maxLength: 40 });

describe('wrapping', () => {
  it('keeps every word and the width', () => {
    fc.assert(
      fc.property(words, fc.integer({ min: 30, max: 90 }), fc.integer({ min: 0, max: 8 }), (list, width, indent) => {
        const wrapped = wrapParagraph(list.join(' '), width, indent);
        expect(wrapped.split(/\s+/)).toEqual(list);
        for (const line of wrapped.split('\n')) expect(columns(line)).toBeLessThanOrEqual(Math.max(width, indent + 12));
      }),
      { seed: 1 },
    );
  });

  it('leaves short lines and their blanks alone', () => {
    const text = 'a   b\n  c    d\n';
    expect(wrapText(text, 40)).toBe(text);
    expect(wrapText('x'.repeat(200), undefined)).toBe('x'.repeat(200));
  });

  it('hangs under the beginning of the line', () => {
    expect(wrapText(`  ${'word '.repeat(10).trim()}`, 34)).toBe('  word word word word word word\n    word word word word');
  });

  it('counts a combining mark as no column', () => {
    expect(columns('e\u0301')).toBe(1);
    expect(columns('q\u0304')).toBe(1);
  });
});

describe('readable JSON', () => {
  it('says the same as JSON', () => {
    fc.assert(
      fc.property(fc.jsonValue({ noUnicodeString: false } as object), (value) => {
        expect(JSON.parse(readableJson(value))).toEqual(
          JSON.parse(
            JSON.stringify(value)
              .replaceAll(/(?<=[[,:])-0(?=[\],}])/g, '0')
              .replace(/^-0$/, '0'),
          ),
        );
      }),
      { seed: 1 },
    );
  });

  it('keeps what fits on one line', () => {
    expect(readableJson({ a: [1, 2], b: undefined, c: {} })).toBe('{ "a": [1, 2], "c": {} }');
    expect(readableJson({ a: 'x'.repeat(60), b: 'y'.repeat(60) }).split('\n')).toHaveLength(4);
  });

  it('refuses what JSON cannot say', () => {
    expect(() => readableJson({ zero: { value: Number.NaN } })).toThrow('result.zero.value is NaN');
    expect(() => readableJson([1, Number.POSITIVE_INFINITY])).toThrow('result[1] is Infinity');
    expect(() => readableJson({ a: 1n })).toThrow('result.a is a bigint');
  });
});

describe('messages', () => {
  it('say file, key, value, what was expected and what to do', () => {
    const { text, status } = messageOf(
      new InputError('unknown key', { file: 'm.yaml', key: 'hamiltonain', value: 'x', expected: 'hamiltonian', next: 'rename it' }),
      false,
    );
    expect(text).toBe(
      'symcodim: unknown key\n  file:     m.yaml\n  key:      hamiltonain\n  value:    x\n  expected: hamiltonian\n  next:     rename it',
    );
    expect(status).toBe(2);
  });

  it('undecided has a status of its own', () => {
    expect(messageOf(new UndecidedError('too near'), false).status).toBe(3);
  });

  it('never holds a stack, unless a defect is traced', () => {
    const defect = new TypeError('x is not a function');
    expect(messageOf(defect, false)).toMatchObject({ status: DEFECT });
    expect(messageOf(defect, false).text).not.toMatch(/\n\s+at /);
    expect(messageOf(defect, false, true).text).toMatch(/\n\s+at /);
    expect(messageOf(new InputError('no'), false, true).text).not.toMatch(/\n\s+at /);
  });

  it('shows what a terminal would obey, and cuts long values', () => {
    const { text } = messageOf(new InputError('bad\u001b[2J', { value: 'x'.repeat(5000) }), false);
    expect(text).not.toContain('\u001b');
    expect(text.length).toBeLessThan(400);
  });
});
