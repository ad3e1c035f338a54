/** Displays that KaTeX refuses, with its message. */
import katex from 'katex';
import type { Section } from '../../src/emit/latex.js';

export const typesetFaults = (sections: readonly Section[]): string[] =>
  sections.flatMap(({ passages }) =>
    passages.flatMap(({ displays }) =>
      displays.flatMap(({ label, tex }) => {
        try {
          katex.renderToString(tex, { displayMode: true, throwOnError: true, output: 'mathml', maxExpand: 1e6 });
          return [];
        } catch (error) {
          return [`${label}: ${error instanceof Error ? error.message : String(error)}`];
        }
      }),
    ),
  );
