/**
 * Long work that shows its progress and can be aborted. A long function is written once, as a generator that yields
 * its progress; its plain twin runs it through, its `…Async` twin runs it in slices and lets the host breathe.
 * @packageDocumentation
 */

/** What is asked of an abort signal: the host's own `AbortSignal` fits. @public */
export interface AbortSignalLike {
  readonly aborted: boolean;
  readonly reason?: unknown;
}

/** How far long work has come. @public */
export interface Progress {
  readonly done: number;
  readonly total: number;
  readonly stage: string;
}

/** Options of every `…Async` function. @public */
export interface LongWork {
  /** An abort rejects with `signal.reason`. */
  readonly signal?: AbortSignalLike | undefined;
  /** Called after each step of the work. */
  readonly onProgress?: ((progress: Progress) => void) | undefined;
}

const SLICE = 20; // ms of work between two breaths of the host

/**
 * Runs stepwise work to its end at once.
 *
 * @param steps - A generator that yields its progress and returns its result.
 * @returns The result.
 * @example
 * runThrough((function* () { yield { done: 0, total: 1, stage: 'count' }; return 7; })()); // 7
 * @public
 */
export function runThrough<T>(steps: Generator<Progress, T, void>): T {
  for (;;) {
    const next = steps.next();
    if (next.done) return next.value;
  }
}

/**
 * Runs stepwise work in slices of about 20 ms, so that the host stays awake.
 *
 * @param steps - A generator that yields its progress and returns its result.
 * @param work - Signal and progress.
 * @returns The result; rejects with `signal.reason` after an abort.
 * @example
 * await runInSlices((function* () { yield { done: 0, total: 1, stage: 'count' }; return 7; })()); // 7
 * @public
 */
export async function runInSlices<T>(
  steps: Generator<Progress, T, void>,
  work: LongWork = {},
): Promise<T> {
  const host = globalThis as { setTimeout?: (call: () => void, ms: number) => unknown };
  let began = Date.now();
  for (;;) {
    if (work.signal?.aborted) {
      throw work.signal.reason ?? new Error('aborted');
    }
    const next = steps.next();
    if (next.done) return next.value;
    work.onProgress?.(next.value);
    if (Date.now() - began < SLICE) continue;
    await new Promise<void>((resolve) => {
      if (host.setTimeout) host.setTimeout(resolve, 0);
      else resolve();
    });
    began = Date.now();
  }
}
