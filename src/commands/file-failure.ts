import type { ResultFileError } from '../results/errors.ts';
import { printable } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';

/** A result file that cannot be read or written ends a command. */
export function fileFailure({ path, code, message }: ResultFileError): Failure {
  return new Failure(
    EXIT.file,
    [`gapwake: ${printable(path)}: ${printable(message)}`],
    [problemWithoutPlace(code, path, 'a place where the result can be written', message)],
  );
}
