/**
 * The two LaTeX files of a derivation: fragments for a manuscript and a document that compiles. Both need amsmath only,
 * fit the column of a two-column journal, and are ASCII.
 */
import { remember } from '../algebra/memo.js';
import type { Derivation } from '../derivation.js';
import { analogueSection, checksSection, couplingsSection } from './latex-analogue.js';
import { auxiliarySection } from './latex-auxiliary.js';
import { canonicalSection } from './latex-canonical.js';
import { constraintsSection, spinSection } from './latex-constrained.js';
import { covariantSection } from './latex-covariant.js';
import { type LatexOptions, type Passage, type Section, writerOf } from './latex-display.js';
import { everyKSection } from './latex-every-k.js';
import { framesSection, scalarsSection } from './latex-frames.js';
import { equationsSection, friedmannSection, reductionSection } from './latex-results.js';
import { commentText, escapeText, proseTex } from './latex-text.js';
import { geometrySection, theorySection } from './latex-theory.js';

export type { LatexDisplay, LatexOptions, Passage, Section } from './latex-display.js';

/**
 * The derivation in sections, step by step: what both files and the report are printed from.
 * @throws RangeError for variables that the geometry does not offer.
 */
export function latexSections(derivation: Derivation, options: LatexOptions = {}): readonly Section[] {
  let known = written.get(derivation);
  if (!known) {
    known = new Map();
    written.set(derivation, known);
  }
  return remember(known, options.variables ?? '', () => writeSections(derivation, options));
}

/** Two files and the report ask for the same sections. */
const written = new WeakMap<Derivation, Map<string, readonly Section[]>>();

function writeSections(derivation: Derivation, options: LatexOptions): readonly Section[] {
  const writer = writerOf(derivation, options);
  const sections = [
    theorySection(writer),
    geometrySection(writer),
    reductionSection(writer),
    equationsSection(writer),
    friedmannSection(writer),
    constraintsSection(writer),
    spinSection(writer),
    analogueSection(writer),
    everyKSection(writer),
    auxiliarySection(writer),
    scalarsSection(writer),
    framesSection(writer),
    canonicalSection(writer),
    covariantSection(writer),
    couplingsSection(writer),
    checksSection(writer),
  ];
  return sections.filter((s): s is Section => s !== undefined && s.passages.length > 0);
}

/** Sections whose displays a manuscript would take over. */
const FOR_MANUSCRIPTS: ReadonlySet<string> = new Set([
  'reduction',
  'equations',
  'friedmann',
  'constraints',
  'spin',
  'scalar-tensor',
  'every-k',
  'auxiliary',
  'frames',
  'canonical',
  'covariant',
]);

/** Labelled displays, ready to \\input into a manuscript. @throws as `latexSections`. */
export function equationsTex(derivation: Derivation, options: LatexOptions = {}): string {
  const head = [
    `% ${commentText(derivation.theory.name)}: equations to \\input into a manuscript. Needs \\usepackage{amsmath}.`,
    `% Labels begin with eq:${derivation.theory.slug}: and lines fit a column of 246pt.`,
  ];
  const blocks = latexSections(derivation, options)
    .filter((section) => FOR_MANUSCRIPTS.has(section.id))
    .flatMap(({ passages }) => passages)
    .filter(({ displays }) => displays.length > 0)
    .map(({ title, displays }) => [`% ${commentText(title)}`, ...displays.map((d) => d.copyTex)].join('\n'));
  return `${[head.join('\n'), ...blocks].join('\n\n')}\n`;
}

const PREAMBLE = `\\documentclass{article}
% The same file fits a two-column journal; only the line above changes, for instance to
%   \\documentclass[aps,prd,twocolumn]{revtex4-2}
\\usepackage{amsmath}
\\allowdisplaybreaks
\\setlength{\\emergencystretch}{3em}
\\raggedbottom`;

/** A document of its own. @throws as `latexSections`. */
export function derivationTex(derivation: Derivation, options: LatexOptions = {}): string {
  const sections = latexSections(derivation, options).map(sectionTex);
  return [
    PREAMBLE,
    '\\begin{document}',
    `\\title{Background equations of ${escapeText(derivation.theory.name)}}`,
    '\\author{}',
    '\\date{\\today}',
    '\\maketitle',
    '',
    ...sections,
    '\\end{document}',
    '',
  ].join('\n');
}

function sectionTex({ id, title, passages }: Section): string {
  const body = id === 'checks' ? passages.map(listTex).join('\n') : paragraphs(passages.flatMap(blocksOf));
  return [`\\section{${escapeText(title)}}`, body, ''].join('\n');
}

interface Block {
  readonly tex: string;
  readonly isDisplay: boolean;
}

const blocksOf = ({ text, displays, remarks }: Passage): Block[] => [
  ...text.map((p) => ({ tex: proseTex(p), isDisplay: false })),
  ...displays.map((d) => ({ tex: d.copyTex, isDisplay: true })),
  ...remarks.map((p) => ({ tex: proseTex(p), isDisplay: false })),
];

/** A display belongs to the paragraph before it, and text that begins in lower case goes on with the paragraph. */
function paragraphs(blocks: readonly Block[]): string {
  let out = '';
  for (const [i, { tex, isDisplay }] of blocks.entries())
    out += `${i === 0 ? '' : isDisplay || /^[a-z]/.test(tex) ? '\n' : '\n\n'}${tex}`;
  return out;
}

/** The first paragraph, then the others as a list. */
function listTex({ text }: Passage): string {
  const [first = [], ...rest] = text.map(proseTex);
  return [first, '\\begin{itemize}', ...rest.map((item) => `\\item ${item}`), '\\end{itemize}', ''].join('\n');
}
