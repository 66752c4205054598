/**
 * The picture in the README: the demo's night and one withheld medium, as the terminal shows them.
 *
 *     npm run build && node test/demo/picture.js
 */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const out = mkdtempSync(join(tmpdir(), 'cuspline-picture-'));
const run = (...words) =>
  spawnSync(process.execPath, ['.build/pipeline/shell/cli.js', ...words], { cwd: root, encoding: 'utf8' }).stdout;

const night = run('nightly', '--out', out)
  .split('\n')
  .filter((line) => !line.startsWith('Release') && !line.includes(out));
const shown = run('show', 'lumerite').split('\n');
rmSync(out, { recursive: true });

const from = shown.findIndex((line) => line.startsWith('Transitions'));
// The first suspect, with the lines that it runs on over.
const suspect = shown.findIndex((line) => line.startsWith('      suspect'));
const to = shown.findIndex((line, i) => i > suspect && !line.startsWith('        ')) - 1;
const sketch = shown.findIndex((line) => line.startsWith('G against T'));
const end = shown.findIndex((line) => line.startsWith('Nothing about'));
const lines = [
  '$ npm run nightly',
  ...night.slice(0, night.findIndex((line) => line.startsWith('Nothing about'))),
  '$ cuspline show lumerite',
  ...shown.slice(0, 1),
  '',
  ...shown.slice(from, to + 1),
  '',
  ...shown.slice(sketch, end),
];

// Renderers fold runs of ordinary spaces.
const escape = (text) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll(' ', '\u00a0');
const LINE = 18;
const width = 24 + 7.85 * Math.max(...lines.map((line) => line.length));
const height = 24 + LINE * lines.length;
const rows = lines.map((line, i) => {
  const strong = line.startsWith('$') || /^\d+ substances/.test(line);
  return `<text x="16" y="${28 + LINE * i}"${strong ? ' class="strong"' : ''}>${escape(line)}</text>`;
});
writeFileSync(
  join(root, '.readme/demo.svg'),
  `<svg xmlns="http://www.w3.org/2000/svg" xml:space="preserve" width="${Math.ceil(width)}" height="${height}" role="img" aria-label="The night's summary for the demo, and the withheld medium lumerite with its Gibbs curves">
<style>
  rect { fill: #fbfaf7 } text { font: 13px ui-monospace, 'DejaVu Sans Mono', Menlo, Consolas, monospace; fill: #33302b; white-space: pre } .strong { font-weight: 700; fill: #1f4e5f }
</style>
<rect width="100%" height="100%" rx="6"/>
${rows.join('\n')}
</svg>
`,
);
