import { describe, expect, it } from 'vitest';
import { math, prose } from '../../src/emit/latex-text.js';
import { makeTypesetter } from '../../src/emit/report-math.js';
import { escapeHtml, proseHtml } from '../../src/emit/report-text.js';

describe('escapeHtml', () => {
  it('leaves nothing that means something to a browser', () => {
    expect(escapeHtml('<a href="x" title=\'y\'>&</a>')).toBe(
      '&lt;a href=&quot;x&quot; title=&#39;y&#39;&gt;&amp;&lt;/a&gt;',
    );
    expect(escapeHtml('a\u0000b\u202ec\u2066d\u0085e')).toBe('a\ufffdb\ufffdc\ufffdd\ufffde');
    expect(escapeHtml('φ² ≤ 1\nnext')).toBe('φ² ≤ 1\nnext');
  });
});

describe('proseHtml', () => {
  it('typesets formulas and escapes the rest', () => {
    const html = proseHtml(prose`${'<b>'} of ${math('x < y')}`, makeTypesetter());
    expect(html).toMatch(/^&lt;b&gt; of <span class="katex">/);
    expect(html).not.toContain('x < y');
  });
});
