/**
 * Tests printed equations against a theory: on every branch of its equations, or on the one that the user names. What holds
 * for matter of any pressure holds for the matter of the theory, so that is tried first.
 */

import { symbolsOf } from '../algebra/collect.js';
import { infix } from '../algebra/infix.js';
import { remember } from '../algebra/memo.js';
import { equals, generator, isZero, type Poly } from '../algebra/poly.js';
import type { Derivation } from '../derivation.js';
import { errorAt, InputError } from '../notation/diagnostics.js';
import { plainPassage } from '../notation/passage.js';
import { type Branch, relationsOf } from './branches.js';
import { BoundError, boundIn } from './budget.js';
import { type Claim, readClaim } from './claim.js';
import { consequence, type Residual, type Verdict } from './consequence.js';
import { type Counterexample, counterexample } from './counterexample.js';
import { basesOf } from './factors.js';
import { identically } from './identity.js';
import type { JetSpace } from './jet-space.js';
import { RANKINGS, type RankingName } from './ranking.js';
import { type Repair, repairsOf } from './repair.js';
import { BOUNDS, type Bound, type Equations, equationsOf, type Solved, solve } from './system.js';
import { type Vocabulary, vocabularyOf } from './vocabulary.js';

export interface ClaimOptions {
  readonly claims: readonly string[];
  /** Definitions of symbols, each in terms of earlier ones. */
  readonly where?: readonly string[];
  /** Relations `x = y` and `x != y` that name a branch. */
  readonly branch?: readonly string[];
  /** Whether the matter may have any equation of state. */
  readonly anyMatter?: boolean;
  /** How far eliminations may go, a short try first; `BOUNDS` when absent. */
  readonly bounds?: readonly Bound[];
}

/** The verdict on one branch of the equations. */
export interface BranchVerdict {
  /** Relations that single the branch out; empty when there is only one. */
  readonly branch: readonly string[];
  readonly result: Verdict;
}

export interface ClaimReport {
  readonly claim: Claim;
  readonly verdict: 'holds' | 'fails' | 'undecided';
  /** Whether the verdict was reached for matter of any pressure. */
  readonly anyMatter: boolean;
  /** Whether an expansion rate vanishes on every solution. */
  readonly staticOnly: boolean;
  /** Why nothing was decided, when no branch was. */
  readonly reason: string | undefined;
  readonly branches: readonly BranchVerdict[];
  /** What left minus right comes to where the claim fails, in its simplest form. */
  readonly residual: Residual | undefined;
  readonly repairs: readonly Repair[];
  /** Particular couplings for which the claim fails, where the equations could not be solved for general ones. */
  readonly counterexample?: Counterexample;
}

/** A branch without solutions, with the relation between couplings that it would need. */
export interface Impossible {
  readonly branch: readonly string[];
  readonly needs: string;
}

export interface ClaimsReport {
  /** Relations of the user that name the branch. */
  readonly branch: readonly string[];
  readonly where: readonly string[];
  readonly impossible: readonly Impossible[];
  readonly claims: readonly ClaimReport[];
}

/**
 * @throws InputError for texts that cannot be read, and `no-solution` when the equations have none on the branch.
 */
export function decideClaims(d: Derivation, options: ClaimOptions): ClaimsReport {
  const { anyMatter = false, branch = [], where = [] } = options;
  const question = questionOf(d, options);
  const general = new Settlement(d, question, true);
  const own = anyMatter ? undefined : new Settlement(d, question, false);
  const claims = question.claims.map((claim): ClaimReport => {
    const first = general.report(claim);
    return !own || first.verdict === 'holds' ? first : combined(own.report(claim), first);
  });
  return { branch, where, impossible: (own?.used ? own : general).impossible(), claims };
}

/** The claims and what they are tested under, read once. */
interface Question {
  readonly vocabulary: Vocabulary;
  readonly claims: readonly Claim[];
  readonly branch: readonly string[];
  readonly zero: readonly { readonly name: string; readonly poly: Poly }[];
  readonly nonzero: readonly Poly[];
  readonly bounds: readonly Bound[];
}

