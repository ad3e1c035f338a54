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
import { ask } from './ask.js';
import { derivativeIn, FIELD_RING, FUNCTIONS, squaresTo, VARIABLE } from './elementary.js';
import { type Expression, ReplyError, readReply } from './reply.js';

export interface Antiderivative {
  /** In the variable `VARIABLE`. */
  readonly tree: Expression;
}

/** Someone who may know an antiderivative in v1. */
export type IntegralProposer = (integrand: string, timeLimitMs: number) => Promise<string | undefined>;

let calls = 0;
/** How often algebrite has been asked in this process. */
export const integralCalls = (): number => calls;

const algebrite: IntegralProposer = async (integrand, timeLimitMs) => {
  calls++;
  const answer = await ask({ library: 'algebrite', integrand }, timeLimitMs);
  return 'reply' in answer ? answer.reply : undefined;
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
 * An antiderivative of the root of the square; undefined when none was proposed within the time limit, or none that is one.
 * @param propose for tests; algebrite in a thread of its own when left out, and then the result is remembered.
 */
export function antiderivativeOf(
  square: SquaredIntegrand,
  { timeLimitMs, propose }: { readonly timeLimitMs: number; readonly propose?: IntegralProposer },
): Promise<Antiderivative | undefined> {
  if (propose) return proposed(square, timeLimitMs, propose);
  const key = integrandKey(square);
  const known = remembered.get(key) ?? proposed(square, timeLimitMs, algebrite);
  remembered.set(key, known);
  return known;
}

async function proposed(
  square: SquaredIntegrand,
  timeLimitMs: number,
  propose: IntegralProposer,
): Promise<Antiderivative | undefined> {
  const reply = await propose(integrandText(square), timeLimitMs);
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
