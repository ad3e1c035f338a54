import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { C, C_NAMING, cString } from '../../src/emit/code-c.js';
import { makeNameTable } from '../../src/emit/identifiers.js';
import { isNameText } from '../../src/notation/names.js';
import { HOSTILE_THEORY, modelOf } from './code-fixtures.js';
import { C_FLAGS, isMissing, run } from './code-runner.js';
import { inTemporary } from './emitted-module.js';

const HEADERS = 'math stdio stdlib string float limits stdint errno time signal setjmp'.split(' ');

describe('C', { timeout: 60_000 }, () => {
  it.skipIf(isMissing('g++'))(
    'declares without defining, in C of any dialect and in C++, behind any standard header',
    () =>
      inTemporary((directory) => {
        const m = modelOf(HOSTILE_THEORY, false);
        writeFileSync(join(directory, 'model.c'), C.write(m));
        const headers = HEADERS.map((h) => `#include <${h}.h>\n`).join('');
        const user = `${headers}#define HARBOUR_LIGHT_DECLARATIONS\n#include "model.c"\n#include "model.c"\n
double call(const harbour_light_couplings *c, const harbour_light_jets *j);
double call(const harbour_light_couplings *c, const harbour_light_jets *j) { return harbour_light_lagrangian(c, j); }\n`;
        writeFileSync(join(directory, 'user.c'), user);
        writeFileSync(join(directory, 'whole.c'), `${headers}#include "model.c"\n`);
        for (const standard of ['-std=c99', '-std=gnu17']) {
          run('gcc', [...C_FLAGS, standard, '-c', 'user.c'], directory);
          run('gcc', [...C_FLAGS, standard, '-c', 'whole.c'], directory);
        }
        run('g++', ['-Wall', '-Wextra', '-Werror', '-x', 'c++', '-c', 'user.c'], directory);
        expect(run('nm', ['user.o'], directory).match(/ T /g)).toHaveLength(1);
      }),
  );

  it.skipIf(isMissing('gcc'))('keeps clear of every macro of the standard headers', () =>
    inTemporary((directory) => {
      writeFileSync(join(directory, 'all.c'), [...HEADERS, 'complex'].map((h) => `#include <${h}.h>\n`).join(''));
      const defined = run('gcc', ['-std=c99', '-dM', '-E', 'all.c'], directory).matchAll(/^#define (\w+)/gm);
      const macros = [...defined].map((d) => d[1]!).filter(isNameText);
      expect(macros.length).toBeGreaterThan(200);
      expect(macros.filter((name) => makeNameTable([], C_NAMING).claim(name) === name)).toEqual([]);
      for (const name of ['B1', 'G', 'alpha', 'T1_2']) expect(makeNameTable([], C_NAMING).claim(name)).toBe(name);
    }),
  );

  it('writes strings in ASCII that no trigraph or escape changes', () => {
    expect(cString('a"b\\c??/d')).toBe('"a\\042b\\134c\\077\\077/d"');
    expect(cString('ψ1')).toBe('"\\317\\2101"');
  });

  it('takes a theory without parameters and reads only what it needs', () => {
    const text = C.write(modelOf('untwist: 1\nname: x\ngeometry: bianchi-i\nlagrangian: T_a T^a\n'));
    expect(text).toContain('  double unused;\n} x_couplings;');
    expect(text).toContain('  (void)couplings;');
    expect(text).not.toContain('#include');
  });
});
