import { describe, expect, it } from 'vitest';
import {
  type Diagnostic,
  errorAt,
  InputError,
  lineAndColumn,
  renderDiagnostic,
  warningAt,
} from '../../src/notation/diagnostics.js';

const at = (source: string, needle: string): Diagnostic => {
  const start = source.indexOf(needle);
  return errorAt({ file: 'f.yaml', source, start, end: start + needle.length }, 'code', 'message', 'mend it');
};

describe('renderDiagnostic', () => {
  it('shows file, line, column, the line, a caret line and the hint', () => {
    expect(renderDiagnostic(at('one\ntwo b4 three\n', 'b4'))).toBe(
      ['f.yaml:2:5: error: message', '    two b4 three', '        ^^', 'hint: mend it'].join('\n'),
    );
  });

  it('keeps tabs in the caret line, so that the caret stands below its target at any tab width', () => {
    expect(renderDiagnostic(at('\t+\tb4', 'b4'))).toBe(
      ['f.yaml:1:4: error: message', '    \t+\tb4', '    \t \t^^', 'hint: mend it'].join('\n'),
    );
  });

  it('counts wide characters as two columns and combining ones as none in the caret line', () => {
    const lines = renderDiagnostic(at('漢字e\u0301 b4', 'b4')).split('\n');
    expect(lines[0]).toBe('f.yaml:1:6: error: message');
    expect(lines[2]).toBe(`    ${' '.repeat(6)}^^`);
  });

  it('marks only the first line of a long span', () => {
    expect(renderDiagnostic(at('a (b\nc) d', '(b\nc)')).split('\n')[2]).toBe('      ^^');
  });

  it('shows a window of a very long line', () => {
    const text = renderDiagnostic(at(`${'x'.repeat(500_000)}b4${'y'.repeat(500_000)}`, 'b4')).split('\n');
    expect(text[1]!.length).toBeLessThan(250);
    expect(text[1]!.slice(text[2]!.indexOf('^'), text[2]!.indexOf('^') + 2)).toBe('b4');
  });

  it('cuts a carriage return and replaces control characters, which could rewrite the terminal', () => {
    const d = at('a \u001b[2J b4\r\nnext', 'b4');
    expect(renderDiagnostic(d).split('\n')[1]).toBe('    a \ufffd[2J b4');
    expect(renderDiagnostic({ ...d, message: 'x\u001b[31m' })).not.toContain('\u001b');
    expect(renderDiagnostic({ ...d, file: 'a\u202eb' })).not.toContain('\u202e');
  });

  it('points behind the last character at the end of the text', () => {
    const d = errorAt({ file: 'f', source: 'abc', start: 3, end: 3 }, 'code', 'message');
    expect(renderDiagnostic(d)).toBe(['f:1:4: error: message', '    abc', '       ^'].join('\n'));
  });

  it('names only the file when there is no source, and nothing when there is no file', () => {
    const bare: Diagnostic = { code: 'c', severity: 'error', message: 'no such file' };
    expect(renderDiagnostic({ ...bare, file: 'f.yaml' })).toBe('f.yaml: error: no such file');
    expect(renderDiagnostic(bare)).toBe('error: no such file');
  });

  it('says warning, and colours only when asked', () => {
    const place = { file: 'f', source: 'abc', start: 0, end: 1 };
    const d = warningAt(place, 'code', 'message');
    expect(renderDiagnostic(d)).toBe(['f:1:1: warning: message', '    abc', '    ^'].join('\n'));
    expect(renderDiagnostic(d, { color: true })).toContain('\u001b[');
  });
});

describe('lineAndColumn', () => {
  it('counts from 1, in characters', () => {
    expect(lineAndColumn('ab\ncd', 0)).toEqual({ line: 1, column: 1 });
    expect(lineAndColumn('ab\ncd', 2)).toEqual({ line: 1, column: 3 });
    expect(lineAndColumn('ab\ncd', 4)).toEqual({ line: 2, column: 2 });
    expect(lineAndColumn('𝒜b', 2)).toEqual({ line: 1, column: 2 });
    expect(lineAndColumn('ab', 99)).toEqual({ line: 1, column: 3 });
  });
});

describe('InputError', () => {
  it('carries its diagnostics and joins their messages', () => {
    const error = new InputError([at('a', 'a'), { code: 'x', severity: 'error', message: 'second' }]);
    expect(error.message).toBe('message; second');
    expect(error.diagnostics).toHaveLength(2);
    expect(error).toBeInstanceOf(Error);
  });
});
