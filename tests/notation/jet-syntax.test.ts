import { describe, expect, it } from 'vitest';
import { rational } from '../../src/algebra/rational.js';
import { plainPassage } from '../../src/notation/passage.js';
import { parseScalar } from '../../src/notation/scalar.js';
import { errorText } from './rendered.js';

const names = ['a', 'phi', 'a_x'];
const scalar = (text: string, allowJets = true) =>
  parseScalar(plainPassage(text, 'E'), { isSymbol: (name) => names.includes(name), names, allowJets });

describe('D(q,n)', () => {
  it('reads jets in canonical spelling, and a jet of order 0 as the variable', () => {
    expect(scalar('D( a , 02 )^2 D(\\phi,1)')).toEqual([
      {
        coefficient: rational(1),
        powers: [
          ['D(a,2)', 2],
          ['D(phi,1)', 1],
        ],
      },
    ]);
    expect(scalar('D(a_x,0)')).toEqual(scalar('a_x'));
  });

  it.each([
    ['D(q,1)', 'E:1:3: error: unknown symbol q'],
    ['D(a 1)', 'E:1:1: error: D( lacks its comma'],
    ['D(a,x)', 'E:1:1: error: D( lacks its order'],
    ['D(a,1', 'E:1:1: error: D( is never closed'],
    ['D(,1)', 'E:1:3: error: D( lacks its variable'],
    ['D(a,99)', 'E:1:5: error: the order is beyond the limit of 64'],
  ])('%s: %s', (text, line) => {
    expect(errorText(() => scalar(text)).split('\n')[0]).toBe(line);
  });

  it('is a name like others where there are no jets', () => {
    expect(errorText(() => scalar('D(a,1)', false))).toContain('unknown symbol D');
  });
});
