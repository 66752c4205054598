import { describe, expect, it } from 'vitest';
import { readJson } from '../../pipeline/ingest/ingest.js';

describe('JSON read with its places', () => {
  it('gives the value that the language gives', () => {
    const text = '{"a": [1, -2.5e3, true, null, "x\\n\\u00e9\\"\\/"], "b": {"c": {}, "d": []}, "__proto__": 1}';
    const read = readJson(text);
    expect(read.ok && JSON.stringify(read.value)).toBe(JSON.stringify(JSON.parse(text)));
  });

  it('knows the line and column of a key', () => {
    const read = readJson('{\n  "tables": [\n    { "file": "a.csv",\n      "holds": "x" }\n  ]\n}');
    if (!read.ok) throw new Error('not read');
    expect(read.placeOf(['tables', 0, 'holds'])).toEqual({ line: 4, column: 7 });
    expect(read.placeOf(['tables', 0, 'no-such-key'])).toEqual({ line: 3, column: 5 });
  });

  it.each([
    ['{\n  "a": 1,\n}', 3, 1, 'a key in double quotes'],
    ['{\n  "a": 1\n  "b": 2\n}', 3, 3, '"," or "}"'],
    ['{\n  // why\n}', 2, 3, 'a key in double quotes'],
    ['{"a": /* why */ 1}', 1, 7, 'JSON has no comments'],
    ['{"a": .5}', 1, 7, 'a value'],
    ["{'a': 1}", 1, 2, 'a key in double quotes'],
    ['{"a": "b\n"}', 1, 9, 'a closing double quote'],
    ['{"a": 1, "a": 2}', 1, 10, 'stands twice'],
    ['[1] x', 1, 5, 'nothing after'],
    ['', 1, 1, 'a value'],
    ['{"a": 01}', 1, 8, '"," or "}"'],
    ['{"a": "\\x"}', 1, 8, 'an escape'],
  ])('stumbles over %j at line %i, column %i', (text, line, column, wanted) => {
    const read = readJson(text);
    expect(read).toMatchObject({ ok: false, place: { line, column } });
    if (!read.ok) expect(read.wanted).toContain(wanted);
  });
});
