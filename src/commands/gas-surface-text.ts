import { gases } from '../gases/index.ts';
import { cleanYieldFor } from '../surfaces/index.ts';
import type { SurfaceData } from '../surfaces/metals.ts';
import { VERSION } from '../version.ts';
import { yieldRow } from './gas-facts.ts';
import { FROM_MEMORY, standing } from './gas-text.ts';
import { columns, NO_BREAK, wrap } from './layout.ts';
import type { Terminal } from './terminal.ts';

/** The page of a cathode material: its work function and its yield in every gas, each with its source. */
export function surfaceText(surface: SurfaceData, { width, style }: Terminal): string {
  const { name, title, workFunction, note } = surface;
  const rows = [...Object.keys(gases), 'any'].map((gas) => ({ gas, row: yieldRow(name, gas), clean: cleanYieldFor(name, gas) }));
  const lines = [
    style.strong(title),
    ...wrap(`Cathode material ${name}. gapwake ${VERSION}.`, width),
    ...(workFunction === null
      ? wrap('Work function: none.', width)
      : wrap(
          `Work function ${workFunction.value}${NO_BREAK}eV ±${NO_BREAK}${workFunction.uncertainty}${NO_BREAK}eV: ${workFunction.status}. ${workFunction.source}.`,
          width,
        )),
    ...(note === undefined ? [] : wrap(note, width)),
    '',
    style.strong('Ion yields: electrons that leave for good, per ion'),
    ...columns(
      [
        ['  gas', 'typical', 'low to high', 'clean', 'status'],
        ...rows.map(({ gas, row, clean }) => [
          `  ${gas === 'any' ? 'any other' : gas}`,
          String(row.typical),
          `${row.low} to ${row.high}`,
          clean === null ? '–' : String(Number(clean.typical.toPrecision(2))),
          row.status,
        ]),
      ],
      [24, 9, 17, 8],
      width,
    ),
    ...wrap('Clean: of slow ions on the atomically clean material, which no electrode in use is.', width, '  '),
    '',
    style.strong('Sources'),
  ];
  for (const { gas, row, clean } of rows) {
    lines.push(
      ...wrap(`${gas === 'any' ? 'any other' : gas}: ${row.source}.${row.note === undefined ? '' : ` ${row.note}`}`, width, '  ', '    '),
    );
    if (clean !== null) lines.push(...wrap(`clean: ${standing(clean)}. ${clean.source}.`, width, '    '));
  }
  if (lines.some((line) => line.includes('from memory ('))) lines.push('', ...wrap(FROM_MEMORY, width));
  return `${lines.join('\n')}\n`;
}
