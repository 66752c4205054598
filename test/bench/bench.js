/**
 * Measures the nightly build on a bulk library against the floor (floor.js), one after the other in turn:
 *
 *     npm run bench -- --substances 10000 --json bench.json [--pairs 3] [--jobs N] [--seed 1] [--keep DIR]
 *
 * Both are whole processes, start to exit. Exit status 1 when the nightly did not publish.
 */
import { existsSync, mkdirSync, mkdtempSync, readFileSync, realpathSync, rmSync, writeFileSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { writeBulkLibrary } from './bulk-library.js';
import { measure } from './measure.js';
import { scoreRelease } from './score.js';

const HERE = dirname(fileURLToPath(import.meta.url));
const CLI = resolve(HERE, '../../.build/pipeline/shell/cli.js');
const RELEASE_DATE = '2024-01-01';

const { values } = parseArgs({
  options: {
    substances: { type: 'string', default: '10000' },
    json: { type: 'string' },
    pairs: { type: 'string', default: '3' },
    jobs: { type: 'string' },
    seed: { type: 'string', default: '1' },
    keep: { type: 'string' },
  },
});
const substances = wholeNumber('substances', values.substances);
const pairs = wholeNumber('pairs', values.pairs);
const seed = wholeNumber('seed', values.seed);
if (!existsSync(CLI)) usage(`${CLI} is missing: run npm run build first`);

const dir = values.keep === undefined ? mkdtempSync(join(tmpdir(), 'bench-')) : resolve(values.keep);
mkdirSync(dir, { recursive: true });
try {
  process.exitCode = await bench();
} finally {
  if (values.keep === undefined) rmSync(dir, { recursive: true, force: true });
}

async function bench() {
  const library = writeBulkLibrary(dir, { substances, seed });
  const bytes = library.tables.reduce((sum, table) => sum + readFileSync(table).length, 0);
  say(`${substances} substances, ${library.rows} rows, ${(bytes / 2 ** 20).toFixed(0)} MiB, seed ${seed}`);
  const out = join(dir, 'out');
  const runs = [];
  for (let pair = 0; pair < pairs; pair++) {
    const floorOut = join(dir, 'floor');
    const floor = await measure(process.execPath, [join(HERE, 'floor.js'), floorOut, ...library.tables]);
    if (floor.status !== 0) return fail('the floor', floor);
    const { copySeconds } = JSON.parse(floor.stdout);
    rmSync(floorOut, { recursive: true });
    rmSync(out, { recursive: true, force: true });
    const jobs = values.jobs === undefined ? [] : ['--jobs', values.jobs];
    const nightly = await measure(process.execPath, [
      CLI,
      ...['nightly', '--sources', library.sources, '--out', out, '--date', RELEASE_DATE],
      ...jobs,
    ]);
    if (nightly.status !== 0) return fail('the nightly', nightly);
    const ratio = nightly.seconds / floor.seconds;
    runs.push({ floor, copySeconds, nightly, ratio });
    say(`pair ${pair + 1}: floor ${seconds(floor.seconds)}, nightly ${seconds(nightly.seconds)}, ${ratio.toFixed(2)} F`);
  }
  const score = await scoreRelease(realpathSync(join(out, 'current')), library.planted, substances);
  const result = {
    substances,
    rows: library.rows,
    floor_s: rounded(median(runs.map((r) => r.floor.seconds)), 3),
    nightly_s: rounded(median(runs.map((r) => r.nightly.seconds)), 3),
    ratio: rounded(median(runs.map((r) => r.ratio)), 3),
    peak_MiB: rounded(Math.max(...runs.map((r) => r.nightly.peakMiB)), 1),
    floor_copy_s: rounded(median(runs.map((r) => r.copySeconds)), 3),
    nightly_cpu_s: medianOrNull(runs.map((r) => r.nightly.cpuSeconds)),
    floor_cpu_s: medianOrNull(runs.map((r) => r.floor.cpuSeconds)),
    load_average: loadavg()[0],
    floor_peak_MiB: rounded(Math.max(...runs.map((r) => r.floor.peakMiB)), 1),
    bytes,
    seed,
    pairs,
    cpu: cpus()[0]?.model ?? 'unknown',
    cores: cpus().length,
    node: process.version,
    slips: score,
  };
  if (values.json !== undefined) writeFileSync(values.json, `${JSON.stringify(result, null, 2)}\n`);
  printTable(result, score);
  return 0;
}

function printTable(result, score) {
  say('');
  say('| substances | rows | floor/s | nightly/s | nightly/F | peak/MiB |');
  say('| ---: | ---: | ---: | ---: | ---: | ---: |');
  const { rows, floor_s, nightly_s, ratio, peak_MiB } = result;
  say(`| ${result.substances} | ${rows} | ${floor_s} | ${nightly_s} | ${ratio} | ${peak_MiB} |`);
  say(`(medians of ${result.pairs} pairs; the floor's copying alone ${result.floor_copy_s} s; peak is the largest seen;`);
  say(` CPU time ${result.floor_cpu_s} s and ${result.nightly_cpu_s} s; load average at the end ${result.load_average.toFixed(1)})`);
  say('');
  say('| slip | planted | found | cell in first group |');
  say('| --- | ---: | ---: | ---: |');
  for (const [kind, k] of Object.entries(score.byKind).toSorted()) {
    say(`| ${kind} | ${k.planted} | ${k.found} | ${k.firstGroup} |`);
  }
  say(`| all | ${score.planted} | ${score.found} | ${score.firstGroup} (${score.first} as first suspect) |`);
  say(
    `clean substances: ${score.clean}, of which with a false fault ${score.falseFaults}, ` +
      `a false doubt ${score.falseDoubts}, notes only ${score.withNotes}`,
  );
  for (const m of score.missed.slice(0, 10)) say(`  missed: ${m.substance} ${m.kind}${m.found ? ', found but another cell first' : ''}`);
  for (const a of score.accused.slice(0, 10)) say(`  accused: ${a.substance} ${a.rule} ${a.severity}`);
}

/** Median; of an even number, the mean of the middle two. */
function median(list) {
  const sorted = list.toSorted((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

function medianOrNull(list) {
  return list.includes(null) ? null : rounded(median(list), 2);
}

function rounded(value, decimals) {
  return Number(value.toFixed(decimals));
}

function seconds(value) {
  return `${value.toFixed(2)} s`;
}

function say(text) {
  console.log(text);
}

function fail(what, measured) {
  console.error(`${what} ended with status ${measured.status}\n${measured.stdout}${measured.stderr}`);
  return 1;
}

function wholeNumber(name, text) {
  const number = Number(text);
  if (!/^\d+$/.test(text) || number < 1) usage(`--${name} wants a whole number above 0, not "${text}"`);
  return number;
}

function usage(message) {
  console.error(message);
  process.exit(2);
}
