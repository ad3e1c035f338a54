import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readYaml, type YamlText } from '../../src/notation/yaml-source.js';
import { passageOf } from '../../src/notation/yaml-text.js';

/** The value of the only key of the file. */
function value(source: string): YamlText {
  const node = readYaml(source, 'f');
  if (node.kind !== 'map') throw new Error('not a map');
  return [...node.entries.values()][0]!.value as YamlText;
}

/** What the file has at the place of `needle` in the text. */
function found(source: string, needle: string): string {
  const passage = passageOf(value(source));
  const start = passage.text.indexOf(needle);
  expect(start).toBeGreaterThanOrEqual(0);
  const { start: from, end } = passage.locate(start, start + needle.length);
  return source.slice(from, end);
}

describe('passageOf', () => {
  it.each([
    ['plain', 'k: ab XY cd\n'],
    ['plain over lines', 'k: ab\n  cd\n\n  XY ef\n'],
    ['single quotes', "k: 'it''s XY'\n"],
    ['single quotes over lines', "k: 'it''s\n\n   a XY'\n"],
    ['double quotes', 'k: "a\\t b \\u0041\\x41 \\\\ XY"\n'],
    ['double quotes over lines', 'k: "a \\\n   b\n\n  \\  c XY"\n'],
    ['literal', 'k: |\n  ab\n    cd\n\n  e XY\n'],
    ['literal, strip', 'k: |-\n  ab\n  XY\n\n\n'],
    ['literal, keep', 'k: |+\n  ab\n  XY\n\n\n'],
    ['literal, explicit indentation', 'k: |2\n    ab\n  XY\n'],
    ['literal, comment in header', 'k: | # comment XY\n  ab\n  c XY\n'],
    ['literal, carriage returns', 'k: |\r\n  ab\r\n   c XY\r\n'],
    ['literal, tabs', 'k: |\n  \tab\n  \t XY\n'],
    ['literal without final newline', 'k: |\n  ab\n  XY'],
    ['folded', 'k: >\n  ab\n  cd\n\n  e XY\n'],
    ['folded, more indented lines', 'k: >-\n  ab\n\n    cd\n    XY\n  ef\n'],
    ['folded, carriage returns', 'k: >\r\n  ab\r\n  XY\r\n'],
    ['in a flow collection', '{ k: "a XY" }'],
    ['astral letters', 'k: "𝒜 \\U0001D49C XY"\n'],
  ])('finds the characters of a scalar: %s', (_, source) => {
    expect(found(source, 'XY')).toBe('XY');
  });

  it('finds an escape as a whole start', () => {
    const passage = passageOf(value('k: "a\\u0062c"'));
    expect(passage.text).toBe('abc');
    expect(passage.locate(1, 2).start).toBe(5);
    expect(passage.locate(2, 3).start).toBe(11);
  });

  it('places the end of the text behind its last character', () => {
    const source = 'k: abc\n';
    expect(passageOf(value(source)).locate(3, 3)).toMatchObject({ start: 6, end: 6 });
  });

  it('an empty scalar is placed where it stands', () => {
    expect(passageOf(value('k: ""\n')).locate(0, 0)).toMatchObject({ start: 3, end: 5 });
  });

  const word = fc.stringMatching(/^[a-z+(]{1,4}$/);
  const line = fc.array(word, { minLength: 1, maxLength: 4 }).map((words) => words.join(' '));
  it('maps every visible character to an equal one, whatever the style', () => {
    fc.assert(
      fc.property(
        fc.array(fc.oneof(line, fc.constant('')), { minLength: 1, maxLength: 6 }),
        fc.constantFrom('|', '|-', '|+', '>', '>-', '>+', '"', "'"),
        fc.constantFrom('\n', '\r\n'),
        (lines, style, newline) => {
          const body = ['w', ...lines, 'z'].map((l) => (l === '' ? '' : `  ${l}`)).join(newline);
          const quoted = style === '"' || style === "'";
          const source = quoted ? `k: ${style}${body}${style}${newline}` : `k: ${style}${newline}${body}${newline}`;
          const passage = passageOf(value(source));
          for (let i = 0; i < passage.text.length; i++) {
            if (passage.text[i]!.trim() === '') continue;
            expect(source[passage.locate(i, i + 1).start]).toBe(passage.text[i]);
          }
        },
      ),
    );
  });
});
