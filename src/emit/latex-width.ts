/**
 * How much room a piece of TeX mathematics takes at ten points in Computer Modern: what line breaking is decided by.
 * Invariant: the width of the TeX that this program writes is never underestimated (a test compares it with pdflatex),
 * so that a line that is found to fit does fit. Imports nothing.
 */

/** Points at a font size of ten. */
export interface Extent {
  readonly width: number;
  /** Above the base line. */
  readonly height: number;
  /** Below the base line. */
  readonly depth: number;
}

const numbers = (text: string): readonly number[] => text.split(' ').map(Number);
const named = (text: string): ReadonlyMap<string, number> =>
  new Map(text.split(' ').map((entry) => [entry.replace(/=\d+$/, ''), Number(/\d+$/.exec(entry)![0])]));
const words = (text: string): ReadonlySet<string> => new Set(text.split(' '));

/** Advance with italic correction in thousandths of the font size, A to Z and a to z: math italic. */
const ITALIC = numbers(
  '750 809 786 856 796 782 786 913 518 651 921 681 1079 912 791 781 791 767 671 723 792 806 1083 907 803 754 ' +
    '529 430 433 521 466 597 513 577 345 469 552 318 879 601 485 504 482 479 469 362 573 521 743 572 526 510',
);
/** The widest of the roman and typewriter letters. */
const UPRIGHT = numbers(
  '799 709 723 772 681 719 786 845 545 678 778 690 1201 821 797 696 817 848 606 723 751 764 1043 751 776 725 ' +
    '525 556 525 556 525 525 525 556 525 525 528 525 834 556 525 556 528 525 525 525 556 543 736 528 543 525',
);
const SIGNS = named(
  'alpha=644 beta=619 gamma=573 delta=482 epsilon=406 varepsilon=467 zeta=511 eta=533 theta=497 iota=354 kappa=577 ' +
    'lambda=584 mu=603 nu=558 xi=485 omicron=486 pi=607 rho=517 sigma=607 tau=551 upsilon=577 phi=596 varphi=655 ' +
    'chi=626 psi=688 omega=659 vartheta=592 varpi=857 varrho=518 varsigma=443 Gamma=755 Delta=834 Theta=791 Lambda=695 ' +
    'Xi=819 Pi=914 Sigma=839 Upsilon=779 Phi=723 Psi=779 Omega=824 partial=620 nabla=834 ell=418 hbar=577 infty=1000 ' +
    'prime=276 imath=323 jmath=385 star=500 ast=500 dagger=445 circ=500 bullet=500 sum=1445 int=1000 ldots=1173 ' +
    'dots=1173 cdots=1173',
);
/** An unknown command is taken to be this wide. */
const UNKNOWN = 1500;
/** Points, whatever the style. */
const SPACES = named('quad=10 qquad=20 enspace=5');
const THIN_SPACES: ReadonlyMap<string, number> = new Map([
  [',', 1.67],
  [':', 2.23],
  [';', 2.78],
  ['!', -1.66],
  [' ', 3.34],
]);
const BINARY = words('times cdot pm mp wedge');
const RELATIONS = words('equiv to rightarrow approx simeq sim propto neq ne le ge leq geq in mapsto');
const ACCENTS = words(
  'dot ddot dddot ddddot hat tilde bar vec check breve acute grave mathring widehat widetilde overline underline',
);
const FACES = words('mathrm mathsf mathtt text textrm operatorname mathnormal');
const BOLD_FACES = words('mathbf mathit boldsymbol mathbb mathfrak');
/** Width and height above the axis of the delimiters that \bigl and its like set. */
const GROWN: ReadonlyMap<string, readonly [width: number, reach: number]> = new Map([
  ['big', [4.6, 6]],
  ['Big', [6, 9]],
  ['bigg', [7.4, 12]],
  ['Bigg', [8, 15]],
]);
/** Display, text, script and scriptscript; small fonts are wider in proportion to their size. */
const SIZES = [1, 1, 0.83, 0.7];
const SCRIPT = 2;

