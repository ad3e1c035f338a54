/** File names and labels from the name of a theory. Imports nothing. */

const MAX_SLUG = 60;
const GREEK_NAMES =
  'alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi omicron pi rho sigma sigma tau upsilon phi chi psi omega'.split(
    ' ',
  );
const ALPHA = 0x3b1;
/** Letters that have no decomposition. */
const LETTERS: ReadonlyMap<string, string> = new Map([
  ['ß', 'ss'],
  ['ø', 'o'],
  ['æ', 'ae'],
  ['œ', 'oe'],
  ['ł', 'l'],
  ['đ', 'd'],
  ['ð', 'd'],
  ['þ', 'th'],
  ['ı', 'i'],
]);

/**
 * The name in ASCII letters, digits and single hyphens: `Harbour light` → `harbour-light`, `Größe α` → `grosse-alpha`;
 * `theory` when nothing is left. Safe as a file name and in a LaTeX label.
 */
export function slugOf(name: string): string {
  let slug = '';
  for (const c of name.normalize('NFKD').toLowerCase()) {
    const code = c.codePointAt(0)!;
    if (/[a-z0-9]/.test(c)) slug += c;
    else if (code >= ALPHA && code < ALPHA + GREEK_NAMES.length) slug += `-${GREEK_NAMES[code - ALPHA]}-`;
    else if (LETTERS.has(c)) slug += LETTERS.get(c);
    // Accents that the normalisation split off, and apostrophes, vanish; anything else parts words.
    else if (!/[\p{M}'’]/u.test(c)) slug += '-';
  }
  const trimmed = slug.replace(/-+/g, '-').replace(/^-|-$/g, '').slice(0, MAX_SLUG).replace(/-$/, '');
  return trimmed === '' ? 'theory' : trimmed;
}
