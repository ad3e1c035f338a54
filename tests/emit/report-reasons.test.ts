import { describe, expect, it } from 'vitest';
import { reasonsOf } from '../../src/emit/report-reasons.js';
import { deriveText } from './emitted-module.js';

const plain = (d: Parameters<typeof reasonsOf>[1], id: string) =>
  Object.values(reasonsOf(id, d))
    .flat(2)
    .map((piece) => (typeof piece === 'string' ? piece : piece.math))
    .join(' ');

describe('reasonsOf', () => {
  const d = deriveText('untwist: 1\nname: x\nscales: { M: mass }\nlagrangian: "1/2 M^2 R"\n');

  it('names the source of the geometry', () => {
    expect(plain(d, 'geometry')).toContain(d.geometry.source);
  });

  it('differs when there is no metric analogue', () => {
    const bianchi = deriveText(
      'untwist: 1\nname: x\nscales: { M: mass }\nlagrangian: "1/2 M^2 R"\ngeometry: bianchi-i\n',
    );
    expect(plain(d, 'scalar-tensor')).toContain('reduced again from its covariant form');
    expect(plain(bianchi, 'scalar-tensor')).not.toContain('reduced again');
  });

  it('has nothing to say about a section that is no step', () => {
    expect(reasonsOf('elsewhere', d)).toEqual({ allowed: [], rule: [] });
  });
});
