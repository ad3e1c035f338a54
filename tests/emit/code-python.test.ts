import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { PYTHON } from '../../src/emit/code-python.js';
import { firstOrderModule, HOSTILE_TITLES, modelOf, named } from './code-fixtures.js';
import { isMissing, run } from './code-runner.js';
import { inTemporary } from './emitted-module.js';

describe('Python', { timeout: 60_000 }, () => {
  it.skipIf(isMissing('python3'))('keeps names and titles as they are in its strings, and text in its docstring', () =>
    inTemporary((directory) => {
      const plain = modelOf('untwist: 1\nname: x\nconstants: [lambda, def]\nlagrangian: lambda R + def T_a T^a\n');
      for (const title of HOSTILE_TITLES) {
        writeFileSync(join(directory, 'model.py'), PYTHON.write(named(plain, title)));
        const program = 'import json, model; print(json.dumps([model.THEORY, model.PARAMETERS, model.__doc__]))';
        const [theory, parameters, doc] = JSON.parse(run('python3', ['-B', '-W', 'error', '-c', program], directory));
        expect(theory).toBe(title);
        expect(parameters).toEqual(['lambda', 'def', 'M', 'k']);
        expect(doc).toContain('Written by untwist');
      }
    }),
  );

  it.skipIf(isMissing('python3'))('has the root of a negative number as not a number', () =>
    inTemporary((directory) => {
      writeFileSync(join(directory, 'model.py'), PYTHON.write(firstOrderModule()));
      const call = 'model.energy_constraint({"k": -1, "g": 0, "end": 0}, [1, 1, 1, 1])';
      expect(run('python3', ['-B', '-c', `import model; print(${call})`], directory)).toBe('nan\n');
    }),
  );

  it('wants a file that can be imported', () => {
    expect(PYTHON.fileFault!('harbour_light.py')).toBeUndefined();
    for (const file of ['harbour-light.py', '1.py', 'class.py', 'x.txt']) expect(PYTHON.fileFault!(file)).toBeDefined();
  });
});
