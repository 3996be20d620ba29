/** Published numbers against runs of the program. In every row the run contains the model in time and the data of the gas, not the number it is compared with.
 *
 *  Sources and their status are repeated beside each check: "read", "second-hand" (a text that quotes it was read), "from memory" (nobody here has read it; H, M, L: our confidence),
 *  "computed", "common practice" (a fact of the trade without one source). A tolerance says where it comes from. */
import { describe, expect, it } from 'vitest';
import { gases } from '../../src/gases/index.ts';
import { simulateNow } from '../../src/simulate.ts';
import { surfaces } from '../../src/surfaces/index.ts';
import { caseOf as plainCase, rightOfMinimum, stepTo, uniformAt, withoutDiffusion } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { breakdownInTime, type GasName, runOf, simulatedMinimum } from './gas-gap.ts';
import { ionMobilityInTime } from './ion-transit.ts';

const relative = (a: number, b: number): number => Math.abs(a / b - 1);

/* Minima of the breakdown curve [V, Torr cm]. Naidu and Kamaraju, High Voltage Engineering: argon 137 at 0.9, nitrogen 251 at 0.67 (from memory, H), air 327 at 0.567 (second-hand).
 * Kuffel, Zaengl and Kuffel 2000: air 352 at 0.55, nitrogen 240 at 0.65 (from memory, M). von Engel 1965: argon on iron 265 at 1.5, nitrogen on iron 275 at 0.75, air on iron 330 at 0.57 (from memory, M). */
const handbooks: Readonly<Record<GasName, readonly (readonly [number, number])[]>> = {
  argon: [
    [137, 0.9],
    [265, 1.5],
  ],
  nitrogen: [
    [251, 0.67],
    [240, 0.65],
    [275, 0.75],
  ],
  air: [
    [327, 0.567],
    [352, 0.55],
    [330, 0.57],
  ],
};

