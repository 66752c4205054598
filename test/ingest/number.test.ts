import { describe, expect, it } from 'vitest';
import { NumberReader, READ_EMPTY, READ_INFINITE, READ_NUMBER, READ_WRONG } from '../../pipeline/ingest/number.js';

const encode = (text: string): Uint8Array => new TextEncoder().encode(text);

function read(text: string, mark: '.' | ',' = '.'): { code: number; value: number; decimals: number } {
  const reader = new NumberReader(mark);
  const bytes = encode(text);
  const code = reader.read(bytes, 0, bytes.length);
  return { code, value: reader.value, decimals: reader.decimals };
}

function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

describe('a printed number', () => {
  it('is read with its value and its last place', () => {
    const cases: [string, number, number][] = [
      ['26.650', 26.65, 3],
      ['0.', 0, 0],
      ['.5', 0.5, 1],
      ['-7.198', -7.198, 3],
      ['+12', 12, 0],
      ['1.25e3', 1250, -1],
      ['1.25E-3', 0.00125, 5],
      ['4.184D+01', 41.84, 2],
      ['4.184d1', 41.84, 2],
      ['  298.15\t', 298.15, 2],
      ['1e22', 1e22, -22],
      ['0.1e-30', 1e-31, 31],
    ];
    for (const [text, value, decimals] of cases)
      expect({ text, ...read(text) }).toEqual({ text, code: READ_NUMBER, value, decimals });
  });

  it('may have a Unicode minus, and thin spaces between its digits and around it', () => {
    expect(read('−5.112')).toMatchObject({ code: READ_NUMBER, value: -5.112, decimals: 3 });
    expect(read('1.5e−3')).toMatchObject({ code: READ_NUMBER, value: 0.0015 });
    expect(read('12\u2009345.678\u200991')).toMatchObject({ code: READ_NUMBER, value: 12345.67891, decimals: 5 });
    expect(read('\u00a012\u202f345 ')).toMatchObject({ code: READ_NUMBER, value: 12345, decimals: 0 });
    expect(read('\u2009')).toMatchObject({ code: READ_EMPTY });
  });

  it('takes a comma only where the comma was declared', () => {
    expect(read('26,65', ',')).toMatchObject({ code: READ_NUMBER, value: 26.65, decimals: 2 });
    expect(read('26,65')).toMatchObject({ code: READ_WRONG });
    expect(read('26.65', ',')).toMatchObject({ code: READ_WRONG });
  });

  it('is nothing that merely looks like one', () => {
    for (const text of [
      '0x10',
      'nan',
      'NaN',
      'inf',
      'Infinity',
      '1_000',
      '1 000',
      '1e',
      'e5',
      '.',
      '-',
      '--1',
      '1.2.3',
      '12K',
      '1,5',
      '∞',
      '½',
    ])
      expect({ text, code: read(text).code }).toEqual({ text, code: READ_WRONG });
    for (const text of ['', '   ', '\t']) expect(read(text).code).toBe(READ_EMPTY);
  });

  it('is not finite beyond the largest double, and zero below the smallest', () => {
    expect(read('1e400').code).toBe(READ_INFINITE);
    expect(read('1e99999999999999').code).toBe(READ_INFINITE);
    expect(read('1e-400')).toMatchObject({ code: READ_NUMBER, value: 0 });
    expect(read('1.7976931348623157e308')).toMatchObject({ code: READ_NUMBER, value: Number.MAX_VALUE });
    expect(Object.is(read('-0.000').value, 0)).toBe(true);
  });

  it('is read inside a longer line without touching its neighbours', () => {
    const reader = new NumberReader('.');
    const bytes = encode('1234.5678');
    expect(reader.read(bytes, 1, 6)).toBe(READ_NUMBER);
    expect(reader.value).toBe(234.5);
  });

  it('is the same double as the language reads, for a hundred thousand seeded decimals', () => {
    const random = seeded(20_260_801);
    const reader = new NumberReader('.');
    let slow = 0;
    for (let i = 0; i < 100_000; i++) {
      const digits = 1 + Math.floor(random() * 19);
      let text = '';
      for (let k = 0; k < digits; k++) text += Math.floor(random() * 10);
      const place = Math.floor(random() * (digits + 1));
      text = random() < 0.8 ? `${text.slice(0, place)}.${text.slice(place)}` : text;
      if (random() < 0.3) text = `-${text}`;
      if (random() < 0.4) text += `e${Math.floor(random() * 80 - 40)}`;
      if (digits > 15) slow++;
      const bytes = encode(text);
      const code = reader.read(bytes, 0, bytes.length);
      const wanted = Number(text);
      if (code !== READ_NUMBER || reader.value !== (wanted === 0 ? 0 : wanted))
        expect({ text, code, value: reader.value }).toEqual({ text, code: READ_NUMBER, value: wanted });
    }
    expect(slow).toBeGreaterThan(10_000);
  });
});