type Kind = 'ordinary' | 'binary' | 'relation' | 'space';

interface Box extends Extent {
  readonly kind: Kind;
}

const EMPTY: Extent = { width: 0, height: 0, depth: 0 };
const LETTER_HEIGHT = 7;
const DEEP_LETTERS = 'gjpqyfQ';

/** A box from a width in thousandths of ten points. */
const box = (kind: Kind, thousandths: number, height = LETTER_HEIGHT, depth = 2.5): Box => ({
  kind,
  width: thousandths / 100,
  height,
  depth,
});

type Face = 'italic' | 'upright' | 'bold' | 'calligraphic';

/** Bold and text italic are this much wider than the wider of math italic and roman. */
const BOLD = 1.26;

function letterWidth(c: string, face: Face): number {
  const code = c.charCodeAt(0);
  const upper = code >= 65 && code <= 90;
  // The calligraphic font has arrows and ties where others have small letters and digits.
  if (face === 'calligraphic') return upper ? 1.28 * UPRIGHT[code - 65]! : 1000;
  const place = upper ? code - 65 : code >= 97 && code <= 122 ? code - 97 + 26 : -1;
  if (place >= 0 && face === 'bold') return BOLD * Math.max(UPRIGHT[place]!, ITALIC[place]!);
  if (place >= 0) return (face === 'upright' ? UPRIGHT : ITALIC)[place]!;
  if (code >= 48 && code <= 57) return face === 'bold' ? 650 : 525;
  return c === ' ' ? 334 : c === '.' || c === '/' ? 500 : 800;
}

class Reader {
  private at = 0;

  constructor(private readonly tex: string) {}

  /** Boxes up to the end or a closing brace, as one. */
  list(style: number, face: Face): Extent {
    const boxes: Box[] = [];
    for (;;) {
      if (face === 'italic') this.skipSpace();
      const c = this.tex[this.at];
      if (c === undefined || c === '}') return setInLine(boxes, style);
      if (c === '^' || c === '_') boxes.push(this.withScripts(boxes.pop() ?? box('ordinary', 0, 0, 0), style));
      else if (c === '&') this.at++;
      else boxes.push(this.nucleus(style, face));
    }
  }

  private skipSpace(): void {
    while (/\s/.test(this.tex[this.at] ?? '')) this.at++;
  }

  private withScripts(base: Box, style: number): Box {
    let { height, depth } = base;
    let extra = 0;
    for (let c = this.tex[this.at]; c === '^' || c === '_'; c = this.tex[this.at]) {
      this.at++;
      const script = this.argument(Math.min(3, Math.max(SCRIPT, style + 1)), 'italic');
      extra = Math.max(extra, script.width + 0.5);
      if (c === '^') height = Math.max(height, Math.max(4.2, base.height - 3.9) + script.height);
      else depth = Math.max(depth, Math.max(2.5, base.depth + 0.5) + script.depth);
      this.skipSpace();
    }
    return { kind: base.kind, width: base.width + extra, height, depth };
  }

  private argument(style: number, face: Face): Extent {
    this.skipSpace();
    if (this.at >= this.tex.length) return EMPTY;
    if (this.tex[this.at] !== '{') return this.nucleus(style, face);
    this.at++;
    const inner = this.list(style, face);
    this.at++;
    return inner;
  }

  private nucleus(style: number, face: Face): Box {
    const c = this.tex[this.at]!;
    if (c === '{') return { kind: 'ordinary', ...this.argument(style, face) };
    if (c === '\\') return this.command(style, face);
    this.at++;
    const size = SIZES[style]!;
    if (c === "'") return box('ordinary', 330, 7.6, 0);
    if ('+-*'.includes(c)) return box('binary', 778 * size, 5.9, 0.9);
    if ('=<>:'.includes(c)) return box('relation', 778 * size, 5.9, 0.9);
    if ('()[]|'.includes(c)) return box('ordinary', 390 * size, 7.5, 2.5);
    if (',;'.includes(c)) return box('ordinary', 278 * size + 167, 1, 2);
    return box(
      'ordinary',
      letterWidth(c, face) * size,
      LETTER_HEIGHT * size,
      DEEP_LETTERS.includes(c) ? 2.2 * size : 0,
    );
  }

