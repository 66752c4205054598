import { Worker } from 'node:worker_threads';

/** What a worker says: how far it is within its task, or that the task is done. */
export type WorkerMessage<Result> = { readonly progress: number } | { readonly result: Result };

/** Columns of a batch die young; with more room for them the collector copies less (24 to 20 s of processor time on a million rows). */
const LIMITS = { maxYoungGenerationSizeMb: 32 };

/**
 * Tasks 0…count − 1, each by one worker thread, at most `jobs` at a time, each started once with `data`. Results come
 * back in the order of the tasks, whichever worker was faster. A worker that breaks ends them all.
 */
export async function runPool<Result>(
  script: URL,
  data: unknown,
  count: number,
  jobs: number,
  onProgress: (done: number) => void,
): Promise<Result[]> {
  const results: Result[] = new Array(count);
  let next = 0;
  const workers = Array.from(
    { length: Math.min(jobs, count) },
    () => new Worker(script, { workerData: data, resourceLimits: LIMITS }),
  );
  const runOne = (worker: Worker): Promise<void> =>
    new Promise((resolve, reject) => {
      let task = -1;
      const takeNext = (): void => {
        if (next >= count) {
          resolve();
          return;
        }
        task = next++;
        worker.postMessage(task);
      };
      worker.on('error', reject);
      worker.on('exit', (code) => reject(new Error(`A worker ended with code ${code} in the middle of its work.`)));
      worker.on('message', (message: WorkerMessage<Result>) => {
        if ('progress' in message) onProgress(message.progress);
        else {
          results[task] = message.result;
          takeNext();
        }
      });
      takeNext();
    });
  try {
    await Promise.all(workers.map(runOne));
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
  return results;
}
