import { describe, expect, it } from 'vitest';
import { ticksTo } from '../../src/app/reading/ticks.ts';

describe('ticks of a thickness axis', () => {
  it('are round and evenly spaced, the last with its unit', () => {
    expect(ticksTo(1250, 5).map((t) => t.text)).toEqual(['0', '250', '500', '750', '1,000', '1,250 nm']);
    expect(ticksTo(1500, 4).map((t) => t.text)).toEqual(['0', '500', '1,000', '1,500 nm']);
    expect(ticksTo(300, 4).map((t) => t.text)).toEqual(['0', '100', '200', '300 nm']);
  });

  it('turn to micrometres from 2 µm on', () => {
    expect(ticksTo(5000, 5).map((t) => t.text)).toEqual(['0', '1', '2', '3', '4', '5 µm']);
  });

  it('stay within the axis and the number asked for', () => {
    for (const top of [25, 60, 310, 725, 1100, 1999, 2000, 4700]) {
      for (const most of [3, 4, 5]) {
        const ticks = ticksTo(top, most);
        expect(ticks.length, `${top}`).toBeGreaterThanOrEqual(2);
        expect(ticks.length, `${top}`).toBeLessThanOrEqual(most + 1);
        expect(ticks.at(-1)?.nm, `${top}`).toBeLessThanOrEqual(top + 1e-6);
      }
    }
  });
});
