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

/**
 * What a worker is handed: the job, and a port on which it says that it has loaded and the method's time begins. The
 * worker leaves the port open until it answers: a port that closes before is how the crew learns that it died.
 */
export interface WorkerTask {
  readonly job: MethodJob;
  readonly started: MessagePort;
}

/** Seconds that a worker may take to load. */
const loadSeconds = 60;
/** Seconds that an answer may come after its worker's port closed. */
const partingSeconds = 1;

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
  const limits = new Set<Limit>();
  // A worker that had no job died: it could not be loaded, and jobs that wait for it would wait in vain.
  pool.on('error', (error) => {
    for (const limit of limits) limit.giveUp(died(error));
  });
  let closing = false;
  return {
    workers,
    async run(job) {
      const { budgetSeconds } = job.offer;
      const limit = startLimit(budgetSeconds);
      limits.add(limit);
      try {
        const task: WorkerTask = { job, started: limit.workerPort };
        const options = { signal: limit.signal, transferList: [limit.workerPort] };
        return (await pool.run(task, options)) as MethodAnswer;
      } catch (error) {
        if (closing) return { kind: 'lost', reason: 'interrupted', seconds: 0 };
        return limit.signal.aborted ? (limit.signal.reason as CrewResult) : died(error);
      } finally {
        limits.delete(limit);
        limit.clear();
      }
    },
    async close() {
      closing = true;
      await pool.destroy();
    },
  };
}

function died(error: unknown): CrewResult {
  return { kind: 'lost', reason: `its worker ended: ${firstLine(error)}`, seconds: 0 };
}

/** A job's time limit. */
interface Limit {
  /** Aborted when the job is given up; the reason is its `CrewResult`. */
  readonly signal: AbortSignal;
  readonly workerPort: MessagePort;
  /** Gives the job up, unless its worker said that it has started. */
  giveUp(result: CrewResult): void;
  clear(): void;
}

/** A time limit that begins to count when the worker says on its port that it has started. */
function startLimit(budgetSeconds: number): Limit {
  const late: CrewResult = {
    kind: 'lost',
    reason: `took longer than its budget of ${budgetSeconds} s`,
    seconds: budgetSeconds,
  };
  const controller = new AbortController();
  const { port1, port2 } = new MessageChannel();
  const end = (result: CrewResult) => controller.abort(result);
  let started = false;
  let timer = setTimeout(end, (loadSeconds + budgetSeconds) * 1000, late);
  const restart = (seconds: number, result: CrewResult) => {
    clearTimeout(timer);
    timer = setTimeout(end, seconds * 1000, result);
  };
  const onStart = () => {
    started = true;
    restart(budgetSeconds, late);
  };
  const onClose = () => restart(partingSeconds, died('it exited without an answer'));
  port1.once('message', onStart);
  port1.once('close', onClose);
  return {
    signal: controller.signal,
    workerPort: port2,
    giveUp: (result) => {
      if (!started) end(result);
    },
    clear: () => {
      port1.off('close', onClose);
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
