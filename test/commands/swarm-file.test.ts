import { describe, expect, test } from 'vitest';
import { readSet } from '../../src/commands/swarm-file.ts';
import { crossSectionSets } from '../../src/kinetics/sets.ts';
import { setOfUser } from '../../src/kinetics/user-set.ts';

const GOOD = `# a set
process, name, threshold [eV], energy [eV], cross_section [m^2]
elastic, , , 0, 5e-20
elastic, , 0, 1, 6e-20
excitation, a, 10, 10, 0
excitation, a, 10, 20, 1e-20
excitation, "b, upper", 12, 12, 0
excitation, "b, upper", 12, 30, 2e-20
ionisation, , 15, 15, 0
ionisation, , 15, 100, 3e-20
attachment, , , 0.1, 1e-22
attachment, , , 5, 0
`;

const read = (text: string): ReturnType<typeof readSet> => readSet(text);
const problemsOf = (text: string): string[] => {
  const result = read(text);
  return result.ok ? [] : result.problems.map(({ line, column, expected, found }) => `${line}:${column} ${expected} | ${found}`);
};
const changed = (from: string, to: string): string[] => {
  expect(GOOD).toContain(from);
  return problemsOf(GOOD.replace(from, to));
};

describe('a file of cross-sections', () => {
  test('is read into its processes, told apart by kind and name', () => {
    const result = read(GOOD);
    if (!result.ok) throw new Error('refused');
    expect(result.processes).toEqual([
      { kind: 'elastic', name: 'elastic', threshold: 0, energies: [0, 1], values: [5e-20, 6e-20] },
      { kind: 'excitation', name: 'a', threshold: 10, energies: [10, 20], values: [0, 1e-20] },
      { kind: 'excitation', name: 'b, upper', threshold: 12, energies: [12, 30], values: [0, 2e-20] },
      { kind: 'ionisation', name: 'ionisation', threshold: 15, energies: [15, 100], values: [0, 3e-20] },
      { kind: 'attachment', name: 'attachment', threshold: 0, energies: [0.1, 5], values: [1e-22, 0] },
    ]);
    const set = setOfUser({ title: 'x', mass: 6.6e-27, processes: [...result.processes].reverse(), ejectedWidth: null });
    expect(set.processes[0].kind).toBe('elastic');
    expect(set.range.to).toBe(1);
  });

  test('may have other units and another order of columns', () => {
    const result = read(
      'energy [J],cross_section [cm^2],threshold [meV],process\n0,1e-15,0,momentum-transfer\n1.602176634e-19,2e-15,0,momentum-transfer\n',
    );
    if (!result.ok) throw new Error('refused');
    expect(result.processes[0].energies[1]).toBeCloseTo(1, 12);
    expect(result.processes[0].values[1]).toBeCloseTo(2e-19, 30);
  });

  test.each([
    ['elastic, , , 0, 5e-20', 'elastc, , , 0, 5e-20', '3:1 one of elastic, momentum-transfer, excitation, ionisation, attachment | elastc'],
    ['elastic, , 0, 1, 6e-20', 'elastic, , 0, 0, 6e-20', '4:15 energies of a process in strictly rising order | 0 eV after 0 eV'],
    ['elastic, , 0, 1, 6e-20', 'elastic, , 0, 1, -6e-20', '4:18 a finite number, not negative, with a decimal point | -6e-20'],
    ['elastic, , 0, 1, 6e-20', 'elastic, , 0, 1', '4:1 5 fields, as in the header | 4'],
    ['ionisation, , 15, 15, 0', 'ionisation, , , 15, 0', '9:15 a finite number, not negative, with a decimal point | nothing'],
    [
      'ionisation, , 15, 100, 3e-20',
      'ionisation, , 16, 100, 3e-20',
      '10:15 the threshold of line 9, 15 eV; another process of this kind has another `name` | 16 eV',
    ],
    ['excitation, a, 10, 10, 0', 'excitation, a, 10, 9, 1e-22', '5:23 0 below the threshold, 10 eV | 1e-22'],
    ['[m^2]', '[m^3]', '2:45 the column as cross_section [m^2] | [m^3]'],
    ['energy [eV]', 'energy', '2:32 the column as energy [eV] | energy without a unit'],
    ['energy [eV]', 'enrgy [eV]', '2:32 only process, threshold, energy, cross_section and name | enrgy'],
    ['excitation, a, 10, 20, 1e-20', 'momentum-transfer, a, 0, 20, 1e-20', 'null'],
  ])('with %j changed to %j is refused at its place', (from, to, message) => {
    const problems = changed(from, to);
    if (message === 'null') expect(problems.some((text) => text.includes('one process of elastic scattering'))).toBe(true);
    else expect(problems.join('\n')).toContain(message);
  });

  test('needs a header, elastic scattering, two rows a process, a value above 0', () => {
    expect(problemsOf('# nothing\n')[0]).toMatch(/no header/);
    const head = 'process,threshold [eV],energy [eV],cross_section [m^2]\n';
    expect(problemsOf(`${head}excitation,1,1,0\nexcitation,1,2,1e-20\n`)).toEqual([
      'null:null a process `elastic` or `momentum-transfer` | none',
    ]);
    expect(problemsOf(`${head}elastic,0,1,1e-20\n`)[0]).toMatch(/two rows for each process/);
    expect(problemsOf(`${head}elastic,0,1,1e-20\nelastic,0,2,1e-20\nionisation,9,9,0\nionisation,9,12,0\n`)[0]).toMatch(
      /above 0 somewhere/,
    );
  });

  test('with very many mistakes tells twenty', () => {
    const head = 'process,threshold [eV],energy [eV],cross_section [m^2]\n';
    expect(problemsOf(head + 'x,0,1,1\n'.repeat(1000))).toHaveLength(20);
  });
});

test('built-in sets say source, status and what is uncertain', () => {
  for (const set of Object.values(crossSectionSets)) {
    expect(set.source.length).toBeGreaterThan(30);
    expect(set.notes.length).toBeGreaterThan(0);
    expect(set.uncertainty).not.toBeNull();
  }
});
