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

/** What is asked: antiderivatives of expressions in v1, written with integers and + - * / ^. Answered one by one. */
export interface IntegralQuestion {
  readonly library: 'algebrite';
  readonly integrands: readonly string[];
}

export type Question = FactorQuestion | IntegralQuestion;

/** The answer to one of several integrands. */
export interface IntegralAnswer {
  readonly index: number;
  readonly answer: Answer;
}

/** What comes back: the text of the library, or why there is none. */
export type Answer = { readonly reply: string } | { readonly fault: string };

const LIBRARIES: Readonly<Record<FactorQuestion['library'], (question: FactorQuestion) => Promise<string>>> = {
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

async function answer(work: () => Promise<string>): Promise<Answer> {
  try {
    const text = (await work()).trim();
    // Algebrite reports errors as text.
    return text.startsWith('Stop:') ? { fault: text } : { reply: text };
  } catch (error) {
    return { fault: error instanceof Error ? error.message : String(error) };
  }
}

const question = workerData as Question;
if ('integrands' in question) {
  for (const [index, integrand] of question.integrands.entries()) {
    const found = await answer(async () => (await import('algebrite')).default.run(`integral(${integrand},v1)`));
    parentPort?.postMessage({ index, answer: found } satisfies IntegralAnswer);
  }
} else parentPort?.postMessage(await answer(() => LIBRARIES[question.library](question)));
