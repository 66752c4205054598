import type { Request } from './arguments.js';
import type { ParquetWriter } from './duckdb.js';
import { folderBytes } from './file-records.js';
import type { Log } from './log.js';
import { type NightWork, type PartitionResult, workPartition } from './night-work.js';
import { PARTITION_BYTES } from './partition.js';
import { Crew, runPool } from './pool.js';

/**
 * Calls the crew before the sources are read, so that the workers load meanwhile, and dismisses it afterwards. There is none
 * where one job is asked for, or so little is to be read that it will be one partition.
 *
 * @param partitionBytes as the partitions will be cut
 */
export async function withCrew<Result>(
  { sources, jobs }: Pick<Request, 'sources' | 'jobs'>,
  use: (crew: Crew | null) => Promise<Result>,
  partitionBytes = PARTITION_BYTES,
): Promise<Result> {
  const most = Math.min(jobs, Math.ceil(folderBytes(sources) / partitionBytes));
  const crew = most > 1 ? new Crew(new URL('./worker.js', import.meta.url), most - 1) : null;
  try {
    return await use(crew);
  } finally {
    await crew?.dismiss();
  }
}

/** Works through every partition with the crew, or without one, results in the order of the partitions. */
export async function workThrough(
  work: NightWork,
  crew: Crew | null,
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
    crew !== null
      ? await runPool<NightWork, PartitionResult>(
          crew,
          work,
          work.partitions.length,
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
