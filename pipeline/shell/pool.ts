import { Worker } from 'node:worker_threads';

/** What a worker says: how far it is within its task, that a task is done, or that there are none left. */
export type WorkerMessage<Result> =
  | { readonly progress: number }
  | { readonly task: number; readonly result: Result }
  | { readonly over: true };

/** What a worker is set to work with: its data, and the number of the next task, shared by all who take tasks. */
export interface WorkerStart<Data> {
  readonly data: Data;
  readonly next: Int32Array;
  readonly count: number;
}

/** Worker threads that load their code while the work is still being read. */
export class Crew {
  readonly workers: readonly Worker[];

  /** @param others how many threads beside this one */
  constructor(script: URL, others: number) {
    this.workers = Array.from({ length: others }, () => new Worker(script, { resourceLimits: LIMITS }));
  }

  async dismiss(): Promise<void> {
    await Promise.all(this.workers.map((worker) => worker.terminate()));
  }
}

/** Columns of a batch die young; with more room for them the collector copies less (24 to 20 s of processor time on a million rows). */
const LIMITS = { maxYoungGenerationSizeMb: 32 };

/** The next task of those that are left; -1 where there is none. */
export function takeTask(next: Int32Array, count: number): number {
  const task = Atomics.add(next, 0, 1);
  return task < count ? task : -1;
}

/**
 * Tasks 0…count − 1 by this thread and the crew: each takes the next task when it is through with one. The crew gets `data`
 * once; `own` does a task here. Results come back in the order of the tasks, whoever did them. A worker that breaks ends
 * them all; the crew is dismissed in any case.
 */
export async function runPool<Data, Result>(
  crew: Crew,
  data: Data,
  count: number,
  own: (task: number) => Promise<Result>,
  onProgress: (done: number) => void,
): Promise<Result[]> {
  const results: Result[] = new Array(count);
  const next = new Int32Array(new SharedArrayBuffer(4));
  const start: WorkerStart<Data> = { data, next, count };
  const untilOver = (worker: Worker): Promise<void> =>
    new Promise((resolve, reject) => {
      worker.on('error', reject);
      worker.on('exit', (code) => reject(new Error(`A worker ended with code ${code} in the middle of its work.`)));
      worker.on('message', (message: WorkerMessage<Result>) => {
        if ('progress' in message) onProgress(message.progress);
        else if ('over' in message) resolve();
        else results[message.task] = message.result;
      });
      worker.postMessage(start);
    });
  const here = async (): Promise<void> => {
    for (let task = takeTask(next, count); task >= 0; task = takeTask(next, count)) results[task] = await own(task);
  };
  try {
    await Promise.all([...crew.workers.map(untilOver), here()]);
  } finally {
    await crew.dismiss();
  }
  return results;
}
