import type { ParquetWriter } from './duckdb.js';
import type { Log } from './log.js';
import { type NightWork, type PartitionResult, workPartition } from './night-work.js';
import { runPool } from './pool.js';

/** Works through every partition on at most `jobs` threads, results in the order of the partitions. */
export async function workThrough(
  work: NightWork,
  jobs: number,
  log: Log,
  openWriter: () => Promise<ParquetWriter>,
): Promise<PartitionResult[]> {
  const total = work.wanted === null ? work.substances.length : work.wanted.reduce((sum, one) => sum + one, 0);
  let done = 0;
  const onProgress = (more: number): void => {
    done += more;
    log.advance(done);
  };
  log.begin('calculate', total, 'substance');
  const results =
    jobs > 1 && work.partitions.length > 1
      ? await runPool<NightWork, PartitionResult>(
          new URL('./worker.js', import.meta.url),
          work,
          work.partitions.length,
          jobs,
          (index) => workPartition(work, index, openWriter, onProgress),
          onProgress,
        )
      : await oneAfterTheOther(work, openWriter, onProgress);
  log.end();
  return results;
}

async function oneAfterTheOther(
  work: NightWork,
  openWriter: () => Promise<ParquetWriter>,
  onProgress: (more: number) => void,
): Promise<PartitionResult[]> {
  const results: PartitionResult[] = [];
  for (let index = 0; index < work.partitions.length; index++) {
    results.push(await workPartition(work, index, openWriter, onProgress));
  }
  return results;
}
