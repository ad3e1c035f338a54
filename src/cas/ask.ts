/**
 * Asks a computer algebra package one question, in a thread of its own and with a time limit.
 * Invariant: the packages are loaded in that thread only and only when asked; every fault comes back as a value, none is
 * thrown. What is asked of them and whether a reply is believed is not decided here.
 */
import { Worker } from 'node:worker_threads';
import type { Answer, FactorQuestion, IntegralAnswer, Question } from './worker.js';

export type { Answer, FactorQuestion as Question } from './worker.js';

/** Megabytes of heap after which the thread is given up. */
const MEMORY_LIMIT_MB = 512;

/** The compiled worker, seen alike from src/cas, dist/cas and the bundle in dist/chunks: a thread loads plain JavaScript only. */
const WORKER = new URL('../../dist/cas/worker.js', import.meta.url);

/** A thread that has been asked. */
const asked = (question: Question): Worker =>
  new Worker(WORKER, {
    workerData: question,
    // Options of the process, such as --input-type, are not for a file.
    execArgv: [],
    stdout: true,
    stderr: true,
    resourceLimits: { maxOldGenerationSizeMb: MEMORY_LIMIT_MB },
  });

/** The answer to a question, or the fault `time limit` after so many milliseconds, loading included. */
export function ask(question: FactorQuestion, timeLimitMs: number): Promise<Answer> {
  return new Promise((resolve) => {
    const worker = asked(question);
    const finish = (answer: Answer): void => {
      clearTimeout(timer);
      // Of several reports only the first counts; a promise is settled once.
      resolve(answer);
      void worker.terminate();
    };
    const timer = setTimeout(() => finish({ fault: 'time limit' }), timeLimitMs);
    worker.once('message', finish);
    worker.once('error', (error) => finish({ fault: error instanceof Error ? error.message : String(error) }));
    worker.once('exit', () => finish({ fault: 'no answer' }));
  });
}

/**
 * Antiderivatives in v1, all asked of one thread, one after the other: what was answered when the time was up or the thread
 * failed is kept.
 */
export function askIntegrals(integrands: readonly string[], timeLimitMs: number): Promise<readonly Answer[]> {
  return new Promise((resolve) => {
    const answers: Answer[] = integrands.map(() => ({ fault: 'no answer' }));
    const worker = asked({ library: 'algebrite', integrands });
    const finish = (): void => {
      clearTimeout(timer);
      resolve(answers);
      void worker.terminate();
    };
    const timer = setTimeout(finish, timeLimitMs);
    let open = integrands.length;
    worker.on('message', ({ index, answer }: IntegralAnswer) => {
      answers[index] = answer;
      if (--open === 0) finish();
    });
    worker.once('error', finish);
    worker.once('exit', finish);
  });
}