function questionOf(d: Derivation, options: ClaimOptions): Question {
  const { claims, where = [], branch = [], bounds = BOUNDS } = options;
  const vocabulary = vocabularyOf(d, where);
  const chosen = branch.map((text) => readBranch(vocabulary, text));
  const equal = chosen.filter((c) => c.equal);
  return {
    vocabulary,
    claims: claims.map((text) => readClaim(vocabulary, text)),
    branch,
    bounds,
    zero: [...vocabulary.defining, ...equal].map(({ text, poly }) => ({ name: text, poly })),
    nonzero: chosen.filter((c) => !c.equal).flatMap((c) => basesOf(vocabulary.space, c.poly)),
  };
}

interface Attempt {
  readonly solved: Solved;
  readonly staticOnly: boolean;
}

/** The equations for one choice of matter, solved under one ranking after the other as far as claims need it. */
class Settlement {
  used = false;
  private readonly d: Derivation;
  private readonly question: Question;
  private readonly anyMatter: boolean;
  private readonly attempts = new Map<string, Attempt | BoundError>();

  constructor(d: Derivation, question: Question, anyMatter: boolean) {
    this.d = d;
    this.question = question;
    this.anyMatter = anyMatter;
  }

  /** The first answer that is none of "undecided". */
  report(claim: Claim): ClaimReport {
    this.used = true;
    let best: ClaimReport | undefined;
    for (const bound of this.question.bounds) {
      for (const ranking of RANKINGS) {
        const report = this.under(ranking, bound, claim);
        if (report.verdict !== 'undecided') return report;
        best = report;
      }
      // Equations too large to be solved may still have the claim for an obvious combination.
      const result = identically(this.equations([]), claim.poly, bound);
      if (result) return { ...best!, verdict: 'holds', reason: undefined, branches: [{ branch: [], result }] };
      const found = this.counterexample(claim, bound);
      if (found) return { ...best!, verdict: 'fails', reason: undefined, branches: [], counterexample: found };
    }
    return best!;
  }

  impossible(): Impossible[] {
    for (const attempt of this.attempts.values())
      if (!(attempt instanceof BoundError))
        return attempt.solved.solutions.deadEnds
          .filter((e) => symbolsOf(e.needs).length > 0)
          .map((e) => ({ branch: relationsOf(e), needs: `${infix(e.needs)} = 0` }));
    return [];
  }

  private under(ranking: RankingName, bound: Bound, claim: Claim): ClaimReport {
    const key = `${ranking} ${bound.products}`;
    const attempt = remember(this.attempts, key, () => this.solve(ranking, bound));
    const blank = { claim, anyMatter: this.anyMatter, staticOnly: false, residual: undefined, repairs: [] };
    if (attempt instanceof BoundError)
      return { ...blank, verdict: 'undecided', reason: `solving the equations needs ${attempt.message}`, branches: [] };
    const { solved, staticOnly } = attempt;
    const base = { ...blank, staticOnly };
    const { branches } = solved.solutions;
    for (const divisor of claim.divisors)
      if (branches.every((b) => consequence(solved, b, divisor).verdict === 'follows'))
        throw dividesByZero(claim, divisor);
    const results = branches.map((b): BranchVerdict => {
      const branch = this.relations(b);
      const result = consequence(solved, b, claim.poly);
      if (result.verdict !== 'follows') return { branch, result };
      // What singles the branch out is no further condition.
      const conditions = result.conditions.filter((c) => !branch.includes(c));
      return { branch, result: { ...result, conditions } };
    });
    const fails = branches.filter((_, i) => results[i]!.result.verdict === 'fails');
    const open = results.map((r) => r.result).find((r) => r.verdict === 'undecided');
    const verdict = fails.length > 0 ? 'fails' : open ? 'undecided' : 'holds';
    const others = branches.filter((b) => !fails.includes(b));
    return {
      ...base,
      verdict,
      reason: verdict === 'undecided' ? open?.reason : undefined,
      branches: results,
      residual: simplest(results.flatMap(({ result }) => (result.verdict === 'fails' ? [result.residual] : []))),
      repairs: fails.length > 0 ? repairsOf(solved, [...fails, ...others], claim) : [],
    };
  }

  /** The choices that the user did not make and that are not made everywhere. */
  private relations(branch: Branch): string[] {
    const { nonzero, vocabulary } = this.question;
    const assumed = [...nonzero, ...ratesOf(vocabulary.space)];
    return relationsOf({ ...branch, nonzero: branch.nonzero.filter((p) => !assumed.some((q) => equals(p, q))) });
  }

