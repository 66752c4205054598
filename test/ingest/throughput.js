/**
 * How fast rows become columns: `npm run build && node test/ingest/throughput.js [rows]`. Seeded, one core. It prints and
 * judges nothing; times depend on the machine.
 */
import { ingest, indexRows, readDescriptor } from '../../.build/pipeline/ingest/ingest.js';

const wanted = Number(process.argv[2] ?? 1_000_000);
const PHASES = ['cr', 'l', 'g'];
const ROWS_A_PHASE = 33;

const substances = [];
const lines = ['substance,phase,T,Cp,S,H'];
let state = 1;
const random = () => {
  state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
  return state / 2 ** 32;
};
for (let s = 0; lines.length <= wanted; s++) {
  const id = `medium-${s}`;
  substances.push({ id, name: id, formula: '', molarMassGPerMol: 100 });
  for (const phase of PHASES)
    for (let row = 0; row < ROWS_A_PHASE; row++)
      lines.push(
        `${id},${phase},${100 + 25 * row},${(20 + 60 * random()).toFixed(3)},${(50 + 200 * random()).toFixed(3)},${(-10 + 90 * random()).toFixed(3)}`,
      );
}
const bytes = new Uint8Array(new TextEncoder().encode(`${lines.join('\n')}\n`));
const descriptor = {
  title: 'throughput',
  basis: 'evaluated',
  tables: [
    {
      file: 'all.csv',
      holds: 'thermal-functions',
      substance: { column: 'substance' },
      phase: { column: 'phase' },
      columns: {
        T: { is: 'temperature', unit: 'K' },
        Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' },
        S: { is: 'entropy', unit: 'J/(mol.K)' },
        H: { is: 'enthalpy-increment', unit: 'kJ/mol' },
      },
    },
  ],
};
const { plans } = readDescriptor('bulk', JSON.stringify(descriptor), ['all.csv']);
const [plan] = plans;
for (let round = 0; round < 3; round++) {
  const begin = performance.now();
  const index = indexRows(plan, bytes, substances);
  const indexed = performance.now();
  let rows = 0;
  for (let first = 0; first < substances.length; first += 64) {
    const { artefact } = ingest({ substances: substances.slice(first, first + 64), first, parts: [{ plan, bytes, index, corrections: [] }] });
    for (const one of artefact) for (const series of one.series) rows += series.rows;
  }
  const end = performance.now();
  const cells = rows * 4;
  console.log(
    `${rows} rows, ${(bytes.length / 1e6).toFixed(0)} MB: index ${(indexed - begin).toFixed(0)} ms, read ${(end - indexed).toFixed(0)} ms, ${(((end - indexed) * 1e6) / cells).toFixed(0)} ns a number`,
  );
}
