/**
 * The thread in which a computer algebra package runs: one question, one message back, then it is over.
 * A thread of its own, because some questions never return and a failed one can spoil those after it.
 * The question holds integers and the names v1, v2, … only; it is composed by this program, not by a user.
 */
import { parentPort, workerData } from 'node:worker_threads';

/** What is asked: to factor a polynomial in some symbols, written with integers, names and + - * ^. */
export interface Question {
  readonly library: 'nerdamer' | 'algebrite';
  readonly polynomial: string;
  readonly symbols: readonly string[];
}

/** What comes back: the text of the library, or why there is none. */
export type Answer = { readonly reply: string } | { readonly fault: string };

const LIBRARIES: Readonly<Record<Question['library'], (question: Question) => Promise<string>>> = {
  async nerdamer({ polynomial }) {
    const { default: nerdamer } = await import('nerdamer/nerdamer.core.js');
    await import('nerdamer/Algebra.js');
    return nerdamer(`factor(${polynomial})`).toString();
  },
  async algebrite({ polynomial, symbols }) {
    const { default: algebrite } = await import('algebrite');
    return algebrite.run(`factor(${[polynomial, ...symbols].join(',')})`);
  },
};

async function answer(question: Question): Promise<Answer> {
  try {
    const text = (await LIBRARIES[question.library](question)).trim();
    // Algebrite reports errors as text.
    return text.startsWith('Stop:') ? { fault: text } : { reply: text };
  } catch (error) {
    return { fault: error instanceof Error ? error.message : String(error) };
  }
}

parentPort?.postMessage(await answer(workerData as Question));
