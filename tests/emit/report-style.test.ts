import { describe, expect, it } from 'vitest';
import { REPORT_STYLE } from '../../src/emit/report-style.js';

/** Relative luminance of #rrggbb, as WCAG 2 defines it. */
function luminance(colour: string): number {
  const [r, g, b] = [1, 3, 5].map((i) => {
    const c = Number.parseInt(colour.slice(i, i + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}

function contrast(a: string, b: string): number {
  const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (high! + 0.05) / (low! + 0.05);
}

describe('REPORT_STYLE', () => {
  const themes = [...REPORT_STYLE.matchAll(/color-scheme: (\w+);([^}]*)/g)].map(([, name, body]) => ({
    name: name!,
    colours: new Map([...body!.matchAll(/--(\w+): (#[0-9a-f]{6})/g)].map(([, key, value]) => [key!, value!])),
  }));

  it('has a light and a dark theme of the same colours', () => {
    expect(themes.map((t) => t.name)).toEqual(['light', 'dark']);
    expect([...themes[0]!.colours.keys()]).toEqual([...themes[1]!.colours.keys()]);
  });

  it('keeps text readable on both backgrounds: contrast 4.5 at least', () => {
    for (const { name, colours } of themes)
      for (const ground of ['paper', 'panel'])
        for (const text of ['ink', 'muted', 'accent', 'good', 'bad', 'warn'])
          expect(contrast(colours.get(text)!, colours.get(ground)!), `${name}: ${text} on ${ground}`).toBeGreaterThan(
            4.5,
          );
  });

  it('loads nothing', () => {
    expect(REPORT_STYLE).not.toMatch(/url\(|@import|@font-face/);
  });

  it('closes what it opens', () => {
    expect(REPORT_STYLE.split('{').length).toBe(REPORT_STYLE.split('}').length);
  });
});
