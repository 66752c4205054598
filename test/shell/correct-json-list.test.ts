import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readJsonList, withEntry, writeAtomically } from '../../pipeline/shell/json-list.js';

let folder: string;
let path: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'cuspline-list-'));
  path = join(folder, 'list.json');
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

const added = (text: string) => {
  writeFileSync(path, text);
  return withEntry(readJsonList(path), { a: 2 });
};

describe('an entry added to a list', () => {
  it('makes the list where there is no file', () => {
    expect(withEntry(readJsonList(path), { a: 2 })).toBe('[\n  {\n    "a": 2\n  }\n]\n');
  });

  it('fills an empty list', () => {
    expect(added('[]\n')).toBe('[\n  {\n    "a": 2\n  }\n]\n');
  });

  it('keeps bytes, tabs, line ends and the byte-order mark of what stands there', () => {
    const text = '\uFEFF[\r\n\t{ "a":  1.50, "b": "]" }\r\n]\r\n';
    const after = added(text);
    expect(after).toBe('\uFEFF[\r\n\t{ "a":  1.50, "b": "]" },\r\n\t{\r\n\t\t"a": 2\r\n\t}\r\n]\r\n');
    expect(JSON.parse(after.slice(1))).toEqual([{ a: 1.5, b: ']' }, { a: 2 }]);
  });

  it('is a list still where all stood on one line', () => {
    expect(JSON.parse(added('[{"a":1}]'))).toEqual([{ a: 1 }, { a: 2 }]);
  });

  it('takes the place of an older one', () => {
    writeFileSync(path, '[\n    { "a": 1, "x": 0 },\n    { "a": 3 }\n]\n');
    const after = withEntry(readJsonList(path), { a: 1, x: 9 }, (old) => (old as { a: number }).a === 1);
    expect(JSON.parse(after)).toEqual([{ a: 3 }, { a: 1, x: 9 }]);
    expect(after).toContain('\n    {\n        "a": 3');
  });
});

describe('writing', () => {
  it('keeps the permissions and leaves nothing else', () => {
    writeFileSync(path, '[]');
    chmodSync(path, 0o640);
    writeAtomically(path, '[1]\n');
    expect(readFileSync(path, 'utf8')).toBe('[1]\n');
    expect(statSync(path).mode & 0o777).toBe(0o640);
    expect(readdirSync(folder)).toEqual(['list.json']);
  });

  it('that fails leaves the old file and no draft', () => {
    writeFileSync(path, '[1]\n');
    expect(() => writeAtomically(join(folder, 'none', 'list.json'), '[2]\n')).toThrow(/ENOENT/);
    expect(readFileSync(path, 'utf8')).toBe('[1]\n');
    expect(readdirSync(folder)).toEqual(['list.json']);
  });
});
