import { describe, expect, it } from 'vitest';
import { readYaml, type YamlMap, type YamlNode, type YamlText } from '../../src/notation/yaml-source.js';
import { errorCodes, errorText } from './rendered.js';

const read = (text: string): YamlNode => readYaml(text, 'f.yaml');
const map = (text: string): YamlMap => read(text) as YamlMap;
const plain = (node: YamlNode): unknown => {
  if (node.kind === 'text') return node.text;
  if (node.kind === 'list') return node.items.map(plain);
  return [...node.entries].map(([key, { value }]) => [key, plain(value)]);
};
const errors = (text: string): string => errorText(() => read(text));

describe('readYaml', () => {
  it('keeps every scalar as the text that was typed', () => {
    expect(plain(read('a: 1.50\nb: true\nc: null\nd: 0x1F\ne: 1e3\nf: ~\ng: -+++\nh:\n'))).toEqual([
      ['a', '1.50'],
      ['b', 'true'],
      ['c', 'null'],
      ['d', '0x1F'],
      ['e', '1e3'],
      ['f', '~'],
      ['g', '-+++'],
      ['h', ''],
    ]);
  });

  it('reads collections, and keys that plain objects would lose', () => {
    expect(plain(read('__proto__: [x, { constructor: y }]\n'))).toEqual([['__proto__', ['x', [['constructor', 'y']]]]]);
  });

  it('gives every node its place', () => {
    const source = 'a: [x, "y z"]\nb: |\n  text\n';
    const { entries } = map(source);
    const at = (node: YamlNode): string => source.slice(node.origin.start, node.origin.end);
    const list = entries.get('a')!.value;
    expect(at(list)).toBe('[x, "y z"]');
    expect(list.kind === 'list' && list.items.map(at)).toEqual(['x', '"y z"']);
    expect(at(entries.get('b')!.key)).toBe('b');
    expect(at(entries.get('b')!.value)).toBe('|\n  text\n');
    expect((entries.get('b')!.value as YamlText).style).toBe('literal');
  });

  it('reports duplicate keys, anchors, aliases and tags together', () => {
    expect(errors('a: 1\na: 2\nb: &q 3\nc: *q\nd: !t 4\n')).toBe(
      [
        'f.yaml:2:1: error: the key a occurs twice',
        '    a: 2',
        '    ^',
        'hint: keep one of them',
        'f.yaml:3:7: error: YAML anchors are not allowed here',
        '    b: &q 3',
        '          ^',
        'hint: remove &q',
        'f.yaml:4:4: error: YAML aliases are not allowed here',
        '    c: *q',
        '       ^^',
        'hint: write the value out',
        'f.yaml:5:7: error: the YAML tag !t is not allowed here',
        '    d: !t 4',
        '          ^',
        'hint: remove it',
      ].join('\n'),
    );
  });

  it('refuses a merge key like any other unknown key, without merging', () => {
    expect(plain(read('<<: { a: 1 }\n'))).toEqual([['<<', [['a', '1']]]]);
  });

  it('says where a text stops being YAML', () => {
    expect(errors('a: [1\nb: 2\n')).toMatch(/^f\.yaml:2:1: error: not YAML: /);
    expect(errors('a:\n\t- b\n')).toBe(
      [
        'f.yaml:2:1: error: not YAML: tabs are not allowed as indentation',
        '    \t- b',
        '    ^',
        'hint: indent with spaces',
      ].join('\n'),
    );
    expect(errors('name: a: b\n')).toContain('hint: a text that contains a colon and a space must be quoted');
    expect(errors('name: a\n  b: c\n')).toContain('hint: check the indentation');
    for (const value of ['- 1/2 R', '{c0} R', '[c0] R', '@x', '*x R']) {
      expect(errors(`lagrangian: ${value}\n`)).toContain(
        'hint: a value that begins with this character needs single quotes',
      );
    }
    expect(errors('a: |\nR + R\nb: 1')).toContain('hint: close the quotes; indent the lines of a block');
    expect(errors('constants [c0]\na: b')).toContain('hint: a key is followed by a colon and a space');
    expect(errors('a: "\\q"\n')).toContain('use single quotes for LaTeX');
  });

  it('refuses LaTeX in double quotes that would silently be an escape', () => {
    expect(errors('a: "x \\\\frac \\nu_1 R"\n')).toBe(
      [
        'f.yaml:1:14: error: "\\nu" begins with the escape \\n, which is not LaTeX',
        '    a: "x \\\\frac \\nu_1 R"',
        '                 ^^^',
        'hint: in double quotes \\ begins an escape; use single quotes for LaTeX, or write \\\\',
      ].join('\n'),
    );
    for (const macro of ['alpha', 'beta', 'epsilon', 'frac', 'nu', 'rho', 'tau', 'varepsilon', 'Lambda', 'Phi']) {
      expect(errorCodes(() => read(`a: "\\${macro}"`))).toEqual(['yaml-escape']);
    }
    expect(plain(read('a: "x\\n y\\t\\\\nu \\"q\\""'))).toEqual([['a', 'x\n y\t\\nu "q"']]);
  });

  it.each([
    ['', 'yaml-empty'],
    ['# nothing\n', 'yaml-empty'],
    ['a: 1\n---\nb: 2\n', 'yaml-documents'],
    ['? [a, b]\n: 1\n', 'yaml-key'],
    ['{ [a]: b }', 'yaml-key'],
    ['"open', 'yaml-syntax'],
    ['}', 'yaml-syntax'],
    [`a: ${'x'.repeat(1_000_000)}`, 'size-limit'],
  ])('%j is refused', (text, code) => {
    expect(errorCodes(() => read(text))).toEqual([code]);
  });

  it.each([
    ['['.repeat(500_000)],
    ['{a: '.repeat(100_000)],
    ['- '.repeat(5000)],
    ['? '.repeat(5000)],
    [Array.from({ length: 900 }, (_, i) => `${' '.repeat(i)}a:`).join('\n')],
  ])('deep nesting ends in an error, not an overflow (%#)', (text) => {
    expect(errorCodes(() => read(text))).toEqual(['yaml-depth']);
  });

  it('does not mistake many entries on one line, or long indentation in a block text, for depth', () => {
    const flat = `{ ${Array.from({ length: 60 }, (_, i) => `k${i}: [a]`).join(', ')} }`;
    expect(map(flat).entries.size).toBe(60);
    expect(
      map(`a: |\n${Array.from({ length: 60 }, (_, i) => `${' '.repeat(i + 1)}x`).join('\n')}\n`).entries.size,
    ).toBe(1);
  });

  it('skips a byte-order mark without losing the place', () => {
    const text = map('\ufeffa: b').entries.get('a')!.value;
    expect(text.origin.start).toBe(4);
  });
});
