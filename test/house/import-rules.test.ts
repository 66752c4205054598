import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { init, parse } from 'es-module-lexer';
import { describe, expect, it } from 'vitest';

const ROOT = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

/** Areas from the most particular path to the most general; a file belongs to the first that matches. */
const AREAS = [
  'pipeline/core/units',
  'pipeline/core/physics',
  'pipeline/core/numeric',
  'pipeline/core',
  'pipeline/ingest',
  'pipeline/harmonise',
  'pipeline/assemble',
  'pipeline/check',
  'pipeline/reconcile',
  'pipeline/publish',
  'pipeline/report',
  'pipeline/shell',
  'schemas',
] as const;
type Area = (typeof AREAS)[number];

const STAGES = ['ingest', 'harmonise', 'assemble', 'check', 'reconcile', 'publish', 'report'] as const;

/** What may import what, each edge with its reason. What does not stand here is forbidden; an area may always import itself. */
const ALLOWED: Readonly<Partial<Record<Area, Readonly<Partial<Record<Area, string>>>>>> = {
  'pipeline/core/numeric': {},
  'pipeline/core': {},
  'pipeline/core/units': {
    'pipeline/core': 'conversions need the constants',
    'pipeline/core/numeric': 'scale differences are polynomials',
  },
  'pipeline/core/physics': {
    'pipeline/core': 'R and the standard pressure',
    'pipeline/core/numeric': 'curves are splines and crossings are roots',
  },
  schemas: {},
  'pipeline/ingest': {
    schemas: 'stages hand on what the schemas say',
    'pipeline/core': 'molar masses follow from formulas',
    'pipeline/core/units': 'a descriptor with an unknown unit is refused at the door',
  },
  'pipeline/harmonise': {
    schemas: 'stages hand on what the schemas say',
    'pipeline/core': 'R, calories and pressures',
    'pipeline/core/units': 'this is where units are converted',
    'pipeline/core/numeric': 'room for its many short columns',
  },
  'pipeline/assemble': {
    schemas: 'stages hand on what the schemas say',
    'pipeline/core': 'R and the reference temperature',
    'pipeline/core/numeric': 'splines, chains and roots',
    'pipeline/core/physics': 'curves, diagrams and the gas',
  },
  'pipeline/check': {
    schemas: 'stages hand on what the schemas say',
    'pipeline/core': 'R and the reference temperature',
    'pipeline/core/numeric': 'its own integrals, by another route than assemble',
    'pipeline/core/physics': 'Gibbs energies of the curves that it judges',
    'pipeline/core/units': 'a column that is off by a law may stand in another unit or on another scale',
  },
  'pipeline/reconcile': {
    schemas: 'stages hand on what the schemas say',
    'pipeline/core': 'R and the reference temperature',
    'pipeline/core/numeric': 'the adjustment is linear algebra',
    'pipeline/core/physics': 'the adjustment re-solves crossings',
    'pipeline/core/units': 'a usual slip is a wrong unit or an old temperature scale',
  },
  'pipeline/publish': { schemas: 'it arranges what was computed; a number made here was never checked' },
  'pipeline/report': { schemas: 'it words what was found; a number made here was never checked' },
  'pipeline/shell': {
    schemas: 'it reads policies and acceptances at the door',
    'pipeline/core': 'constants for the descriptor report',
    'pipeline/core/numeric': 'CSV holds the shortest decimals that read back',
    'pipeline/core/units': 'a pressure on the command line has a unit',
    'pipeline/core/physics': 'show draws a diagram at the pressure asked for',
    'pipeline/ingest': 'it runs the stages',
    'pipeline/harmonise': 'it runs the stages',
    'pipeline/assemble': 'it runs the stages',
    'pipeline/check': 'it runs the stages',
    'pipeline/reconcile': 'it runs the stages',
    'pipeline/publish': 'it runs the stages',
    'pipeline/report': 'it prints the words',
  },
};

