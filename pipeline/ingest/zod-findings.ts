/** What a schema found wrong, in words for the person who wrote the file. */
import type { Finding, ReadingProblem } from '../../schemas/finding.js';
import type { SchemaIssue as Issue } from '../../schemas/issue.js';
import type { JsonPlace } from './json-place.js';
import { nearestWords } from './nearest.js';
import { readingFinding } from './reading.js';

export interface JsonFile {
  readonly source: string;
  readonly file: string;
  readonly value: unknown;
  readonly placeOf: (path: readonly PropertyKey[]) => JsonPlace;
}

/** One finding an issue; `prefix` is where the checked part stands in the file, `known` the keys that may stand there. */
export function zodFindings(
  json: JsonFile,
  problem: ReadingProblem,
  issues: readonly Issue[],
  prefix: readonly PropertyKey[] = [],
  known: readonly string[] = [],
): Finding[] {
  return issues.flatMap(deepest).flatMap((issue) => {
    const path = [...prefix, ...issue.path];
    if (issue.code !== 'unrecognized_keys')
      return [jsonFinding(json, problem, path, wantedBy(issue, valueAt(json.value, path)))];
    return issue.keys.map((key) =>
      jsonFinding(json, problem, [...path, key], `a key that is known here${nearestWords(key, known)}`, key),
    );
  });
}

/** A finding at a key path of a JSON file; `read` is the value there unless given. */
export function jsonFinding(
  json: JsonFile,
  problem: ReadingProblem,
  path: readonly PropertyKey[],
  wanted: string,
  read?: string,
  remedy?: string,
  severity: Finding['severity'] = 'fault',
): Finding {
  const place = json.placeOf(path);
  const value = valueAt(json.value, path);
  const dotted = pathText(path);
  return readingFinding({
    problem,
    severity,
    address: { source: json.source, file: json.file, line: place.line, column: dotted },
    read: read ?? (value === undefined ? 'nothing' : shorten(JSON.stringify(value))),
    wanted,
    remedy:
      remedy ?? `change ${dotted === '' ? 'it' : dotted} in ${json.file}, line ${place.line}, column ${place.column}`,
  });
}

/** `tables[0].columns["T(K)"].unit` */
export function pathText(path: readonly PropertyKey[]): string {
  return path
    .map((key, index) => {
      if (typeof key === 'number') return `[${key}]`;
      const name = String(key);
      if (!/^[A-Za-z_][\w-]*$/.test(name)) return `[${JSON.stringify(name)}]`;
      return index === 0 ? name : `.${name}`;
    })
    .join('');
}

/** Of a union's alternatives, the one that came furthest. */
function deepest(issue: Issue): Issue[] {
  if (issue.code !== 'invalid_union' || issue.errors.length === 0) return [issue];
  const depth = (issues: readonly Issue[]): number => Math.max(0, ...issues.map((inner) => inner.path.length));
  const best = [...issue.errors].sort((a, b) => depth(b) - depth(a))[0]!;
  if (depth(best) === 0) {
    const alternatives = [...new Set(issue.errors.flat().map((inner) => wantedBy(inner, undefined)))];
    return [{ ...issue, errors: [], message: alternatives.join(', or ') } as Issue];
  }
  return best.flatMap((inner) => deepest({ ...inner, path: [...issue.path, ...inner.path] } as Issue));
}

function wantedBy(issue: Issue, read: unknown): string {
  switch (issue.code) {
    case 'invalid_type':
      return TYPES[issue.expected] ?? issue.expected;
    case 'invalid_value': {
      const values = issue.values.map(String);
      return `one of ${values.join(', ')}${typeof read === 'string' ? nearestWords(read, values) : ''}`;
    }
    case 'invalid_union': {
      if (issue.errors.length > 0 || issue.discriminator === undefined) return issue.message;
      const options = ((issue as { options?: readonly unknown[] }).options ?? []).map(String);
      return `one of ${options.join(', ')}${typeof read === 'string' ? nearestWords(read, options) : ''}`;
    }
    case 'too_small':
      return issue.origin === 'string' || issue.origin === 'array'
        ? 'something that is not empty'
        : `a number ${issue.inclusive ? 'of at least' : 'above'} ${issue.minimum}`;
    case 'too_big':
      return issue.origin === 'string' ? `at most ${issue.maximum} characters` : `a number of at most ${issue.maximum}`;
    default:
      return issue.message.replace(/^wanted /, '');
  }
}

const TYPES: Readonly<Record<string, string>> = {
  string: 'text in double quotes',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list in square brackets',
  object: 'an object in braces',
  record: 'an object in braces',
  null: 'null',
};

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  let here = value;
  for (const key of path) {
    if (typeof here !== 'object' || here === null) return undefined;
    here = (here as Record<PropertyKey, unknown>)[key];
  }
  return here;
}

const shorten = (text: string): string => (text.length > 80 ? `${text.slice(0, 77)}...` : text);