describe('minima of breakdown curves, simulated in time by the sign of growth', () => {
  const minima = new Map<GasName, ReturnType<typeof simulatedMinimum>>();
  const minimumOf = (gas: GasName): ReturnType<typeof simulatedMinimum> => {
    const known = minima.get(gas);
    if (known) return known;
    // argon on dirty metal at 30 to 100 eV, 0.030 to 0.032: Phelps and Petrović 1999, computed from the fit (from memory, H). Nitrogen: the data's own. Air: default of
    // handbooks for technical surfaces (second-hand).
    const [ionYield, pds, guess] = (
      {
        argon: [0.03, [0.6, 0.8, 1, 1.25], 165],
        nitrogen: [0.03, [0.6, 0.75, 0.95, 1.2], 290],
        air: [0.01, [0.6, 0.75, 0.95, 1.2], 330],
      } as const
    )[gas];
    const found = simulatedMinimum(gas, ionYield, pds, guess, 4e-3);
    minima.set(gas, found);
    return found;
  };

  // The E/p of the minimum (Stoletow) hardly depends on the cathode: the yield moves V and pd together. 15 %: a minimum is so flat (V 1 % up at 15 % off in pd) that
  // nobody places its pd better.
  it.each(['argon', 'nitrogen'] as const)('in %s lie at an E/p within 15 % of the handbooks’ range', (gas) => {
    const published = handbooks[gas].map(([v, pd]) => v / pd);
    const { reducedField } = minimumOf(gas);
    expect(reducedField).toBeGreaterThan(0.85 * Math.min(...published));
    expect(reducedField).toBeLessThan(1.15 * Math.max(...published));
  });

  // The handbooks' own spread is the tolerance, a factor of two in argon: cathodes and traces of other gases differ.
  it('in argon on ordinary metal has a voltage between the handbooks’ 137 and 265 V', () => {
    expect(minimumOf('argon').voltage).toBeGreaterThan(137);
    expect(minimumOf('argon').voltage).toBeLessThan(265);
  });

  // 15 %: what the data of air state as the uncertainty of V_s, α known to 20 % and the yield to a factor. The run may lie that far outside the handbooks' 327 to 352 V.
  it('in air on a technical surface has a voltage within 15 % of the handbooks’ range', () => {
    expect(gases.air.breakdownUncertainty).toBe(0.15);
    expect(minimumOf('air').voltage).toBeGreaterThan(0.85 * 327);
    expect(minimumOf('air').voltage).toBeLessThan(1.15 * 352);
  });

  // Exact algebra of the Townsend criterion with A 15, B 365 and a yield of 0.01: 305 V at 0.836 Torr cm (computed), which the run does not contain. 1 %: the bisection stops at 0.4 %,
  // the parabola adds as much; diffusion lifts V by a few tenths of a per cent. pd 3 %, the minimum being flat.
  it('in air is that of the formula, 305 V at 0.836 Torr cm, within 1 and 3 %', () => {
    expect(relative(minimumOf('air').voltage, 305.3)).toBeLessThan(0.01);
    expect(relative(minimumOf('air').pd, 0.836)).toBeLessThan(0.03);
  });

  // A known fault of α in air, stated in its data: pd comes out larger than 0.55 to 0.57 Torr cm by half. Kept so that the statement stays true.
  it('in air lie at a pd that is too large by 40 to 60 %, as the notes of the gas say', () => {
    const { pd } = minimumOf('air');
    expect(pd).toBeGreaterThan(1.4 * 0.57);
    expect(pd).toBeLessThan(1.6 * 0.57);
  });

  // Uniform-field formula for air at 20 °C, V = 24.22 x + 6.08 √x kV, x = pd/(760 Torr cm): Bruce 1947, Kuffel et al. ch. 5 (formula second-hand). 12 %: α and η known to 20 to 30 %,
  // three-body attachment and detachment left out; the long tests go through pd.
  it('leave air at 10 Torr cm, right of its minimum, within 12 % of the uniform-field formula', () => {
    const x = 10 / 760;
    const published = 24220 * x + 6080 * Math.sqrt(x);
    expect(relative(breakdownInTime({ gas: 'air', torr: 10, ionYield: 0.01 }, 0.9 * published, 5e-3), published)).toBeLessThan(0.12);
  });
});

describe('argon ions, timed over the difference between two gaps', () => {
  // The method itself: a gas in which K0 = 1.5 cm²/(V s) at every field. 1 %: steps of the run and the spread of the packet.
  it('come out with the mobility put in, within 1 %', () => {
    for (const td of [20, 300]) expect(relative(ionMobilityInTime(td, 1.5), 1.5), `${td} Td`).toBeLessThan(0.01);
  });

  // Ellis et al., At. Data Nucl. Data Tables 17, 177, 1976 (from memory, M): K0 of Ar+ in argon at 300 K, ± 3 to 5 % as they state. The data used are a fit by Phelps and Petrović.
  it('have the reduced mobility of Ellis et al. within 5 % from 10 to 1000 Td', () => {
    const rows = [
      [10, 1.53],
      [50, 1.44],
      [100, 1.3],
      [200, 1.09],
      [300, 0.95],
      [400, 0.855],
      [600, 0.715],
      [1000, 0.565],
    ].map(([td, published]) => {
      const found = ionMobilityInTime(td);
      return [td, published, found, found / published - 1] as const;
    });
    printTable('Ar+ in argon, K0 [cm²/(V s)]', ['Td', 'Ellis 1976', 'run', 'difference'], rows);
    for (const [td, , , difference] of rows) expect(Math.abs(difference), `${td} Td`).toBeLessThan(0.05);
  });

  // Hornbeck, Phys. Rev. 84, 615, 1951 (read): 1.63 extrapolated to zero field; Oskam and Mittelstadt 1963 (read): 1.6; Ellis et al. (M): 1.53. They differ by 6 %; 5 % more
  // below the lowest is what Ellis et al. state.
  it('have at 10 Td a mobility among those measured at low field', () => {
    const found = ionMobilityInTime(10);
    expect(found).toBeGreaterThan(0.95 * 1.53);
    expect(found).toBeLessThan(1.63);
  });
});