/** Packages and built-in modules, and who may open which, with the reason. */
const PACKAGES: Readonly<Record<string, { readonly for: readonly Area[]; readonly why: string }>> = {
  'node:': { for: ['pipeline/shell'], why: 'only the shell touches the world' },
  zod: { for: ['schemas'], why: 'schemas are made in one place' },
  '@atomic-ehr/ucum': { for: ['pipeline/core/units'], why: 'units are converted behind one guarded door' },
  papaparse: { for: ['pipeline/shell', 'pipeline/ingest'], why: 'it parses text and touches nothing' },
  '@duckdb/node-api': { for: ['pipeline/shell'], why: 'it writes files' },
  '@duckdb/node-bindings': { for: ['pipeline/shell'], why: 'it writes files' },
  'p-limit': { for: ['pipeline/shell'], why: 'work in flight is the shell’s business' },
};

interface Import {
  readonly from: string;
  /** A path from the root for relative imports, else the specifier. */
  readonly to: string;
  readonly outside: boolean;
}

await init;
const files = [...sourcesUnder('pipeline'), ...sourcesUnder('schemas')];
const imports = files.flatMap(importsOf);

describe('imports only run down', () => {
  it('finds the imports of every source', () => {
    expect(files.length).toBeGreaterThan(20);
    expect(imports.length).toBeGreaterThan(files.length / 2);
  });

  it('allows only the edges of the table', () => {
    const forbidden = imports
      .filter(({ outside }) => !outside)
      .filter(({ from, to }) => {
        const [above, below] = [areaOf(from), areaOf(to)];
        return above === null || below === null || (above !== below && ALLOWED[above]?.[below] === undefined);
      });
    expect(forbidden.map(say)).toEqual([]);
  });

  it('keeps packages and built-in modules to those who may open them', () => {
    const forbidden = imports
      .filter(({ outside }) => outside)
      .filter(({ from, to }) => {
        const name = to.startsWith('node:') ? 'node:' : to.split('/', to.startsWith('@') ? 2 : 1).join('/');
        const area = areaOf(from);
        return area === null || !(PACKAGES[name]?.for ?? []).includes(area);
      });
    expect(forbidden.map(say)).toEqual([]);
  });

  it('enters a stage by its front door only', () => {
    const past = imports
      .filter(({ outside }) => !outside)
      .filter(({ from, to }) => {
        const stage = STAGES.find((name) => to.startsWith(`pipeline/${name}/`));
        if (stage === undefined || from.startsWith(`pipeline/${stage}/`)) return false;
        return to !== `pipeline/${stage}/${stage}.ts`;
      });
    expect(past.map(say)).toEqual([]);
  });

  it('never reaches test, sources or out from the program', () => {
    const reached = imports.filter(({ to }) => /^(test|sources|out)\//.test(to));
    expect(reached.map(say)).toEqual([]);
  });

  it('imports files that exist', () => {
    const missing = imports.filter(({ outside, to }) => !outside && !files.includes(to));
    expect(missing.map(say)).toEqual([]);
  });
});

describe('the reader of imports', () => {
  it('sees types, side effects, re-exports, late and computed imports, and skips comments', () => {
    const text = [
      "import type { A } from './a.js';",
      "import b, {\n  type C,\n} from './b.js';",
      "import './c.js';",
      "export * from './d.js';",
      "const e = await import('./e.js');",
      "// import f from './f.js';",
      "/* import g from './g.js'; */",
      'const g = await import(name);',
      "const address = new URL('https://example.org/x', import.meta.url);",
    ].join('\n');
    expect(specifiers(text)).toEqual(['./a.js', './b.js', './c.js', './d.js', './e.js', '?']);
  });
});

function sourcesUnder(folder: string): string[] {
  return readdirSync(join(ROOT, folder), { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith('.ts'))
    .map((entry) => relative(ROOT, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .sort();
}

function importsOf(from: string): Import[] {
  return specifiers(readFileSync(join(ROOT, from), 'utf8')).map((specifier) => {
    const outside = !specifier.startsWith('.');
    const to = outside ? specifier : join(dirname(from), specifier).split(sep).join('/').replace(/\.js$/, '.ts');
    return { from, to, outside };
  });
}

/** Every module that a source names, types included; a computed one stands as `?`, which no rule allows. */
function specifiers(text: string): string[] {
  return parse(text)[0]
    .filter(({ type }) => type !== 'import-meta')
    .map(({ specifier }) => specifier ?? '?');
}

function areaOf(path: string): Area | null {
  return AREAS.find((area) => path.startsWith(`${area}/`)) ?? null;
}

function say({ from, to }: Import): string {
  return `${from} imports ${to}`;
}
