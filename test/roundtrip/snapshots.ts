import type { Snapshot } from '../../src/results/variables.ts';
import type { RunDocuments } from '../../src/results/write.ts';

export const documents: RunDocuments = {
  title: 'Prüfling at 1.2 Torr',
  version: '1.2.3',
  caseText: '# µ and Ω\ntitle: Prüfling at 1.2 Torr\n',
  outcomeJson: '{"format":"gapwake.outcome/1","verdict":{"state":"holds"}}',
  coefficientsJson: '{"ionisation":{"source":"a book, table 1"}}',
  tablesJson: '{"bias.csv":"t [s],bias [V]\\n0,0\\n1,400\\n"}',
};

export function cellCentres(cells: number): Float64Array {
  return Float64Array.from({ length: cells }, (_, cell) => ((cell + 0.5) * 6e-3) / cells);
}

/** A snapshot whose every value differs from every other, over the ranges a run covers. */
export function snapshot(index: number, cells: number, negativeIons: boolean): Snapshot {
  const profile = (scale: number): Float64Array =>
    Float64Array.from({ length: cells }, (_, cell) => scale * Math.sin(1 + 0.1 * cell + index) * (1 + index));
  const always: Snapshot = {
    time: 1e-18 + index * 1e-9,
    supplyVoltage: 420 + index,
    openGapVoltage: 419.5 + index / 3,
    gapVoltage: -418.25 - index / 7,
    conductionCurrent: 1e-18 * (1 + index),
    totalCurrent: 1e15 + index,
    supplyCurrent: 1e300 / (1 + index),
    gapEnergy: 1e-30 * index,
    sourceEnergy: 0.1 * index,
    electronDensity: profile(1e15),
    ionDensity: profile(3e20),
    electricField: profile(-7e4),
    potential: profile(420),
    electronFlux: profile(1e22),
    ionFlux: profile(-1e18),
    ionisationRate: profile(1e30),
  };
  return negativeIons ? { ...always, negativeIonDensity: profile(1e12), negativeIonFlux: profile(1e-20) } : always;
}
