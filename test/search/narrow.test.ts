/** Narrowing a bracket: the answer changes at a known place, the measures say what each test wants. */
import { describe, expect, it } from 'vitest';
import type { Answer } from '../../src/search/found.ts';
import { type Bracket, type Measure, narrow } from '../../src/search/narrow.ts';
import { Runs } from '../../src/search/runs.ts';
import { largestVoltage, scaled } from '../../src/search/scaled.ts';
import { openCaseWith } from '../onset/set-up.ts';
import { outcomeOf } from './scripted.ts';

const TOLERANCE = 1e-3;

/** Narrows the bracket from 100 to 200, and the values asked for on the way. */
function narrowed(answer: (value: number) => Answer, measures: readonly Measure[]): { bracket: Bracket; asked: number[] } {
  const settings = openCaseWith();
  const asked: number[] = [];
  const runs = new Runs(
    {
      settings: (value) => scaled(settings, value),
      judge: (_outcome, c) => {
        const value = largestVoltage(c.supply);
        asked.push(value);
        const said = answer(value);
        return said === 'undecided' ? { doubt: 'so told' } : said;
      },
    },
    (c) => outcomeOf(c, { state: 'holds' }),
  );
  const bracket = narrow(runs, runs.at(100), runs.at(200), TOLERANCE, measures);
  return { bracket, asked: asked.slice(2) };
}

const changingAt =
  (place: number) =>
  (value: number): Answer =>
    value < place ? 'holds' : 'breaks-down';

function expectNarrow({ lower, upper, narrow: isNarrow }: Bracket, place: number): void {
  expect(isNarrow).toBe(true);
  expect(lower.answer).toBe('holds');
  expect(upper.answer).toBe('breaks-down');
  expect(lower.value).toBeLessThan(place);
  expect(upper.value).toBeGreaterThanOrEqual(place);
  expect(upper.value / lower.value).toBeLessThanOrEqual((1 + TOLERANCE) * (1 + 1e-12));
}

/** halvings (in ratio) from a factor 2 to 1.001 */
const HALVINGS = Math.ceil(Math.log2(Math.log(2) / Math.log(1 + TOLERANCE)));

describe('narrowing a bracket', () => {
  it('encloses a straight crossing in two runs', () => {
    const { bracket, asked } = narrowed(changingAt(137), [({ value }) => value - 137]);
    expectNarrow(bracket, 137);
    expect(asked.length).toBe(2);
  });

  it('halves the ratio where no measure tells', () => {
    const { bracket, asked } = narrowed(changingAt(137), []);
    expectNarrow(bracket, 137);
    expect(asked[0]).toBeCloseTo(Math.sqrt(100 * 200), 9);
    expect(asked.length).toBeLessThanOrEqual(HALVINGS);
  });

  it('takes the second measure where the first is silent', () => {
    const { asked } = narrowed(changingAt(137), [() => null, ({ value }) => value - 137]);
    expect(asked.length).toBe(2);
  });

  it('gives up a measure that always points close below the upper end, after three runs', () => {
    const creeping: Measure = ({ value }) => (value < 110 ? -100 : 1);
    const { bracket, asked } = narrowed(changingAt(120), [creeping]);
    expectNarrow(bracket, 120);
    expect(asked.length).toBeLessThanOrEqual(HALVINGS + 3);
  });

  it('does not trust a measure that says nothing of the nearest run above', () => {
    // two far runs point to 150; the upper end itself is silent
    const { asked } = narrowed(changingAt(137), [({ value }) => (value === 200 ? null : value - 150)]);
    expect(asked[0]).toBeCloseTo(Math.sqrt(100 * 200), 9);
  });

  it('leaves a stretch that is undecided and wider than the tolerance, with both ends close to it', () => {
    const said = (value: number): Answer => (value < 130 ? 'holds' : value < 140 ? 'undecided' : 'breaks-down');
    const { bracket, asked } = narrowed(said, []);
    expect(bracket.narrow).toBe(false);
    expect(130 / bracket.lower.value).toBeLessThan(1 + TOLERANCE);
    expect(bracket.upper.value / 140).toBeLessThan(1 + TOLERANCE);
    expect(asked.length).toBeLessThanOrEqual(2 * HALVINGS);
  });

  it('closes over an undecided stretch that is narrower than the tolerance', () => {
    const said = (value: number): Answer => (value < 130 ? 'holds' : value < 130 * (1 + 0.4 * TOLERANCE) ? 'undecided' : 'breaks-down');
    // points into the undecided stretch at once
    const { bracket, asked } = narrowed(said, [({ value }) => value - 130 * (1 + 0.5 * TOLERANCE)]);
    expectNarrow(bracket, 130);
    expect(asked.length).toBeLessThanOrEqual(HALVINGS);
  });

  it('works where what breaks down is below', () => {
    const { bracket } = narrowed((value) => (value < 137 ? 'breaks-down' : 'holds'), []);
    expect(bracket.lower.answer).toBe('breaks-down');
    expect(bracket.upper.answer).toBe('holds');
    expect(bracket.narrow).toBe(true);
  });
});
