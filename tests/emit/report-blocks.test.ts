import { describe, expect, it } from 'vitest';
import { BlockWriter, facts, warnings } from '../../src/emit/report-blocks.js';
import { makeTypesetter } from '../../src/emit/report-math.js';
import { deriveText } from './emitted-module.js';

const d = deriveText(`untwist: 1
name: Harbour light
constants: [c0, a4, a5]
scales: { M: mass }
lagrangian: "1/2 c0 M^2 R + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd} + M^2 T_a T^a"
impose: [ "a5 = 2 a4" ]
`);
const blocks = () => new BlockWriter(makeTypesetter());
const factOf = (of: typeof d, term: string) =>
  facts(of, ['a'], makeTypesetter())
    .find(([t]) => t === term)?.[1]
    .replace(/<[^>]*>/g, '');

describe('BlockWriter', () => {
  it('numbers sources through, one button for each', () => {
    const writer = blocks();
    const display = (label: string) =>
      writer.display({ label, tex: 'x', copyTex: '\\begin{equation} x < y \\end{equation}' });
    const html = display('eq:one') + display('eq:two');
    expect([...html.matchAll(/data-copies="([^"]*)"/g)].map(([, id]) => id)).toEqual(['tex-1', 'tex-2']);
    expect(html).toContain('<pre id="tex-2">\n\\begin{equation} x &lt; y \\end{equation}</pre>');
  });

  it('gives the sources of several displays together, and nothing for none', () => {
    const html = blocks().sourceOf(['a', 'b'].map((tex) => ({ label: `eq:${tex}`, tex, copyTex: tex })));
    expect(html).toContain('<pre id="tex-1">\na\n\nb</pre>');
    expect(html).not.toContain('class="sheet"');
    expect(blocks().sourceOf([])).toBe('');
  });

  it('tells which symbols were eliminated, and their dimension', () => {
    const html = blocks().symbols(d, (name) => name);
    expect(html).toMatch(/<code>a5<\/code><\/td><td>constant, eliminated<\/td><td>1</);
    expect(html).toMatch(/<code>M<\/code><\/td><td>scale<\/td><td><span class="katex">/);
  });

  it('shows vanishing products as zero', () => {
    const odd = deriveText('untwist: 1\nname: x\nlagrangian: |\n  R^2 + \\epsilon^{abcd} R_{ab} T_c A_d\n');
    expect(odd.invariants.some((i) => i.value.size === 0)).toBe(true);
    expect(blocks().invariants(odd)).toContain('<mn>0</mn>');
  });
});

describe('facts', () => {
  it('says when the spatial curvature drops out', () => {
    expect(factOf(d, 'Spatial curvature')).toMatch(/drops out on 2 conditions$/);
    const never = deriveText('untwist: 1\nname: x\nlagrangian: "R"\n');
    expect(factOf(never, 'Spatial curvature')).toMatch(/cannot drop out$/);
    const always = deriveText('untwist: 1\nname: x\nlagrangian: "T_a T^a"\n');
    expect(factOf(always, 'Spatial curvature')).toMatch(/drops out of the equations$/);
    const flat = deriveText('untwist: 1\nname: x\nlagrangian: "T_a T^a"\ngeometry: bianchi-i\n');
    expect(factOf(flat, 'Spatial curvature')).toBeUndefined();
  });
});

describe('warnings', () => {
  it('is empty without any', () => {
    expect(warnings(d)).toBe('');
  });
});
