/**
 * Makes the demo: invented media, their clean figures from stated laws, four sources as people keep them, the slips.
 *
 *   node test/demo/make-demo.js            writes sources/ and test/demo/planted-slips.json
 *   node test/demo/make-demo.js --check    makes it in memory and compares; exit status 1 where anything differs
 */
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { gunzipSync, gzipSync } from 'node:zlib';
import { close } from './close.js';
import { benchTwo } from './layouts/bench-two.js';
import { greyBinder } from './layouts/grey-binder.js';
import { quayTables } from './layouts/quay-tables.js';
import { vapourModels } from './layouts/vapour-models.js';
import { MEDIA } from './media.js';
import { assertPhysical } from './physical.js';
import { descriptorText, sheetText } from './print.js';
import { readme } from './readme.js';
import { plantAll } from './slips.js';

const ROOT = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const SLIPS_FILE = 'test/demo/planted-slips.json';

/** Everything in memory: files by path from the repository's root, the sheets before slips, the slips. */
export function makeDemo() {
  const closed = {};
  for (const medium of MEDIA) {
    closed[medium.id] = close(medium);
    assertPhysical(medium, closed[medium.id]);
  }
  const made = [quayTables, greyBinder, benchTwo, vapourModels].map((layout) => layout(closed));
  const sheets = made.flatMap((source) => source.sheets);
  const clean = new Map(sheets.map((sheet) => [`sources/${sheet.source}/${sheet.file}`, sheetText(sheet)]));
  const { slips, corrections } = plantAll(sheets);

  const files = new Map();
  const put = (path, text) => files.set(path, Buffer.from(text, 'utf8'));
  put('sources/substances.csv', substances());
  put('sources/README.md', readme(slips, corrections));
  put(SLIPS_FILE, `${JSON.stringify(slips, null, 2)}\n`);
  for (const { source, descriptor } of made) put(`sources/${source}/source.json`, `${descriptorText(descriptor)}\n`);
  for (const { source } of made) {
    const own = corrections.filter((one) => one.source === source).map((one) => one.correction);
    if (own.length > 0) put(`sources/${source}/corrections.json`, `${JSON.stringify(own, null, 2)}\n`);
  }
  for (const sheet of sheets) {
    const path = `sources/${sheet.source}/${sheet.file}`;
    put(path, sheetText(sheet));
    if (path.endsWith('.gz')) files.set(path, gzip(files.get(path)));
  }
  return { files, clean, slips, corrections, media: MEDIA, closed };
}

function substances() {
  const header =
    'substance,name,formula,molar_mass,class,critical_temperature,critical_pressure,acentric_factor,polar_a,polar_b';
  const rows = MEDIA.map(({ id, name, molarMass, class: kind, critical: c }) =>
    [id, name, '', molarMass, kind, c?.temperatureK, c?.pressurePa, c?.acentricFactor, c && 0, c && 0].join(','),
  );
  return `${[header, ...rows.toSorted()].join('\n')}\n`;
}

/** No clock and no system in the header: bytes 4 to 7 are the time, byte 9 the system. */
function gzip(bytes) {
  const packed = gzipSync(bytes, { level: 9 });
  packed.fill(0, 4, 8);
  packed[9] = 255;
  return packed;
}

/** What differs from the files under `root`, one sentence each; packed files are compared by header and content. */
export function differences(root = ROOT) {
  const { files } = makeDemo();
  const found = [];
  for (const [path, bytes] of files) {
    let kept;
    try {
      kept = readFileSync(join(root, path));
    } catch {
      found.push(`${path} is missing`);
      continue;
    }
    const [wanted, read] = path.endsWith('.gz') ? [unpack(bytes), unpack(kept)] : [bytes, kept];
    if (!wanted.equals(read)) found.push(`${path} is not what the generator makes`);
  }
  for (const entry of readdirSync(join(root, 'sources'), { recursive: true, withFileTypes: true })) {
    const path = join(entry.parentPath ?? entry.path, entry.name).slice(root.length + 1);
    if (entry.isFile() && !files.has(path)) found.push(`${path} is not made by the generator`);
  }
  return found;
}

const unpack = (bytes) => Buffer.concat([bytes.subarray(0, 8), gunzipSync(bytes)]);

function write(root = ROOT) {
  const { files } = makeDemo();
  rmSync(join(root, 'sources'), { recursive: true, force: true });
  for (const [path, bytes] of files) {
    mkdirSync(dirname(join(root, path)), { recursive: true });
    writeFileSync(join(root, path), bytes);
  }
  return files.size;
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  if (process.argv.includes('--check')) {
    const found = differences();
    for (const sentence of found) console.error(sentence);
    console.log(found.length === 0 ? 'The demo is what the generator makes.' : `${found.length} files differ.`);
    process.exitCode = found.length === 0 ? 0 : 1;
  } else {
    console.log(`${write()} files written.`);
  }
}
