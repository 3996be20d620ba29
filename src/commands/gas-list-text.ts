import { TABLE_TEMPERATURE } from '../gases/conversions.ts';
import { dataSets, gases } from '../gases/index.ts';
import { surfaces } from '../surfaces/index.ts';
import { BOLTZMANN, TOWNSEND } from '../units/constants.ts';
import { COMMON_CATHODE, minimumOf, yieldRow } from './gas-facts.ts';
import { columns, NO_BREAK, wrap } from './layout.ts';
import { percent, quantity } from './quantities.ts';
import type { Terminal } from './terminal.ts';

const TORR = 101325 / 760;
/** below this a table of five columns is a pile of single words */
const WIDE_ENOUGH = 70;
/** whose yields the table of materials shows */
const SHOWN = ['air', 'nitrogen', 'argon', 'hydrogen', 'helium'];

/** What `gapwake gas` prints without a name. */
export function listText(terminal: Terminal): string {
  const { style, width } = terminal;
  const table = (rows: readonly (readonly string[])[], widths: readonly number[]): string[] => {
    if (width >= WIDE_ENOUGH) {
      const [head, ...body] = columns(rows, widths, width);
      return [style.faint(head), ...body];
    }
    const [head, ...body] = rows;
    return body.flatMap(([name, ...cells]) =>
      wrap(`${name}: ${cells.map((cell, i) => `${head[i + 1]} ${cell}`).join('; ')}`, width, '', '  '),
    );
  };
  const lines = [
    style.strong('Gases'),
    ...table(gasRows(), [22, 20, 14, 7, 6, 7]),
    '',
    ...wrap(
      `α/N: fields for which its source vouches. min, pd: lowest breakdown voltage of a uniform field [V] and its p × d [Torr cm, 20${NO_BREAK}°C], in closed form ` +
        `with γ, the typical yield of an unspecified metal (material ${COMMON_CATHODE}). ±: by how much the voltage is uncertain at a known yield; the yield adds to that. No limit to work to.`,
      width,
    ),
    ...wrap(`Other data: ${alternatives()}.`, width),
    '',
    style.strong('Cathode materials'),
    ...table(surfaceRows(), [19, 11, 10, 10, 10, 10]),
    '',
    ...wrap('φ: work function. The rest: typical electrons per ion in that gas, known to a factor; each page gives the spread.', width),
    ...wrap('gapwake gas NAME: every coefficient with source, range and uncertainty, or a material.', width),
  ];
  return `${lines.join('\n')}\n`;
}

function gasRows(): string[][] {
  const rows = Object.values(gases).map((gas) => {
    const { typical } = yieldRow(COMMON_CATHODE, gas.name);
    const minimum = minimumOf(gas, typical);
    return [
      gas.name,
      gas.set,
      rangeOf(gas.coefficients.ionisation.range),
      minimum === null ? 'none' : String(Math.round(minimum.voltage)),
      minimum === null ? '–' : quantity((minimum.column * BOLTZMANN * TABLE_TEMPERATURE * 100) / TORR, '', 2),
      String(typical),
      percent(gas.breakdownUncertainty),
    ];
  });
  return [['name', 'data', 'α/N, Td', 'min', 'pd', 'γ', '±'], ...rows];
}

function rangeOf(range: { readonly from: number; readonly to: number } | null): string {
  if (range === null) return 'any';
  const [from, to] = [range.from, range.to].map((x) => String(Number((x / TOWNSEND).toPrecision(3))));
  return range.to / TOWNSEND > 1e12 ? `from ${from}` : `${from} to ${to}`;
}

function alternatives(): string {
  return Object.keys(gases)
    .flatMap((gas) => {
      const others = dataSets(gas).slice(1);
      return others.length === 0 ? [] : [`${gas} (${others.join(', ')})`];
    })
    .join('; ');
}

function surfaceRows(): string[][] {
  const rows = Object.values(surfaces).map(({ name, workFunction }) => [
    name,
    workFunction === null ? '–' : `${workFunction.value}${NO_BREAK}eV`,
    ...SHOWN.map((gas) => String(yieldRow(name, gas).typical)),
  ]);
  return [['name', 'φ', ...SHOWN], ...rows];
}
