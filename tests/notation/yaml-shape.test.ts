import { describe, expect, it } from 'vitest';
import { type Diagnostic, renderDiagnostic } from '../../src/notation/diagnostics.js';
import { asList, asMap, asRecord, asText } from '../../src/notation/yaml-shape.js';
import { readYaml } from '../../src/notation/yaml-source.js';

function shape<T>(text: string, check: (node: ReturnType<typeof readYaml>, problems: Diagnostic[]) => T) {
  const problems: Diagnostic[] = [];
  const result = check(readYaml(text, 'f'), problems);
  return { result, text: problems.map((d) => renderDiagnostic(d)).join('\n') };
}

describe('shape checks', () => {
  it('asText, asList and asMap pass the wanted kind and name the other', () => {
    expect(shape('a', (n, p) => asText(n, 'it', p)).result?.text).toBe('a');
    expect(shape('[a]', (n, p) => asList(n, 'it', p)).result?.items).toHaveLength(1);
    expect(shape('a: b', (n, p) => asMap(n, 'it', p)).result?.entries.size).toBe(1);
    expect(shape('[a]', (n, p) => asText(n, 'it', p)).text).toContain('f:1:1: error: it must be a text but is a list');
    expect(shape('a', (n, p) => asList(n, 'it', p)).text).toContain('it must be a list but is a text');
    expect(shape('[a]', (n, p) => asMap(n, 'it', p)).text).toContain('it must be a mapping but is a list');
    expect(shape('" "', (n, p) => asText(n, 'it', p)).text).toContain('it must be a text but is empty');
  });

  it('asRecord returns the known keys and reports unknown and missing ones', () => {
    const keys = { required: ['name', 'value'], optional: ['latex'] };
    const { result, text } = shape('name: a\nlatx: b\nzzz: c\n', (n, p) => asRecord(n, 'a field', keys, p));
    expect([...result.keys()]).toEqual(['name']);
    expect(text).toBe(
      [
        'f:2:1: error: a field has no key latx',
        '    latx: b',
        '    ^^^^',
        'hint: did you mean latex?',
        'f:3:1: error: a field has no key zzz',
        '    zzz: c',
        '    ^^^',
        'hint: the keys are name, value, latex',
        'f:1:1: error: a field lacks the key value',
        '    name: a',
        '    ^',
        'hint: add a line value: …',
      ].join('\n'),
    );
  });

  it('a misspelt required key is reported once', () => {
    const { text } = shape('nane: a\n', (n, p) => asRecord(n, 'it', { required: ['name'] }, p));
    expect(text.match(/error/g)).toHaveLength(1);
  });
});
