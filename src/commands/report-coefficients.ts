import type { CoefficientsUsed, CoefficientUsed } from '../report/run/report.ts';
import { TOWNSEND } from '../units/constants.ts';
import { formatQuantity } from '../units/index.ts';

/** The coefficients that a result file keeps, in words. */

const LABELS: Readonly<Record<string, string>> = {
  ionisation: 'ionisation α/N',
  attachment: 'attachment η/N',
  electron_mobility: 'electron mobility μN',
  electron_energy: 'electron energy D/μ',
  ion_mobility: 'ion mobility μN',
  ion_energy: 'ion energy D/μ',
  negative_ion_mobility: 'negative-ion mobility μN',
  negative_ion_energy: 'negative-ion energy D/μ',
  electron_ion_recombination: 'recombination of electrons',
  ion_ion_recombination: 'recombination of ions',
};

/** Null where the text is not what this program writes. */
export function coefficientsOf(json: string): CoefficientsUsed | null {
  let all: unknown;
  try {
    all = JSON.parse(json);
  } catch {
    return null;
  }
  const coefficients = part(all, 'coefficients');
  if (typeof coefficients !== 'object' || coefficients === null) return null;
  const entries = Object.entries(coefficients).map(([name, value]) =>
    entry(name, LABELS[name] ?? name, value, formText(part(value, 'form'), text(part(value, 'unit')))),
  );
  const electrodes = part(all, 'electrodes');
  const [left, right] = [part(electrodes, 'left'), part(electrodes, 'right')];
  const same = JSON.stringify(left) === JSON.stringify(right);
  const yieldOf = (electrode: unknown, label: string, name: string): CoefficientUsed => {
    const ion = part(electrode, 'ion_yield');
    const material = text(part(electrode, 'material'));
    return entry(name, `${label}${material === '' ? '' : `, ${material}`}`, ion, yieldText(ion));
  };
  entries.push(yieldOf(left, same ? 'ion yield of both electrodes' : 'ion yield, left', 'left_ion_yield'));
  if (!same) entries.push(yieldOf(right, 'ion yield, right', 'right_ion_yield'));
  const notes = part(all, 'notes');
  return {
    gas: optionalText(part(all, 'gas')),
    notes: Array.isArray(notes) ? notes.map(text) : [],
    breakdownUncertainty: number(part(all, 'breakdown_uncertainty')),
    entries,
  };
}

function entry(name: string, label: string, value: unknown, words: string): CoefficientUsed {
  const range = part(value, 'range');
  const [from, to] = [number(part(range, 'from')), number(part(range, 'to'))];
  return {
    name,
    label,
    value: words,
    source: text(part(value, 'source')),
    status: text(part(value, 'status')),
    uncertainty: number(part(value, 'uncertainty')),
    note: optionalText(part(value, 'note')),
    range: from === null && to === null ? null : { from: from ?? 0, to: to ?? Number.POSITIVE_INFINITY },
  };
}

function yieldText(ion: unknown): string {
  const [typical, low, high] = ['typical', 'low', 'high'].map((key) => number(part(ion, key)));
  if (typical === null) return part(ion, 'form') === undefined ? '–' : formText(part(ion, 'form'), '');
  const factor = part(ion, 'law') === undefined ? '' : ', times its law of the field at the cathode';
  return low === null || high === null || low === high
    ? `${formatQuantity(typical, '')}${factor}`
    : `${formatQuantity(typical, '')}, published ${formatQuantity(low, '')} to ${formatQuantity(high, '')}${factor}`;
}

/** A form with its numbers; x = E/N. */
function formText(form: unknown, unit: string): string {
  const value = (key: string): string => {
    const v = number(part(form, key));
    return v === null ? '–' : formatQuantity(v, unit);
  };
  const bare = (key: string): string => formatQuantity(number(part(form, key)) ?? Number.NaN, '');
  const field = (key: string): string => formatQuantity((number(part(form, key)) ?? Number.NaN) / TOWNSEND, 'Td');
  const count = (key: string): number => {
    const list = part(form, key);
    return Array.isArray(list) ? list.length : 0;
  };
  switch (part(form, 'kind')) {
    case 'constant':
      return value('value');
    case 'exponential':
      return `A exp(−B/x), A = ${value('A')}, B = ${field('B')}`;
    case 'root':
      return `C exp(−D/√x), C = ${value('C')}, D = ${formatQuantity((number(part(form, 'D')) ?? Number.NaN) / Math.sqrt(TOWNSEND), 'Td^½')}`;
    case 'exponential-sum':
      return `sum of ${count('terms')} terms a exp(−b/x)`;
    case 'power':
      return `proportional to x^${bare('exponent')}, held below ${field('floor')}`;
    case 'linear':
      return `a + b x, a = ${value('a')}`;
    case 'linear-drift':
      return 'from a drift velocity linear in x';
    case 'falling':
      return `falling from ${value('low')}, by half at some ${field('scale')}`;
    case 'table':
      return `table of ${count('x')} rows`;
    case 'joined': {
      const pieces = part(form, 'pieces');
      return Array.isArray(pieces)
        ? pieces
            .map(
              (piece) =>
                `from ${formatQuantity((number(part(piece, 'from')) ?? 0) / TOWNSEND, 'Td')}: ${formText(part(piece, 'form'), unit)}`,
            )
            .join('; ')
        : '–';
    }
    case 'mixed':
      return `made of those of ${count('parts')} gases, by the rule at the right`;
    default:
      return '–';
  }
}

function part(value: unknown, key: string): unknown {
  return typeof value === 'object' && value !== null && Object.hasOwn(value, key) ? (value as Record<string, unknown>)[key] : undefined;
}

function text(value: unknown): string {
  return typeof value === 'string' ? value : '';
}

function optionalText(value: unknown): string | null {
  return typeof value === 'string' && value !== '' ? value : null;
}

function number(value: unknown): number | null {
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}
