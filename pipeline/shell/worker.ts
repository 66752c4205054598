/** A worker thread: takes partitions, one at a time, and hands back what became of them. */
import { parentPort, workerData } from 'node:worker_threads';
import { ParquetWriter } from './duckdb.js';
import { type NightWork, type PartitionResult, workPartition } from './night-work.js';
import { takeTask, type WorkerMessage, type WorkerStart } from './pool.js';

const port = parentPort!;
const { data: work, next, count } = workerData as WorkerStart<NightWork>;
let writer: Promise<ParquetWriter> | null = null;
const openWriter = (): Promise<ParquetWriter> => {
  writer ??= ParquetWriter.open();
  return writer;
};

// A rejection is not caught: the thread ends with it, and the night too.
for (let task = takeTask(next, count); task >= 0; task = takeTask(next, count)) {
  const result = await workPartition(work, task, openWriter, (progress) => say({ progress }));
  say({ task, result });
}
say({ over: true });

function say(message: WorkerMessage<PartitionResult>): void {
  port.postMessage(message);
}
