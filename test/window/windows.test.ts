/** Judged instants become windows and turn-on times. */
import { describe, expect, it } from 'vitest';
import type { Judgement } from '../../src/search/window/states.ts';
import { earliestTurnOn, type JudgedInstant, latestTurnOn, lowestHoldOff, windowsOf } from '../../src/search/window/windows.ts';

const letters: Readonly<Record<string, Judgement>> = {
  h: { state: 'holds', safe: true },
  m: { state: 'marginal', safe: false },
  b: { state: 'breaks-down', safe: false },
  o: { state: 'outside-model', safe: false },
  v: { state: 'outside-model', safe: true },
};

/** one instant a second, a letter each; hold-off voltages fall by 10 V a second from 500 V */
function series(text: string): JudgedInstant[] {
  return [...text].map((letter, time) => ({
    time,
    pressure: 100,
    temperature: 300,
    supply: 300,
    holdOff: letter === 'o' || letter === 'v' ? null : 500 - 10 * time,
    judgement: letters[letter],
    lag: letter === 'b' ? 1e-6 * (10 - time) : null,
  }));
}
const short = (text: string): string[] => windowsOf(series(text)).map(({ state, from, to }) => `${state} ${from} ${to}`);

describe('windows', () => {
  it('reach to the first instant on either side that is known to be better', () => {
    expect(short('hhmmbbbmhh')).toEqual(['marginal 1 3', 'breaks-down 3 7', 'marginal 7 8']);
  });

  it('may last from the start or to the end', () => {
    expect(short('bbhh')).toEqual(['breaks-down 0 2']);
    expect(short('hhbb')).toEqual(['breaks-down 1 3']);
    expect(short('mmmm')).toEqual(['marginal 0 3']);
    expect(short('hhhh')).toEqual([]);
  });

  it('may be seen at one instant only', () => {
    expect(short('hhbhh')).toEqual(['breaks-down 1 3']);
  });

  it('outside the model are worse than marginal ones, better than breakdown, and parted by whether they count as holding', () => {
    expect(short('moob')).toEqual(['marginal 0 0', 'outside-model 0 2', 'breaks-down 2 3']);
    expect(windowsOf(series('vvoo')).map(({ from, to, safe }) => [from, to, safe])).toEqual([
      [0, 1, true],
      [1, 3, false],
    ]);
  });

  it('carry their lowest hold-off voltage and shortest lag', () => {
    const [window] = windowsOf(series('hbbh'));
    expect(window.lowestHoldOff).toBe(480);
    expect(window.shortestLag).toBeCloseTo(8e-6, 12);
    expect(windowsOf(series('hooh'))[0].lowestHoldOff).toBeNull();
  });
});

describe('turn-on', () => {
  it('is earliest at the first instant from which every later one holds with the margin', () => {
    expect(earliestTurnOn(series('hmbmhh'))).toBe(4);
    expect(earliestTurnOn(series('hhhh'))).toBe(0);
    expect(earliestTurnOn(series('bbbh'))).toBe(3);
    expect(earliestTurnOn(series('hhhm'))).toBeNull();
    expect(earliestTurnOn(series('hhvv'))).toBe(0);
    expect(earliestTurnOn(series('hhoo'))).toBeNull();
  });

  it('is latest at the last instant before the first that does not hold, if it holds from the start', () => {
    expect(latestTurnOn(series('hhmbhh'))).toBe(1);
    expect(latestTurnOn(series('hmmm'))).toBe(0);
    expect(latestTurnOn(series('mhhh'))).toBeNull();
    expect(latestTurnOn(series('hhhh'))).toBe(3);
    expect(latestTurnOn(series('hhoh'))).toBe(1);
  });

  it('looks at the lowest hold-off voltage wherever it lies', () => {
    expect(lowestHoldOff(series('hhbh'))?.time).toBe(3);
    expect(lowestHoldOff(series('oo'))).toBeNull();
  });
});
