/** What an instant is judged to be, by the definitions of the design. */
import { describe, expect, it } from 'vitest';
import { type Evidence, judge } from '../../src/search/window/states.ts';

const criteria = { margin: 1.5, uncertainty: 0.2 };
const evidence = (changes: Partial<Evidence>): Evidence => ({
  voltage: 300,
  holdOff: 600,
  holdOffAtHighYield: 500,
  beyond: null,
  belowData: false,
  minimum: 200,
  minimumAtHighYield: 150,
  ...changes,
});
const state = (changes: Partial<Evidence>): string => judge(evidence(changes), criteria).state;
const safe = (changes: Partial<Evidence>): boolean => judge(evidence(changes), criteria).safe;

describe('the state of an instant', () => {
  it('is holds where voltage times margin is below the hold-off, and the voltage below that of the high yield', () => {
    expect(state({})).toBe('holds');
    expect(safe({})).toBe(true);
  });

  it('is breaks-down from the hold-off voltage itself on', () => {
    expect(state({ voltage: 599.9 })).toBe('marginal');
    expect(state({ voltage: 600 })).toBe('breaks-down');
    expect(safe({ voltage: 600 })).toBe(false);
  });

  it('is marginal from the hold-off voltage over the margin on', () => {
    expect(state({ voltage: 399.9, holdOffAtHighYield: null })).toBe('holds');
    expect(state({ voltage: 400, holdOffAtHighYield: null })).toBe('marginal');
    expect(safe({ voltage: 400 })).toBe(false);
  });

  it('is marginal where the voltage itself, not its margin, reaches the hold-off of the high yield', () => {
    expect(state({ voltage: 350, holdOffAtHighYield: 351 })).toBe('holds');
    expect(state({ voltage: 350, holdOffAtHighYield: 350 })).toBe('marginal');
  });

  it('is holds without voltage, whatever the gas', () => {
    expect(judge(evidence({ voltage: 0, beyond: 'no-threshold', holdOff: null, minimum: null }), criteria)).toEqual({
      state: 'holds',
      safe: true,
    });
  });
});

describe('outside the model', () => {
  const vacuum = { beyond: 'no-threshold', holdOff: null } as const;

  it('counts as not holding', () => {
    expect(state(vacuum)).toBe('outside-model');
    expect(safe(vacuum)).toBe(false);
  });

  it('counts as holding where voltage times margin is below the Paschen minimum, and the voltage below that of the high yield', () => {
    expect(safe({ ...vacuum, voltage: 133 })).toBe(true);
    expect(safe({ ...vacuum, voltage: 134 })).toBe(false); // 201 V with the margin
    expect(safe({ ...vacuum, voltage: 133, minimumAtHighYield: 133 })).toBe(false);
  });

  it('counts as not holding where no Paschen minimum is known', () => {
    expect(safe({ ...vacuum, voltage: 1, minimum: null })).toBe(false);
    expect(safe({ ...vacuum, voltage: 1, minimumAtHighYield: null })).toBe(false);
  });

  it('is where an extrapolated hold-off of dense gas is closer to the voltage or its margin than it is known', () => {
    expect(state({ voltage: 300, belowData: true })).toBe('holds'); // 450 V with the margin, 480 V at least
    expect(state({ voltage: 330, belowData: true })).toBe('outside-model'); // 495 V
    expect(state({ voltage: 719, belowData: true })).toBe('outside-model');
    expect(state({ voltage: 720, belowData: true })).toBe('breaks-down');
  });
});