describe('growth of the current above threshold', () => {
  // Exact roots L d/w of 1 = γα (e^{(α − L/w)d} − 1)/(α − L/w), 1/w = 1/W_e + 1/W_i (Davidson; Raether 1964; equation from memory, H, roots computed). Bar 0.5 %.
  it('has the exact rates for yields of 0.1, 0.01 and 0.001 and feedbacks of 1.01 to 10', () => {
    const table = [
      [0.1, 1.01, 0.014567],
      [0.1, 1.1, 0.139329],
      [0.1, 2, 1.002269],
      [0.1, 10, 3.226753],
      [0.01, 1.01, 0.012541],
      [0.01, 1.1, 0.119951],
      [0.01, 1.5, 0.507737],
      [0.01, 2, 0.864118],
      [0.01, 5, 1.980431],
      [0.01, 10, 2.808652],
      [0.001, 1.01, 0.01162],
      [0.001, 1.1, 0.111209],
      [0.001, 2, 0.804377],
      [0.001, 10, 2.638869],
    ];
    const rows = table.map(([ionYield, q, published]) => {
      const gap = { ...withoutDiffusion(rightOfMinimum), ionYield };
      // the voltage at which α d = ln(1 + q/γ)
      const pd = 100 * gap.torr * gap.spacing;
      const voltage = (gap.B * pd) / Math.log((gap.A * pd) / Math.log1p(q / ionYield));
      const { electronSpeed, ionSpeed, spacing } = uniformAt(gap, voltage);
      const transits = spacing / electronSpeed + spacing / ionSpeed;
      const seed = 1e-20;
      const { onset } = simulateNow(
        plainCase(gap, {
          seed: { cathodeCurrent: seed },
          supply: { programme: stepTo(voltage) },
          observe: { until: (Math.log(1e-9 / seed) / published + 6) * transits },
        }),
      );
      const found = (onset.growth_rate_per_s ?? Number.NaN) * transits;
      return [ionYield, q, published, found, found / published - 1] as const;
    });
    printTable('growth L d/w', ['γ', 'q', 'exact root', 'run', 'error'], rows);
    for (const row of rows) expect(Math.abs(row[4]), `γ ${row[0]}, q ${row[1]}`).toBeLessThan(5e-3);
  });
});

