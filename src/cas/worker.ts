/**
 * The thread in which a computer algebra package runs: one question, one message back, then it is over.
 * A thread of its own, because some questions never return and a failed one can spoil those after it.
 * The question holds integers and the names v1, v2, … only; it is composed by this program, not by a user.
 */
import { parentPort, workerData } from 'node:worker_threads';

/** What is asked: to factor a polynomial in some symbols, written with integers, names and + - * ^. */
export interface FactorQuestion {
  readonly library: 'nerdamer' | 'algebrite';
  readonly polynomial: string;
  readonly symbols: readonly string[];
}

/** What is asked: an antiderivative of an expression in v1, written with integers and + - * / ^. */
export interface IntegralQuestion {
  readonly library: 'algebrite';
  readonly integrand: string;
}

export type Question = FactorQuestion | IntegralQuestion;

/** What comes back: the text of the library, or why there is none. */
export type Answer = { readonly reply: string } | { readonly fault: string };

const LIBRARIES: Readonly<Record<Question['library'], (question: Question) => Promise<string>>> = {
  async nerdamer(question) {
    if ('integrand' in question) throw new Error('nerdamer is not asked for antiderivatives');
    const { polynomial } = question;
    const { default: nerdamer } = await import('nerdamer/nerdamer.core.js');
    await import('nerdamer/Algebra.js');
    return nerdamer(`factor(${polynomial})`).toString();
  },
  async algebrite(question) {
    const { default: algebrite } = await import('algebrite');
    if ('integrand' in question) return algebrite.run(`integral(${question.integrand},v1)`);
    const { polynomial, symbols } = question;
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
