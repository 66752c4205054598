/**
 * The floor: DuckDB copies the same bytes to Parquet with two threads, and nothing else. Run as a process of its own:
 *
 *     node test/bench/floor.js OUT TABLE.csv…
 *
 * Prints the seconds of the copying alone, as JSON.
 */
import { mkdirSync } from 'node:fs';
import { basename, join } from 'node:path';
import { DuckDBInstance } from '@duckdb/node-api';

const [out, ...tables] = process.argv.slice(2);
mkdirSync(out, { recursive: true });
const instance = await DuckDBInstance.create(':memory:', { threads: '2' });
const connection = await instance.connect();
const started = performance.now();
for (const table of tables) {
  const target = join(out, `${basename(table, '.csv')}.parquet`);
  await connection.run(
    `COPY (SELECT * FROM read_csv(${quoted(table)})) TO ${quoted(target)} (FORMAT parquet, COMPRESSION zstd)`,
  );
}
console.log(JSON.stringify({ copySeconds: (performance.now() - started) / 1000 }));
connection.closeSync();

function quoted(text) {
  return `'${text.replaceAll("'", "''")}'`;
}
