import { describe, expect, it } from 'vitest';
import { evidenceHash, findingId, hash64 } from '../../schemas/finding-id.js';
import { makeFinding } from '../../schemas/make-finding.js';

const cell = { source: 'a', file: 'b.csv', line: 7, column: 'S', printed: '64.785' };
const parts = { rule: 'functions-close', substance: 'lead', phases: ['cr'], source: 'a', quantity: 'entropy' } as const;

describe('the name of a finding', () => {
  it('is sixteen hexadecimal digits that depend on each of its parts', () => {
    const ids = [
      parts,
      { ...parts, rule: 'entropy-rises' as const },
      { ...parts, substance: 'tin' },
      { ...parts, phases: ['cr', 'l'] },
      { ...parts, phases: [] },
      { ...parts, transition: 'x' },
      { ...parts, source: 'b' },
      { ...parts, quantity: '' },
    ].map(findingId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const id of ids) expect(id).toMatch(/^[0-9a-f]{16}$/);
    expect(findingId({ ...parts })).toBe(ids[0]);
  });

  it('does not depend on a line, a value or the evidence', () => {
    const finding = (line: number, printed: string) =>
      makeFinding({
        rule: 'functions-close',
        severity: 'fault',
        substance: 'lead',
        address: { ...cell, line },
        observed: line,
        evidence: [{ ...cell, line, printed }],
        detail: { code: 'anomaly', quantity: 'entropy', lowK: line, highK: 400 },
      });
    const [first, second] = [finding(7, '64.785'), finding(9, '64.786')];
    expect(first.id).toBe(second.id);
    expect(first.evidenceHash).not.toBe(second.evidenceHash);
    expect(first).toMatchObject({ accepted: false, cause: null, fromPhase: null, unit: null });
  });
});

describe('the hash of evidence', () => {
  it('covers the printed text and not the line or the order', () => {
    const other = { ...cell, column: 'H', printed: '0.' };
    expect(evidenceHash([cell, other])).toBe(evidenceHash([other, { ...cell, line: 99 }]));
    expect(evidenceHash([cell])).not.toBe(evidenceHash([{ ...cell, printed: '64.78' }]));
    expect(evidenceHash([cell])).not.toBe(evidenceHash([cell, other]));
  });
});

describe('the 64-bit hash', () => {
  it('is FNV-1a: the same digits as with whole numbers of any length', () => {
    for (const words of [[], ['a'], ['foobar', 'Δ'], ['x'.repeat(1000)]]) {
      let hash = 0xcbf29ce484222325n;
      const take = (byte: number): void => {
        hash = ((hash ^ BigInt(byte)) * 0x100000001b3n) & 0xffffffffffffffffn;
      };
      for (const word of words)
        for (const unit of [...word].map((letter) => letter.charCodeAt(0)).concat(0)) {
          take(unit & 0xff);
          take(unit >>> 8);
        }
      expect(hash64(words)).toBe(hash.toString(16).padStart(16, '0'));
    }
  });

  it('keeps words apart', () => {
    expect(hash64(['ab', 'c'])).not.toBe(hash64(['a', 'bc']));
    expect(hash64([''])).not.toBe(hash64([]));
  });
});
