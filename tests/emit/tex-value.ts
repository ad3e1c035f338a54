/**
 * Exact value of TeX mathematics as this program writes it: sums, products by juxtaposition, fractions, powers, brackets
 * of any size, over symbols whose TeX is given. A reader of its own, so that a glued or lost symbol is found.
 */
import {
  addRational,
  divideRational,
  multiplyRational,
  negateRational,
  powerRational,
  type Rational,
  rational,
} from '../../src/algebra/rational.js';

export type TexSymbols = ReadonlyMap<string, Rational>;

/** Layout without meaning: alignment, line ends, spaces, empty groups. */
const withoutLayout = (tex: string): string =>
  tex
    .replace(/\\label\{[^}]*\}|\\(?:begin|end)\{(?:equation|align|split)\}|\\notag|\\q?quad(?![A-Za-z])/g, ' ')
    .replace(/\\\\|&|\{\}/g, ' ')
    .replace(/\\(?:big|Big)[lr](?![A-Za-z])/g, '')
    .trim();

/** The two sides of an equation; a trailing `= 0` is left out. */
export function sidesOf(display: string): { left: string; right: string } {
  const sides = withoutLayout(display).split(' =');
  if (sides.length > 2 && sides[2]!.trim() !== '0') throw new Error(`more than one relation: ${display}`);
  return { left: sides[0]!.trim(), right: sides[1]!.trim() };
}

class TexReader {
  private at = 0;
  private readonly names: readonly string[];

  constructor(
    private readonly tex: string,
    private readonly symbols: TexSymbols,
  ) {
    this.names = [...symbols.keys()].sort((a, b) => b.length - a.length);
  }

  whole(): Rational {
    const value = this.sum();
    if (this.at < this.tex.length) this.fail();
    return value;
  }

  private fail(): never {
    throw new Error(`cannot read ${this.tex.slice(this.at, this.at + 40)}`);
  }

  private space(): void {
    while (this.tex[this.at] === ' ' || this.tex[this.at] === '\n') this.at++;
  }

  private take(text: string): boolean {
    this.space();
    const found = this.tex.startsWith(text, this.at);
    if (found) this.at += text.length;
    return found;
  }

  private sum(): Rational {
    let total = this.take('-') ? negateRational(this.product()) : this.product();
    for (;;) {
      if (this.take('+')) total = addRational(total, this.product());
      else if (this.take('-')) total = addRational(total, negateRational(this.product()));
      else return total;
    }
  }

  private product(): Rational {
    let value = this.power();
    for (;;) {
      this.take('\\times');
      this.space();
      const c = this.tex[this.at];
      if (c === undefined || '+-)}'.includes(c)) return value;
      value = multiplyRational(value, this.power());
    }
  }

  private power(): Rational {
    const base = this.base();
    if (!this.take('^{')) return base;
    const digits = /^-?\d+/.exec(this.tex.slice(this.at))![0];
    this.at += digits.length;
    if (!this.take('}')) this.fail();
    return powerRational(base, Number(digits));
  }

  private group(open: string, close: string): Rational {
    if (!this.take(open)) this.fail();
    const value = this.sum();
    if (!this.take(close)) this.fail();
    return value;
  }

  private base(): Rational {
    this.space();
    if (this.take('\\frac') || this.take('\\tfrac')) return divideRational(this.group('{', '}'), this.group('{', '}'));
    const name = this.names.find((n) => this.tex.startsWith(n, this.at) && !this.runsOn(n));
    if (name !== undefined) {
      this.at += name.length;
      return this.symbols.get(name)!;
    }
    if (this.tex[this.at] === '(') return this.group('(', ')');
    const digits = /^\d+/.exec(this.tex.slice(this.at))?.[0];
    if (digits === undefined) this.fail();
    this.at += digits.length;
    return rational(BigInt(digits));
  }

  /** Whether TeX would read further letters into a command, or a subscript into a symbol. */
  private runsOn(name: string): boolean {
    const next = this.tex[this.at + name.length] ?? '';
    return next === '_' || (/\\[A-Za-z]+$/.test(name) && /[A-Za-z]/.test(next));
  }
}

/** @throws Error at what cannot be read. */
export const texValue = (tex: string, symbols: TexSymbols): Rational =>
  new TexReader(withoutLayout(tex), symbols).whole();
