/**
 * Numbers of invariants by characters of O(4), which has the invariants of the Lorentz group: torsion is vector ⊗ Λ²,
 * curvature Λ² ⊗ Λ². The number of invariants in a product of symmetric powers is the mean of its character over the
 * group. SO(4): rotation by α and β in two planes, weight (cos α − cos β)². The other component: eigenvalues
 * 1, −1, e^{±iθ}, weight sin²θ. Even invariants are half the sum of the two means, odd ones half the difference. The
 * characters are trigonometric polynomials, for which the mean over a fine enough grid is exact.
 */

/** Power sums of the eigenvalues of an element in the vector representation: p(n) = tr gⁿ. */
type PowerSums = (n: number) => number;
type Character = (p: PowerSums, n: number) => number;

const vector: Character = (p, n) => p(n);
/** tr Λ²(gⁿ) = ½[(tr gⁿ)² − tr g²ⁿ]. */
const twoForm: Character = (p, n) => (p(n) ** 2 - p(2 * n)) / 2;

const CHARACTERS = {
  torsion: (p: PowerSums, n: number) => vector(p, n) * twoForm(p, n),
  curvature: (p: PowerSums, n: number) => twoForm(p, n) ** 2,
} satisfies Record<string, Character>;

export type Content = Readonly<Partial<Record<keyof typeof CHARACTERS, number>>>;

/** Character of the k-th symmetric power by Newton's identity k h_k = Σ_{n=1}^{k} χ(gⁿ) h_{k−n}. */
function symmetricPower(chi: (n: number) => number, k: number): number {
  const h = [1];
  for (let m = 1; m <= k; m++) {
    let total = 0;
    for (let n = 1; n <= m; n++) total += chi(n) * h[m - n]!;
    h.push(total / m);
  }
  return h[k]!;
}

const character = (content: Content, p: PowerSums): number =>
  (['torsion', 'curvature'] as const).reduce(
    (product, kind) => product * symmetricPower((n) => CHARACTERS[kind](p, n), content[kind] ?? 0),
    1,
  );

/** Even and odd invariants of that content. */
export function invariantCounts(content: Content): { readonly even: number; readonly odd: number } {
  // Degrees in e^{iα}: three for each torsion, four for each curvature, two for the weight.
  const degree = 3 * (content.torsion ?? 0) + 4 * (content.curvature ?? 0) + 4;
  const grid = Array.from({ length: 2 * degree + 1 }, (_, i) => (2 * Math.PI * i) / (2 * degree + 1));
  let rotations = 0;
  let volume = 0;
  for (const a of grid)
    for (const b of grid) {
      const weight = (Math.cos(a) - Math.cos(b)) ** 2;
      volume += weight;
      rotations += weight * character(content, (n) => 2 * Math.cos(n * a) + 2 * Math.cos(n * b));
    }
  let reflections = 0;
  let length = 0;
  for (const t of grid) {
    const weight = Math.sin(t) ** 2;
    length += weight;
    reflections += weight * character(content, (n) => 1 + (-1) ** n + 2 * Math.cos(n * t));
  }
  const [all, difference] = [rotations / volume, reflections / length];
  return { even: (all + difference) / 2, odd: (all - difference) / 2 };
}