  /** Only where couplings are free: conditions and assumptions about them would have to be obeyed. */
  private counterexample({ poly }: Claim, bound: Bound): Counterexample | undefined {
    const { relations, theory } = this.d;
    if (relations.conditions.length > 0 || (theory.assumptions ?? []).length > 0) return undefined;
    const equations = this.equations(ratesOf(this.question.vocabulary.space));
    return counterexample(equations, poly, ['connection', 'expansion', 'matter'], bound);
  }

  private equations(more: readonly Poly[]): Equations {
    const { vocabulary, zero, nonzero } = this.question;
    return equationsOf(vocabulary.space, this.d, this.anyMatter, { zero, nonzero: [...nonzero, ...more] });
  }

  private solve(ranking: RankingName, bound: Bound): Attempt | BoundError {
    try {
      // Static universes are solutions of their own; they are looked at only where nothing else is left.
      const moving = solve(this.equations(ratesOf(this.question.vocabulary.space)), ranking, bound);
      if (moving.solutions.branches.length > 0) return { solved: moving, staticOnly: false };
      const all = solve(this.equations([]), ranking, bound);
      if (all.solutions.branches.length === 0) throw noSolution(this.question.branch, all);
      return { solved: all, staticOnly: true };
    } catch (error) {
      const refusal = boundIn(error);
      if (!refusal) throw error;
      return refusal;
    }
  }
}

const ratesOf = ({ rates, ring }: JetSpace): Poly[] =>
  [...new Set(rates.values())].filter((name) => ring.position.has(name)).map((name) => generator(ring, name));

function dividesByZero({ text }: Claim, divisor: Poly): InputError {
  const place = plainPassage(text, '--claim').locate(0, text.length);
  const message = `the claim divides by ${infix(divisor)}, which vanishes on the equations`;
  return new InputError([errorAt(place, 'division-by-zero', message, 'multiply the claim out')]);
}

function noSolution(branch: readonly string[], { solutions }: Solved): InputError {
  const where = branch.length === 0 ? '' : ` with ${branch.join(', ')}`;
  const wanted = solutions.deadEnds.map((e) => e.needs).filter((p) => symbolsOf(p).length > 0);
  const needs = [...new Set(wanted.map((p) => `${infix(p)} = 0`))].slice(0, 3).join(' or ');
  const hint = needs === '' ? 'every claim would follow' : `a solution would need ${needs}; impose it with --set`;
  const message = `the equations have no solution${where} for general couplings`;
  return new InputError([{ code: 'no-solution', severity: 'error', message, hint }]);
}

const weight = ({ top, bottom }: Residual): number => top.size + bottom.reduce((n, f) => n + f.base.size * f.power, 0);

const simplest = (residuals: readonly Residual[]): Residual | undefined =>
  residuals.reduce<Residual | undefined>((best, r) => (best && weight(best) <= weight(r) ? best : r), undefined);

/** The verdict for the theory's own matter, with what was seen better for any matter. */
function combined(own: ClaimReport, general: ClaimReport | undefined): ClaimReport {
  if (general?.verdict !== 'fails') return own;
  if (own.verdict === 'undecided') {
    const reason = `it does not hold for matter of any pressure; for the fluids of the theory ${own.reason}`;
    return { ...own, reason, residual: general.residual };
  }
  if (own.verdict !== 'fails') return own;
  const lone = general.branches.length === 1 && own.branches.length === 1;
  const residuals = [general.residual, own.residual].filter((r) => r !== undefined);
  return {
    ...own,
    residual: lone ? simplest(residuals) : own.residual,
    repairs: general.repairs.length > 0 ? general.repairs : own.repairs,
  };
}

interface ChosenBranch {
  readonly text: string;
  readonly poly: Poly;
  readonly equal: boolean;
}

/** `psi = 0` or `u != 0`. */
function readBranch(vocabulary: Vocabulary, text: string): ChosenBranch {
  const differs = /!=|\\neq?(?![A-Za-z])|≠/.exec(text);
  const written = differs ? `${text.slice(0, differs.index)}=${text.slice(differs.index + differs[0].length)}` : text;
  const { poly } = readClaim(vocabulary, written, '--branch');
  const folded = text.trim().replace(/\s+/g, ' ');
  const place = plainPassage(text, '--branch').locate(0, text.length);
  if (isZero(poly)) {
    const message = differs ? `${folded} can never hold` : `${folded} is an identity`;
    throw new InputError([errorAt(place, 'bad-branch', message, 'a branch is a relation such as psi = 0 or u != 0')]);
  }
  return { text: folded, poly, equal: differs === null };
}
