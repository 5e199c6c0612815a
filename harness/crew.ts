import { MessageChannel, type MessagePort } from 'node:worker_threads';
import { Tinypool } from 'tinypool';
import type { MethodAnswer, MethodJob } from './job.js';

/** A job's end as the crew saw it. */
export type CrewResult =
  | MethodAnswer
  | { readonly kind: 'lost'; readonly reason: string; readonly seconds: number };

/** Worker threads that run methods; a method that outruns its budget is ended without harm to the others. */
export interface Crew {
  readonly workers: number;
  /** Runs one job; never rejects. At most `workers` jobs may be under way at a time, so that budgets start at once. */
  run(job: MethodJob): Promise<CrewResult>;
  /** Ends all workers, and with them the jobs under way. */
  close(): Promise<void>;
}

/** What a worker is handed: the job, and a port on which it says that it has loaded and the method's time begins. */
export interface WorkerTask {
  readonly job: MethodJob;
  readonly started: MessagePort;
}

/** Seconds that a worker may take to load. */
const loadSeconds = 60;

/**
 * Starts a crew.
 *
 * @param workerFile the module whose default export answers a `WorkerTask` with a `MethodAnswer`.
 */
export function openCrew(workerFile: URL, workers: number): Crew {
  const pool = new Tinypool({
    filename: workerFile.href,
    minThreads: workers,
    maxThreads: workers,
    concurrentTasksPerWorker: 1,
    isolateWorkers: false,
  });
  let closing = false;
  return {
    workers,
    async run(job) {
      const { budgetSeconds } = job.offer;
      const limit = startLimit(budgetSeconds);
      try {
        const task: WorkerTask = { job, started: limit.workerPort };
        const options = { signal: limit.signal, transferList: [limit.workerPort] };
        return (await pool.run(task, options)) as MethodAnswer;
      } catch (error) {
        if (closing) return { kind: 'lost', reason: 'interrupted', seconds: 0 };
        if (!limit.signal.aborted)
          return { kind: 'lost', reason: `its worker ended: ${firstLine(error)}`, seconds: 0 };
        return {
          kind: 'lost',
          reason: `took longer than its budget of ${budgetSeconds} s`,
          seconds: budgetSeconds,
        };
      } finally {
        limit.clear();
      }
    },
    async close() {
      closing = true;
      await pool.destroy();
    },
  };
}

/** A time limit that begins to count when the worker says on its port that it has started. */
function startLimit(budgetSeconds: number) {
  const controller = new AbortController();
  const { port1, port2 } = new MessageChannel();
  let timer = setTimeout(() => controller.abort(), (loadSeconds + budgetSeconds) * 1000);
  port1.once('message', () => {
    clearTimeout(timer);
    timer = setTimeout(() => controller.abort(), budgetSeconds * 1000);
  });
  return {
    signal: controller.signal,
    workerPort: port2,
    clear: () => {
      clearTimeout(timer);
      port1.close();
    },
  };
}

/** An error's message on one line of at most 300 characters, fit for a table. */
export function firstLine(error: unknown): string {
  const message = error instanceof Error ? error.message : String(error);
  const line = message.replace(/\s+/g, ' ').trim();
  return line.length > 300 ? `${line.slice(0, 299)}…` : line || 'no reason given';
}