describe('facts of the trade', () => {
  // Common practice: with the light of a room or a weak source on the cathode a gap carries a saturation current of the order of picoamperes until avalanches begin.
  it('a gap seeded with 1 pA carries picoamperes until avalanches begin, tens of them near breakdown, and microamperes and more past it', () => {
    const dwell = 2e-3;
    const edge = 1e-4;
    const stairs = [5, 10, 15, 20, 40, 60, 80, 100, 120, 140, 160];
    const { outcome, trace } = runOf({
      gas: 'argon',
      torr: 1,
      ionYield: 0.03,
      seed: 1e-12,
      supply: '{ voltage: { table: { file: bias.csv, time: t, voltage: v } }, series_resistance: 1 Mohm }',
      bias: [[0, 0], ...stairs.flatMap((v, i) => [[i * dwell + edge, v] as const, [(i + 1) * dwell, v] as const])],
      until: stairs.length * dwell,
    });
    const currents = new Map(stairs.map((v, i) => [v, trace.findLast((s) => s.time <= (i + 1) * dwell)?.current ?? Number.NaN]));
    const at = (v: number): number => currents.get(v) ?? Number.NaN;
    // saturated: every seed electron, no avalanche. 10 %: at 15 V a few have begun
    for (const v of [5, 10, 15]) expect(relative(at(v), 1e-12), `${v} V`).toBeLessThan(0.1);
    for (const v of [20, 40, 60]) expect(at(v), `${v} V`).toBeLessThan(5e-12);
    expect(at(40)).toBeGreaterThan(1.3e-12);
    expect(at(140)).toBeGreaterThan(2e-11);
    expect(at(140)).toBeLessThan(2e-10);
    expect(at(160)).toBeGreaterThan(1e-6);
    expect(outcome.verdict.state).toBe('breaks-down');
  });

  // Common practice: breakdown measurements give net yields of the order of 1e-2. Order: within a factor of ten, and their geometric mean within a factor of √10. Helium is the known exception: its ions carry 24.6 eV and yield
  // 0.2 to 0.3 even on clean metal (Hagstrum, Phys. Rev. 96, 325, 1954; from memory, H).
  it('the built-in net yields are of the order of 1e-2, helium aside', () => {
    const named = Object.values(surfaces).flatMap((s) =>
      Object.entries(s.yields).flatMap(([gas, y]) => (gas === 'helium' ? [] : [{ label: `${s.name} in ${gas}`, y }])),
    );
    for (const { label, y } of named) {
      expect(y.typical, label).toBeGreaterThan(1e-3);
      expect(y.typical, label).toBeLessThan(1e-1);
    }
    const mean = Math.exp(named.reduce((sum, { y }) => sum + Math.log(y.typical), 0) / named.length);
    expect(mean).toBeGreaterThan(1e-2 / Math.sqrt(10));
    expect(mean).toBeLessThan(1e-2 * Math.sqrt(10));
  });

  // Common practice. 1e-5: at 1 nA space charge changes the field by a few 1e-6 at most, and with it a current that is amplified two hundred times.
  it('below threshold the current is in proportion to the seed from 0.1 fA to 1 nA', () => {
    const amplification = [1e-16, 1e-14, 1e-12, 1e-10, 1e-9].map((seed) => {
      const { outcome } = runOf({
        gas: 'nitrogen',
        torr: 1,
        ionYield: 0.03,
        seed,
        supply: '{ voltage: { step: 270 V }, series_resistance: 0 ohm }',
        until: 5e-3,
      });
      expect(outcome.verdict.state).toBe('holds');
      return outcome.final.current_A / seed;
    });
    expect(amplification[0]).toBeGreaterThan(100); // near threshold, where it matters
    for (const a of amplification) expect(relative(a, amplification[0])).toBeLessThan(1e-5);
  });
});

/** the formative lag of a step over the breakdown voltage that theory gives for the gap */
function lagOf(gas: GasName, ionYield: number, overvoltage: number): number {
  const gap = { gas, torr: 1, ionYield, seed: 1e-12 };
  const step = (volts: number): string => `{ voltage: { step: ${volts} V }, series_resistance: 10 kohm }`;
  const threshold = runOf({ ...gap, supply: step(1), until: 1e-9 }).outcome.theory.static_breakdown_voltage_V ?? Number.NaN;
  return runOf({ ...gap, supply: step((1 + overvoltage) * threshold), until: 20e-3 }).outcome.onset.formative_lag_s ?? Number.NaN;
}

describe('the formative lag', () => {
  const overvoltages = [0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1];
  const lags = new Map<GasName, number[]>();
  const lagsOf = (gas: GasName): number[] => {
    const known = lags.get(gas) ?? overvoltages.map((o) => lagOf(gas, 0.03, o));
    lags.set(gas, known);
    return known;
  };

  // Common practice, and every measurement since Fisher and Bederson, Phys. Rev. 81, 109, 1951 (from memory, M).
  it.each(['argon', 'nitrogen'] as const)('in %s falls as the overvoltage rises, at each step from 1 to 100 %', (gas) => {
    const found = lagsOf(gas);
    for (let i = 1; i < found.length; i++) expect(found[i], `${overvoltages[i]}`).toBeLessThan(found[i - 1]);
    expect(found[0] / found[6]).toBeGreaterThan(30);
  });

  // Schade, Z. Phys. 104, 487, 1937 (from memory, M): t = T/(q − 1) ln[…] at small overvoltage, so half the overvoltage takes twice the time. 15 %: the logarithm and q − 1
  // against V both bend by a few per cent over the factor of two.
  it.each(['argon', 'nitrogen'] as const)('in %s doubles, within 15 %, from 2 to 1 % overvoltage', (gas) => {
    const [one, two] = lagsOf(gas);
    expect(relative(one / two, 2)).toBeLessThan(0.15);
  });
});

