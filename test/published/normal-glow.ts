import { glows } from '../help/measured.ts';
import { type Check, factor, type Source } from './check.ts';

const shared = { status: 'from memory (M)', simulated: true } as const;

/** the falls of nitrogen come out too high by what a net yield of breakdown, 0.03, lacks in a glow */
const nitrogen = (metal: string, fall: number, low: number, high: number): Check => ({
  ...shared,
  check: `normal cathode fall in nitrogen on ${metal}`,
  published: fall,
  unit: 'V',
  allowed: { low, high },
  knownLimit: true,
  reason:
    'with the net yield of breakdown, 0.03, and a local α the glow’s voltage is 1.5 to 2 times the fall (the range over nickel, copper and iron)',
  independentOf: 'the fall',
  compute: () => glows.nitrogen().voltage,
});

const argon = (metal: string, fall: number): Check => ({
  ...shared,
  check: `normal cathode fall in argon on ${metal}`,
  published: fall,
  unit: 'V',
  allowed: factor(1.5),
  reason: 'V goes as ln(1 + 1/γ) and the net yield, 0.07, is known to a factor of three, ± 40 %',
  independentOf: 'any glow: α from swarms, the yield from ion beams; the lowest voltage of V(j)',
  compute: () => {
    const { voltage, inside } = glows.argon();
    return inside ? voltage : Number.NaN; // a minimum, or nothing
  },
});

export const normalGlow: Source = {
  source: 'Normal cathode falls and current densities: Cobine 1941; von Engel 1965; Raizer 1991',
  checks: [
    argon('nickel', 131),
    argon('copper', 130),
    argon('iron', 165),
    {
      ...shared,
      check: 'normal current density in argon on iron and nickel, j/p²',
      published: 160,
      unit: 'µA/(cm² Torr²)',
      allowed: { low: 0.01, high: 0.1 },
      knownLimit: true,
      reason: 'a local α underrates ionisation in the cathode fall: 10 to 100 times too little, as the README says',
      independentOf: 'the current density',
      compute: () => glows.argon().reducedCurrent,
    },
    nitrogen('nickel', 197, 1.5, 2),
    nitrogen('iron', 215, 1.5, 2),
  ],
};
