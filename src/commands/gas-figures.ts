import type { GasData } from '../gases/gas.ts';
import { dataSets, gasData } from '../gases/index.ts';
import { type CoefficientCurve, gasFigures } from '../report/gas/figures.ts';
import { ResultFileError } from '../results/errors.ts';
import { namedCoefficients } from './coefficients.ts';
import { fileFailure } from './file-failure.ts';
import { writeFigures } from './report-figures.ts';

/** Draws the coefficient curves of a set of data into a folder, other sets of the gas beside them. @returns what was written, for people
 *  @throws Failure when the folder cannot be written */
export async function writeGasFigures(gas: GasData, folder: string): Promise<string> {
  const others = dataSets(gas.name).flatMap((set) => {
    const data = set === gas.set ? null : gasData(gas.name, set);
    return data === null ? [] : [{ set, named: namedCoefficients(data.coefficients) }];
  });
  const curves = namedCoefficients(gas.coefficients).map(({ name, label, unit, coefficient }): CoefficientCurve => {
    const { form, range, source, status, uncertainty } = coefficient;
    const elsewhere = others.flatMap(({ set, named }) => {
      const other = named.find((each) => each.name === name)?.coefficient;
      return other === undefined || JSON.stringify(other.form) === JSON.stringify(form) ? [] : [{ set, form: other.form }];
    });
    return { name, label, unit, form, range, source, status, uncertainty, others: elsewhere };
  });
  try {
    return await writeFigures(folder, gasFigures(gas.title, curves));
  } catch (thrown) {
    throw thrown instanceof ResultFileError ? fileFailure(thrown) : thrown;
  }
}