describe('the glow in argon', () => {
  // Normal cathode falls in argon: nickel 131, copper 130, iron 165 V (Cobine 1941, von Engel 1965, Raizer 1991; from memory, M). The model's normal glow is the minimum of its V(j).
  // A factor of 1.5 either way, wide because V goes as ln(1 + 1/γ) and the net yield, 0.07 here, is known to a factor of three: ± 40 %.
  it('has its lowest voltage within a factor of 1.5 of the normal cathode falls on nickel, copper and iron', () => {
    const volts = [2e6, 1e6, 5e5, 2e5, 1e5].map((ohms) => {
      const { outcome } = runOf({
        gas: 'argon',
        torr: 3,
        area: 10,
        ionYield: 0.07,
        seed: 1e-10,
        supply: `{ voltage: { step: 400 V }, series_resistance: ${ohms} ohm }`,
        until: 20e-3,
      });
      expect(outcome.verdict.regime).toBe('glow');
      expect(outcome.final.stop).toBe('steady');
      return outcome.final.gap_voltage_V;
    });
    const lowest = Math.min(...volts);
    expect(volts.indexOf(lowest)).toBeGreaterThan(0); // it falls first, then rises: abnormal
    expect(volts.indexOf(lowest)).toBeLessThan(volts.length - 1);
    expect(lowest).toBeGreaterThan(165 / 1.5);
    expect(lowest).toBeLessThan(130 * 1.5);
  });
});

describe('the voltage of a weak discharge', () => {
  /** gap voltage of a discharge of current density j [A/cm²] behind a resistance that drops 100 V */
  function voltageAt(gas: GasName, torr: number, ionYield: number, j: number, threshold: number): number {
    const { outcome } = runOf({
      gas,
      torr,
      area: 10,
      ionYield,
      seed: 1e-13,
      supply: `{ voltage: { step: ${threshold + 100} V }, series_resistance: ${100 / (10 * j)} ohm }`,
      until: 0.1,
      numerics: '{ tolerance: 1e-5 }',
    });
    expect(outcome.verdict.self_sustaining).toBe(true);
    expect(relative(outcome.final.current_A, 10 * j)).toBeLessThan(0.05);
    return outcome.final.gap_voltage_V;
  }

  // von Engel and Steenbeck 1934, Raizer 1991, Šijačić and Ebert, Phys. Rev. E 66, 066410, 2002 (sign from memory, H; order read): the voltage falls with the current
  // where E/p at threshold is below B/2 and rises where it is above. Nitrogen, B 342 and 275 V/(cm Torr): 85 V/(cm Torr) at 10 Torr cm, 280 at 1 Torr cm. Two currents of one run each: no threshold enters.
  it.each([
    ['falls', 10, 855],
    ['rises', 1, 280],
  ] as const)('%s with the current in nitrogen at %d Torr cm', (way, torr, threshold) => {
    const weak = voltageAt('nitrogen', torr, 0.03, 1e-7, threshold);
    const strong = voltageAt('nitrogen', torr, 0.03, 1e-6, threshold);
    const change = strong / weak - 1;
    // at 1 µA/cm² the field is distorted by a few per cent, and the voltage by the order of its square
    expect(Math.abs(change)).toBeGreaterThan(1e-4);
    expect(Math.abs(change)).toBeLessThan(1e-2);
    expect(change < 0 ? 'falls' : 'rises').toBe(way);
  });
});
