/**
 * Antiderivatives of roots of rational functions of one variable. Algebrite proposes; the kernel differentiates the proposal
 * and compares squares exactly. Invariant: the square of the derivative of what is returned is the given square, wherever
 * the roots in it are real. Calls are counted, and an integrand is asked for once in a process.
 */
import { infix } from '../algebra/infix.js';
import {
  factorPoly,
  integrandKey,
  radicandOf,
  type SquaredIntegrand,
  squareAsFraction,
} from '../algebra/squared-integrand.js';
import { askIntegrals } from './ask.js';
import { derivativeIn, FIELD_RING, FUNCTIONS, squaresTo, VARIABLE } from './elementary.js';
import { type Expression, ReplyError, readReply } from './reply.js';

export interface Antiderivative {
  /** In the variable `VARIABLE`. */
  readonly tree: Expression;
}

/** Someone who may know antiderivatives in v1: one answer or none for each integrand. */
export type IntegralProposer = (
  integrands: readonly string[],
  timeLimitMs: number,
) => Promise<readonly (string | undefined)[]>;

let calls = 0;
/** How many integrands algebrite has been asked for in this process. */
export const integralCalls = (): number => calls;

const algebrite: IntegralProposer = async (integrands, timeLimitMs) => {
  calls += integrands.length;
  const answers = await askIntegrals(integrands, timeLimitMs);
  return answers.map((answer) => ('reply' in answer ? answer.reply : undefined));
};

/** The positive root as text: rational powers with denominator 2 only where the exponent is odd. */
export function integrandText({ power, factors }: SquaredIntegrand): string {
  const exponentText = (n: number): string => (n % 2 === 0 ? `(${n / 2})` : `(${n}/2)`);
  const pieces = factors.map(
    ({ coefficients, exponent }) =>
      `(${infix(factorPoly(FIELD_RING, VARIABLE, coefficients))})^${exponentText(exponent)}`,
  );
  return [...(power === 0 ? [] : [`${VARIABLE}^${exponentText(power)}`]), ...pieces].join('*') || '1';
}

const remembered = new Map<string, Promise<Antiderivative | undefined>>();

/**
 * Antiderivatives of the roots of some squares, one for each; undefined where none was proposed within the time limit, or
 * none that is one.
 * @param propose for tests; algebrite in a thread of its own when left out, and then the results are remembered.
 */
export function antiderivativesOf(
  squares: readonly SquaredIntegrand[],
  { timeLimitMs, propose }: { readonly timeLimitMs: number; readonly propose?: IntegralProposer },
): Promise<readonly (Antiderivative | undefined)[]> {
  if (propose) return proposed(squares, timeLimitMs, propose);
  const fresh = new Map(squares.map((s) => [integrandKey(s), s] as const).filter(([key]) => !remembered.has(key)));
  if (fresh.size > 0) {
    const all = proposed([...fresh.values()], timeLimitMs, algebrite);
    [...fresh.keys()].forEach((key, i) => {
      remembered.set(
        key,
        all.then((found) => found[i]),
      );
    });
  }
  return Promise.all(squares.map((s) => remembered.get(integrandKey(s))));
}

async function proposed(
  squares: readonly SquaredIntegrand[],
  timeLimitMs: number,
  propose: IntegralProposer,
): Promise<readonly (Antiderivative | undefined)[]> {
  const replies = await propose(squares.map(integrandText), timeLimitMs);
  return squares.map((square, i) => verified(square, replies[i]));
}

function verified(square: SquaredIntegrand, reply: string | undefined): Antiderivative | undefined {
  if (reply === undefined) return undefined;
  try {
    const tree = readReply(reply, FUNCTIONS);
    return isAntiderivative(tree, square) ? { tree } : undefined;
  } catch (error) {
    if (error instanceof ReplyError || error instanceof RangeError) return undefined;
    throw error;
  }
}

/** Whether the square of the derivative of a tree is the given one. */
export function isAntiderivative(tree: Expression, square: SquaredIntegrand): boolean {
  const r = radicandOf(square, FIELD_RING, VARIABLE);
  const slope = derivativeIn(tree, r);
  return slope !== undefined && squaresTo(slope, r, squareAsFraction(square, FIELD_RING, VARIABLE));
}
