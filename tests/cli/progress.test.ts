import { describe, expect, it } from 'vitest';
import { progressLine } from '../../src/cli/progress.js';
import { world } from './world.js';

const ERASE = '\r\u001b[K';

/** A clock that a test moves. */
function clock(): { now: () => number; advance: (ms: number) => void } {
  let time = 1000;
  return {
    now: () => time,
    advance: (ms) => {
      time += ms;
    },
  };
}

describe('progressLine', () => {
  it('says what is being done once the wait is felt, and cleans up', () => {
    const io = world({ interactive: true });
    const { now, advance } = clock();
    const line = progressLine(io, now);
    line.step('reading');
    expect(io.err()).toBe('');
    advance(399);
    line.step('contracting');
    expect(io.err()).toBe('');
    advance(1);
    line.step('varying');
    expect(io.err()).toBe(`${ERASE}varying …`);
    line.done();
    line.done();
    expect(io.err()).toBe(`${ERASE}varying …${ERASE}`);
    expect(io.out()).toBe('');
  });

  it('writes nothing when the work is quick', () => {
    const io = world({ interactive: true });
    const line = progressLine(io, clock().now);
    line.step('varying');
    line.done();
    expect(io.err()).toBe('');
  });

  it('writes nothing where nobody watches', () => {
    const io = world({ interactive: false });
    const { now, advance } = clock();
    const line = progressLine(io, now);
    advance(10_000);
    line.step('varying');
    line.done();
    expect(io.err()).toBe('');
  });

  it('takes the time of the computer by itself', () => {
    const io = world({ interactive: true });
    progressLine(io).step('varying');
    expect(io.err()).toBe('');
  });
});
