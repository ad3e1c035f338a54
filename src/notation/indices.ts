/**
 * Einstein's rule on the syntax tree: in every product an index occurs once (free) or twice, once up and once down; summands
 * of one bracket have the same free indices; the Lagrangian and the base of a power have none. Indices contracted inside
 * a bracket belong to that bracket, so (R + T_a T^a)(R + A_a A^a) is in order.
 */
import { type Diagnostic, errorAt } from './diagnostics.js';
import type { Passage } from './passage.js';
import type { Expression, SlotNode, Span } from './syntax.js';

/** Free indices by name; undefined when they are unknown because of an error already reported. */
type Free = ReadonlyMap<string, SlotNode> | undefined;

const NONE: Free = new Map();
const TIMES = ['', 'once', 'twice', 'three times', 'four times', 'five times', 'six times'];

/**
 * Every offence against the rule, in the order of the text; at most one for each index of a term.
 * @param allowFree whether the whole may have free indices, the same in every summand.
 */
export function checkIndices(expression: Expression, passage: Passage, allowFree = false): readonly Diagnostic[] {
  const checker = new IndexChecker(passage);
  if (allowFree) {
    checker.free(expression);
    return checker.problems;
  }
  const summands = expression.kind === 'sum' ? expression.summands.map((s) => s.value) : [expression];
  for (const summand of summands) checker.requireScalar(checker.free(summand));
  return checker.problems;
}

class IndexChecker {
  readonly problems: Diagnostic[] = [];
  private readonly passage: Passage;

  constructor(passage: Passage) {
    this.passage = passage;
  }

  requireScalar(free: Free): void {
    const [first, ...more] = free?.values() ?? [];
    if (first === undefined) return;
    const names = [first, ...more].map((slot) => slot.name).join(', ');
    const message =
      more.length === 0
        ? `index ${names} is free: it occurs once in its term`
        : `indices ${names} are free: each occurs once in its term`;
    this.report(
      'free-index',
      first,
      message,
      `the Lagrangian is a scalar; contract ${first.name} with one ${other(first)}`,
    );
  }

  free(node: Expression): Free {
    switch (node.kind) {
      case 'integer':
      case 'symbol':
        return NONE;
      case 'tensor':
        return this.contract(node.slots);
      case 'product':
        return this.freeOfProduct(node);
      case 'sum':
        return this.freeOfSum(node);
      case 'power': {
        const free = this.free(node.base);
        const first = free?.values().next().value;
        if (first !== undefined) {
          const message = `the base of this power has the free index ${first.name}`;
          this.report('power-of-tensor', node, message, 'powers stand on scalars, as in (T_a T^a)^2');
          return undefined;
        }
        return free;
      }
    }
  }

  private freeOfProduct(node: Expression & { kind: 'product' }): Free {
    const slots: SlotNode[] = [];
    let known = true;
    for (const { divides, value } of node.factors) {
      // A tensor in a divisor is refused as such when the product is multiplied out.
      if (divides) continue;
      if (value.kind === 'tensor') slots.push(...value.slots);
      else {
        const free = this.free(value);
        if (free === undefined) known = false;
        else slots.push(...free.values());
      }
    }
    const free = this.contract(slots);
    return known ? free : undefined;
  }

  private freeOfSum(node: Expression & { kind: 'sum' }): Free {
    let first: Free;
    let failed = false;
    for (const [i, { value }] of node.summands.entries()) {
      const free = this.free(value);
      if (free === undefined) failed = true;
      if (i === 0) first = free;
      else if (free !== undefined && first !== undefined && !sameIndices(first, free)) {
        const message = `the summands differ in their free indices: ${list(free)} here, ${list(first)} in the first`;
        this.report(
          'free-indices-differ',
          value,
          message,
          'every summand must carry the same free indices at the same heights',
        );
        failed = true;
      }
    }
    return failed ? undefined : first;
  }

  /** Free indices of the slots of one product. */
  private contract(slots: readonly SlotNode[]): Free {
    const byName = new Map<string, SlotNode[]>();
    for (const slot of slots) {
      const before = byName.get(slot.name);
      if (before === undefined) byName.set(slot.name, [slot]);
      else before.push(slot);
    }
    const free = new Map<string, SlotNode>();
    let failed = false;
    for (const [name, found] of byName) {
      const [first, second, third] = found;
      if (third !== undefined) {
        const times = TIMES[found.length] ?? `${found.length} times`;
        this.report(
          'index-repeated',
          third,
          `index ${name} appears ${times}`,
          'a contracted index occurs exactly twice; rename one pair',
        );
        failed = true;
      } else if (second === undefined) {
        free.set(name, first!);
      } else if (first!.up === second.up) {
        const height = second.up ? 'up' : 'down';
        const message = `both indices ${name} are ${height}`;
        this.report(
          'index-heights',
          second,
          message,
          `a contracted pair has one index up and one down: write ${other(second)} here`,
        );
        failed = true;
      }
    }
    return failed ? undefined : free;
  }

  private report(code: string, span: Span, message: string, hint: string): void {
    this.problems.push(errorAt(this.passage.locate(span.start, span.end), code, message, hint));
  }
}

/** The index as it would be typed at the other height. */
const other = (slot: SlotNode): string => `${slot.up ? '_' : '^'}${slot.name}`;

const sameIndices = (a: ReadonlyMap<string, SlotNode>, b: ReadonlyMap<string, SlotNode>): boolean =>
  a.size === b.size && [...a].every(([name, slot]) => b.get(name)?.up === slot.up);

const list = (free: ReadonlyMap<string, SlotNode>): string =>
  free.size === 0 ? 'none' : [...free.values()].map((s) => `${s.up ? '^' : '_'}${s.name}`).join(' ');
