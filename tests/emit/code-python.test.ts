import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { PYTHON } from '../../src/emit/code-python.js';
import { EIGHTEEN, firstOrderModule, HOSTILE_TITLES, modelOf, named } from './code-fixtures.js';
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

  it.skipIf(isMissing('python3'))('takes whatever adds and multiplies entry by entry', () =>
    inTemporary((directory) => {
      writeFileSync(join(directory, 'model.py'), PYTHON.write(modelOf(EIGHTEEN)));
      const program = `import json, model
class Many:
    def __init__(self, values): self.values = values
    def both(self, other, f):
        others = other.values if isinstance(other, Many) else [other] * len(self.values)
        return Many([f(x, y) for x, y in zip(self.values, others)])
    def __add__(self, other): return self.both(other, lambda x, y: x + y)
    def __sub__(self, other): return self.both(other, lambda x, y: x - y)
    def __mul__(self, other): return self.both(other, lambda x, y: x * y)
    def __truediv__(self, other): return self.both(other, lambda x, y: x / y)
    def __rsub__(self, other): return self.both(other, lambda x, y: y - x)
    def __rtruediv__(self, other): return self.both(other, lambda x, y: y / x)
    def __neg__(self): return self * -1
    __radd__ = __add__
    __rmul__ = __mul__
couplings = {name: 0.25 + i / 8 for i, name in enumerate(model.PARAMETERS)}
jets = lambda scale: {"N": [1.5, 0.25], "a": [scale, 0.5, 0.75], "phi": [0.5, 1, 2], "psi": [2, 0.25, 0.125]}
points = [0.5, 1.25, 3.0]
many = model.equations(couplings, jets(Many(points)))
one = [model.equations(couplings, jets(x)) for x in points]
print(json.dumps([[v.values for v in many.values()], [[o[key] for o in one] for key in many]]))`;
      const [many, one] = JSON.parse(run('python3', ['-B', '-c', program], directory));
      expect(many).toEqual(one);
      expect(many.flat()).toHaveLength(12);
    }),
  );

  it('wants a file that can be imported', () => {
    expect(PYTHON.fileFault!('harbour_light.py')).toBeUndefined();
    for (const file of ['harbour-light.py', '1.py', 'class.py', 'x.txt']) expect(PYTHON.fileFault!(file)).toBeDefined();
  });
});
