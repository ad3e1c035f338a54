import { describe, expect, it } from 'vitest';
import { run } from './world.js';

describe('the commands on Lagrangians', () => {
  it('appear in the help', async () => {
    const { out } = await run(['--help']);
    for (const command of ['simplify [options] <theory>', 'translate [options] <theory>', 'invariants [options]'])
      expect(out).toContain(command);
  });

  it('have help of their own', async () => {
    expect((await run(['simplify', '--help'])).out).toContain('--modulo-boundary');
    expect((await run(['translate', '--help'])).out).toContain('--to <basis>');
    expect((await run(['invariants', '--help'])).out).toContain('--parity <parity>');
  });

  it('refuse unknown options and missing arguments', async () => {
    expect((await run(['simplify'])).err).toMatch(/missing required argument 'theory'/);
    expect((await run(['invariants', '--spin', '2'])).err).toMatch(/unknown option '--spin'/);
    expect((await run(['translate', 'x.yaml', '--to', 'monomials'])).err).toMatch(/there is no file x\.yaml/);
  });
});
