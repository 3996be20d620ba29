import { caseJsonSchema, caseTemplate } from '../casefile/index.ts';
import { highestOpenGapVoltage } from '../onset/highest-voltage.ts';
import { prognosisCautions } from '../onset/prognosis.ts';
import { kineticsOf } from '../theory/kinetic.ts';
import { predict, prospects } from '../theory/predict.ts';
import { printable, printableJson } from '../units/printable.ts';
import { VERSION } from '../version.ts';
import { loadCase } from './case-source.ts';
import { gasJson, yieldJson } from './check-spread.ts';
import { checkText } from './check-text.ts';
import type { CheckOptions } from './cli.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import type { Terminal } from './terminal.ts';

/** Reads a case and says what it means and what theory expects; simulates nothing in time. */
export async function check(path: string, options: CheckOptions, terminal: Terminal): Promise<void> {
  const loaded = loadCase(path, options.set);
  const settings = loaded.case;
  if (options.curve && settings.electrons === undefined) throw curveFailure(path);
  const voltage = highestOpenGapVoltage(settings);
  if (settings.electrons !== undefined)
    await (await import('../scan/gap-session.ts')).followAhead(settings, voltage, new AbortController().signal);
  const theory = predict(settings, voltage);
  const cautions = prognosisCautions(
    settings,
    loaded.defaults.map((entry) => entry.path),
  );
  const kinetics = kineticsOf(settings, voltage);
  const curve = options.curve ? await (await import('../scan/curve-session.ts')).breakdownCurve(settings) : null;
  if (options.json) {
    const { title, sha256 } = settings;
    const spreads = { gas: gasJson(settings, voltage), ion_yield: yieldJson(settings, voltage) };
    const answer = {
      format: 'gapwake.check/1',
      title,
      version: VERSION,
      case_sha256: sha256,
      case: loaded.resolved,
      theory,
      ...(kinetics === null ? {} : { kinetics: curve === null ? kinetics : { ...kinetics, breakdown_curve: curve } }),
      ...spreads,
      cautions,
    };
    terminal.out(printableJson(answer));
  } else if (!options.quiet) {
    terminal.out(
      checkText({ loaded, path, voltage, theory, prospects: prospects(settings, voltage), kinetics, curve, cautions }, terminal),
    );
  }
}

/** A breakdown curve of a case whose electrons follow the local field. */
function curveFailure(path: string): Failure {
  const [expected, found] = ['electrons: { closure: kinetic } beside --curve', 'closure: local-field'];
  return new Failure(
    EXIT.wrongInput,
    [`${printable(path)}: electrons.closure: expected ${expected}, found ${found}`],
    [{ ...problemWithoutPlace('inconsistent', path, expected, found), path: 'electrons.closure' }],
  );
}

export function printTemplate(terminal: Terminal): void {
  terminal.out(caseTemplate());
}

export function printSchema(terminal: Terminal): void {
  terminal.out(`${JSON.stringify(caseJsonSchema(), null, 2)}\n`);
}
