/** A worker thread: told what the work is, it takes partitions, one at a time, and hands back what became of them. */
import { parentPort } from 'node:worker_threads';
import { ParquetWriter } from './duckdb.js';
import { type NightWork, type PartitionResult, workPartition } from './night-work.js';
import { takeTask, type WorkerMessage, type WorkerStart } from './pool.js';

const port = parentPort!;
let writer: Promise<ParquetWriter> | null = null;
const openWriter = (): Promise<ParquetWriter> => {
  writer ??= ParquetWriter.open();
  return writer;
};

port.once('message', ({ data: work, next, count }: WorkerStart<NightWork>) => {
  const all = async (): Promise<void> => {
    for (let task = takeTask(next, count); task >= 0; task = takeTask(next, count)) {
      const result = await workPartition(work, task, openWriter, (progress) => say({ progress }));
      say({ task, result });
    }
    say({ over: true });
  };
  // Thrown outside the promise, so that the thread ends and the night with it.
  all().catch((error: unknown) =>
    setImmediate(() => {
      throw error;
    }),
  );
});

function say(message: WorkerMessage<PartitionResult>): void {
  port.postMessage(message);
}