  private command(style: number, face: Face): Box {
    const name = /^\\([A-Za-z]+|[^A-Za-z]?)/.exec(this.tex.slice(this.at, this.at + 40))![1]!;
    this.at += 1 + name.length;
    const size = SIZES[style]!;
    const space = SPACES.get(name) ?? THIN_SPACES.get(name);
    if (space !== undefined) return { kind: 'space', width: space, height: 0, depth: 0 };
    if (name === '\\' || name === '') return { kind: 'space', ...EMPTY };
    if (/^[dt]?frac$/.test(name)) return this.fraction(name, style);
    if (name === 'sqrt') {
      const inner = this.argument(style, 'italic');
      return { kind: 'ordinary', width: inner.width + 10, height: inner.height + 3, depth: inner.depth + 1 };
    }
    if (ACCENTS.has(name)) {
      const inner = this.argument(style, face);
      // Three and more dots are set as a box of their own.
      const width = Math.max(inner.width + 0.5, name.startsWith('ddd') ? 10.2 : 0);
      return {
        kind: 'ordinary',
        width,
        height: inner.height + 2.5,
        depth: inner.depth + (name === 'underline' ? 2 : 0),
      };
    }
    if (name === 'mathcal' || name === 'mathscr') return { kind: 'ordinary', ...this.argument(style, 'calligraphic') };
    if (BOLD_FACES.has(name)) return { kind: 'ordinary', ...this.argument(style, 'bold') };
    if (FACES.has(name)) return { kind: 'ordinary', ...this.argument(style, 'upright') };
    const grown = GROWN.get(name.replace(/[lrm]$/, ''));
    if (grown) {
      this.skipSpace();
      this.at += this.tex[this.at] === '\\' ? 2 : 1;
      return { kind: 'ordinary', width: grown[0], height: grown[1] + 2.5, depth: grown[1] - 2.5 };
    }
    if (BINARY.has(name)) return box('binary', 778 * size, 5.9, 0.9);
    if (RELATIONS.has(name)) return box('relation', 1000 * size, 5.9, 0.9);
    const weight = face === 'bold' ? BOLD : 1;
    return box('ordinary', (SIGNS.get(name) ?? UNKNOWN) * weight * size, LETTER_HEIGHT * size, 2.2 * size);
  }

  private fraction(name: string, style: number): Box {
    const large = name === 'dfrac' || (name === 'frac' && style === 0);
    const inner = large ? 1 : name === 'tfrac' ? SCRIPT : Math.min(3, Math.max(SCRIPT, style + 1));
    const top = this.argument(inner, 'italic');
    const bottom = this.argument(inner, 'italic');
    return {
      kind: 'ordinary',
      width: Math.max(top.width, bottom.width) + 2.5,
      height: (large ? 6.8 : 4) + top.height,
      depth: (large ? 6.9 : 3.5) + bottom.depth,
    };
  }
}

/** Boxes side by side. A sign without a left operand is set tight by TeX; assuming both its spaces errs on the safe side. */
function setInLine(boxes: readonly Box[], style: number): Extent {
  let width = 0;
  let height = 0;
  let depth = 0;
  for (const b of boxes) {
    width += b.width;
    if (style < SCRIPT) width += b.kind === 'binary' ? 4.46 : b.kind === 'relation' ? 5.56 : 0;
    height = Math.max(height, b.height);
    depth = Math.max(depth, b.depth);
  }
  return { width, height, depth };
}

/** Extent of TeX mathematics set in display style on one line. Alignment marks are ignored. */
export function extentOf(tex: string): Extent {
  const { width, height, depth } = new Reader(tex).list(0, 'italic');
  // The table is rounded to a thousandth.
  return { width: 1.003 * width, height, depth };
}

/** Width in points in display style. */
export const widthOf = (tex: string): number => extentOf(tex).width;
