/** A worker thread: takes the numbers of partitions, one at a time, and hands back what became of them. */
import { parentPort, workerData } from 'node:worker_threads';
import { ParquetWriter } from './duckdb.js';
import { type NightWork, type PartitionResult, workPartition } from './night-work.js';
import type { WorkerMessage } from './pool.js';

const port = parentPort!;
const work = workerData as NightWork;
let writer: Promise<ParquetWriter> | null = null;

port.on('message', (partition: number) => {
  const openWriter = (): Promise<ParquetWriter> => {
    writer ??= ParquetWriter.open();
    return writer;
  };
  workPartition(work, partition, openWriter, (progress) => say({ progress })).then(
    (result) => say({ result }),
    // Thrown outside the promise, so that the thread ends and the night with it.
    (error: unknown) =>
      setImmediate(() => {
        throw error;
      }),
  );
});

function say(message: WorkerMessage<PartitionResult>): void {
  port.postMessage(message);
}
