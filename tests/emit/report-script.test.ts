import { describe, expect, it } from 'vitest';
import { REPORT_SCRIPT, scriptHash } from '../../src/emit/report-script.js';

describe('scriptHash', () => {
  it('is the digest that a content security policy expects', () => {
    // The digest of the empty text is well known.
    expect(scriptHash('')).toBe("'sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU='");
  });
});

describe('REPORT_SCRIPT', () => {
  it('neither ends its element nor makes code of text', () => {
    expect(REPORT_SCRIPT).not.toMatch(/<\/|<!--|innerHTML|eval|Function|import|fetch/);
  });
});
