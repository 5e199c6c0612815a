import { Presets, SingleBar } from 'cli-progress';
import { remark } from './terminal.js';

/** Shows how far a rehearsal is: a bar on a terminal, a plain line now and then elsewhere. */
export interface Progress {
  /** Tells that one more cell is finished. */
  advance(failed: boolean): void;
  stop(): void;
}

/** Seconds between two plain lines. */
const lineSeconds = 10;

/** Starts showing progress on standard error. `done` of `total` cells were finished before. */
export function startProgress(total: number, done: number): Progress {
  return process.stderr.isTTY ? new ProgressBar(total, done) : new ProgressLines(total, done);
}

class ProgressBar implements Progress {
  readonly #bar: SingleBar;
  readonly #pace: Pace;
  #failed = 0;

  constructor(total: number, done: number) {
    this.#pace = new Pace(total, done);
    this.#bar = new SingleBar(
      {
        format: '  {bar} {value}/{total} cells, {failed} failed, {left} left',
        clearOnComplete: true,
        barsize: 30,
        hideCursor: true,
      },
      Presets.shades_classic,
    );
    this.#bar.start(total, done, { failed: 0, left: '?' });
  }

  advance(failed: boolean): void {
    this.#failed += Number(failed);
    this.#pace.advance();
    this.#bar.update(this.#pace.done, { failed: this.#failed, left: this.#pace.left() });
  }

  stop(): void {
    this.#bar.stop();
  }
}

class ProgressLines implements Progress {
  readonly #pace: Pace;
  #failed = 0;
  #lastLine = performance.now();

  constructor(total: number, done: number) {
    this.#pace = new Pace(total, done);
  }

  advance(failed: boolean): void {
    this.#failed += Number(failed);
    this.#pace.advance();
    const now = performance.now();
    if (now - this.#lastLine < lineSeconds * 1000 && this.#pace.done < this.#pace.total) return;
    this.#lastLine = now;
    const { done, total } = this.#pace;
    remark(`${done}/${total} cells, ${this.#failed} failed, ${this.#pace.left()} left`);
  }

  stop(): void {}
}

/** How many cells are done, and how long the rest may take at the pace so far. */
class Pace {
  readonly total: number;
  readonly #start = performance.now();
  readonly #before: number;
  done: number;

  constructor(total: number, done: number) {
    this.total = total;
    this.#before = done;
    this.done = done;
  }

  advance(): void {
    this.done += 1;
  }

  left(): string {
    const secondsEach = (performance.now() - this.#start) / 1000 / Math.max(1, this.done - this.#before);
    return describeSeconds(secondsEach * (this.total - this.done));
  }
}

/** Seconds in the two largest units that matter: `40 s`, `3 min 20 s`, `2 h 5 min`. */
export function describeSeconds(seconds: number): string {
  const whole = Math.round(seconds);
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return `${Math.floor(whole / 60)} min ${whole % 60} s`;
  return `${Math.floor(whole / 3600)} h ${Math.floor((whole % 3600) / 60)} min`;
}
