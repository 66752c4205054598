/** Reads JSON and remembers where each key stands, so that a message can name the line. */

export interface JsonPlace {
  /** 1-based. */
  readonly line: number;
  readonly column: number;
}

export type JsonReading =
  | {
      readonly ok: true;
      readonly value: unknown;
      /** The place of the value at `path`, or of its nearest ancestor that exists. */
      readonly placeOf: (path: readonly PropertyKey[]) => JsonPlace;
    }
  | { readonly ok: false; readonly place: JsonPlace; readonly read: string; readonly wanted: string };

/** Parses `text` by RFC 8259; a key that stands twice in one object is an error too. */
export function readJson(text: string): JsonReading {
  const parser = new Parser(text);
  try {
    const value = parser.whole();
    const { places } = parser;
    const placeOf = (path: readonly PropertyKey[]): JsonPlace => {
      for (let length = path.length; length >= 0; length--) {
        const offset = places.get(keyOf(path.slice(0, length)));
        if (offset !== undefined) return placeAt(text, offset);
      }
      return { line: 1, column: 1 };
    };
    return { ok: true, value, placeOf };
  } catch (error) {
    if (!(error instanceof Stumble)) throw error;
    const read =
      error.at >= text.length ? 'the end of the file' : text.slice(error.at, error.at + 12).split(/[\r\n]/)[0]!;
    return { ok: false, place: placeAt(text, error.at), read, wanted: error.wanted };
  }
}

const keyOf = (path: readonly PropertyKey[]): string => path.map((key) => `${String(key)}\u0000`).join('');

function placeAt(text: string, offset: number): JsonPlace {
  const before = text.slice(0, offset);
  const line = before.split('\n').length;
  return { line, column: offset - before.lastIndexOf('\n') };
}

class Stumble extends Error {
  constructor(
    readonly at: number,
    readonly wanted: string,
  ) {
    super(wanted);
  }
}

const ESCAPES: Readonly<Record<string, string>> = {
  '"': '"',
  '\\': '\\',
  '/': '/',
  b: '\b',
  f: '\f',
  n: '\n',
  r: '\r',
  t: '\t',
};
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const LITERALS: readonly (readonly [string, unknown])[] = [
  ['true', true],
  ['false', false],
  ['null', null],
];

class Parser {
  readonly places = new Map<string, number>();
  private at = 0;
  private depth = 0;

  constructor(private readonly text: string) {}

  whole(): unknown {
    const value = this.value('');
    this.blanks();
    if (this.at < this.text.length) throw new Stumble(this.at, 'nothing after the closing brace');
    return value;
  }

  private value(path: string): unknown {
    this.blanks();
    this.places.set(path, this.at);
    if (this.depth > 100) throw new Stumble(this.at, 'less than a hundred levels');
    const start = this.text[this.at];
    if (start === '{') return this.object(path);
    if (start === '[') return this.array(path);
    if (start === '"') return this.string();
    for (const [word, value] of LITERALS) {
      if (!this.text.startsWith(word, this.at)) continue;
      this.at += word.length;
      return value;
    }
    NUMBER.lastIndex = this.at;
    const number = NUMBER.exec(this.text);
    if (number === null) {
      const comment = this.text.startsWith('//', this.at) || this.text.startsWith('/*', this.at);
      throw new Stumble(
        this.at,
        comment
          ? 'a value; JSON has no comments'
          : 'a value (text in double quotes, a number, {, [, true, false or null)',
      );
    }
    this.at += number[0].length;
    return Number(number[0]);
  }

  private object(path: string): unknown {
    const result: Record<string, unknown> = {};
    const seen = new Set<string>();
    this.at++;
    this.depth++;
    this.blanks();
    while (this.text[this.at] !== '}') {
      if (seen.size > 0) this.comma('"," or "}"');
      this.blanks();
      const keyAt = this.at;
      if (this.text[this.at] !== '"') throw new Stumble(this.at, 'a key in double quotes');
      const key = this.string();
      if (seen.has(key)) throw new Stumble(keyAt, `each key once; "${key}" stands twice in this object`);
      seen.add(key);
      this.blanks();
      if (this.text[this.at] !== ':') throw new Stumble(this.at, `":" after the key "${key}"`);
      this.at++;
      const value = this.value(`${path}${key}\u0000`);
      Object.defineProperty(result, key, { value, enumerable: true, writable: true, configurable: true });
      this.places.set(`${path}${key}\u0000`, keyAt);
      this.blanks();
    }
    this.at++;
    this.depth--;
    return result;
  }

  private array(path: string): unknown {
    const result: unknown[] = [];
    this.at++;
    this.depth++;
    this.blanks();
    while (this.text[this.at] !== ']') {
      if (result.length > 0) this.comma('"," or "]"');
      result.push(this.value(`${path}${result.length}\u0000`));
      this.blanks();
    }
    this.at++;
    this.depth--;
    return result;
  }

  private comma(wanted: string): void {
    this.blanks();
    if (this.text[this.at] !== ',') throw new Stumble(this.at, wanted);
    this.at++;
  }

  private string(): string {
    const { text } = this;
    let result = '';
    this.at++;
    for (;;) {
      const c = text[this.at];
      if (c === undefined || c < ' ') throw new Stumble(this.at, 'a closing double quote on the same line');
      this.at++;
      if (c === '"') return result;
      if (c !== '\\') {
        result += c;
        continue;
      }
      const letter = text[this.at] ?? '';
      const code = /^u[0-9a-fA-F]{4}/.exec(text.slice(this.at, this.at + 5));
      if (code !== null) {
        result += String.fromCharCode(Number.parseInt(code[0].slice(1), 16));
        this.at += 5;
      } else if (letter in ESCAPES) {
        result += ESCAPES[letter];
        this.at++;
      } else throw new Stumble(this.at - 1, 'an escape that JSON knows (a backslash itself is written \\\\)');
    }
  }

  private blanks(): void {
    for (;;) {
      const c = this.text.charCodeAt(this.at);
      if (c !== 32 && c !== 9 && c !== 10 && c !== 13) return;
      this.at++;
    }
  }
}
