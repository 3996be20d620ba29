import { formatQuantity } from '../../units/index.ts';
import { el } from '../element.ts';
import type { Figure } from '../figure/frame.ts';
import {
  axisValue,
  drawable,
  indicesOf,
  mainColumn,
  meaningAt,
  placeOf,
  pointsAlong,
  type ScanTable,
  type ScanView,
} from '../scan/data.ts';
import { curveAxis, curveFigure, pointAt, quantityMap, verdictMap } from '../scan/figures.ts';
import type { ScanPageData } from '../scan/page.ts';
import { together } from '../sections.ts';
import { canvasAddress, toNode } from './dom.ts';
import { begin, byId, innerWidth, openForPrint, plot } from './linked.ts';
import { exact, texts } from './unpack.ts';

/** The script of scan pages: curves or maps over what is varied, and the point that is chosen. */

class ScanViewer {
  readonly #table: ScanTable;
  readonly #drawn: HTMLElement = byId('drawn');
  readonly #quantity: HTMLSelectElement = byId('quantity');
  #view: ScanView;
  #selected: number;
  #width = 0;

  constructor(table: ScanTable) {
    this.#table = table;
    const { axes, layout } = table;
    const middle = axes.map(({ values }) => Math.floor((values.length - 1) / 2));
    // the two longest axes first
    const byLength = axes.map((_, k) => k).sort((a, b) => axes[b].values.length - axes[a].values.length);
    const two = layout === 'grid' && axes.length > 1 && axes[byLength[1]].values.length > 1;
    const [first, second] = two ? [byLength[0], byLength[1]].sort((a, b) => a - b) : [byLength[0] ?? 0, null];
    this.#view = { x: first, y: second, fixed: middle };
    this.#selected = layout === 'grid' ? placeOf(axes, middle) : Math.floor((table.count - 1) / 2);
    this.#fillQuantities();
    this.#listen();
    this.#layOut();
    new ResizeObserver(() => this.#layOut()).observe(document.body);
  }

  #fillQuantities(): void {
    const wanted = mainColumn(this.#table);
    for (const { name, longName } of drawable(this.#table)) {
      const option = document.createElement('option');
      option.value = name;
      option.textContent = longName;
      option.selected = name === wanted;
      this.#quantity.append(option);
    }
  }

  #listen(): void {
    const [x, y] = ['x', 'y'].map((id) => document.getElementById(id) as HTMLSelectElement | null);
    if (x !== null) x.value = String(this.#view.x);
    if (y !== null) y.value = this.#view.y === null ? '' : String(this.#view.y);
    x?.addEventListener('change', () => this.#choose(Number(x.value), this.#view.y, x, y));
    y?.addEventListener('change', () => this.#choose(this.#view.x, y.value === '' ? null : Number(y.value), x, y));
    this.#quantity.addEventListener('change', () => this.#draw());
    document.addEventListener('keydown', (event) => this.#key(event));
    this.#offerFixed();
    openForPrint();
  }

  /** An axis chosen twice changes places with the other. */
  #choose(x: number, y: number | null, xSelect: HTMLSelectElement | null, ySelect: HTMLSelectElement | null): void {
    const before = this.#view;
    const other = x === y ? (x === before.x ? before.y : before.x) : null;
    const next = x !== y ? { x, y } : x === before.x ? { x: other ?? before.x, y } : { x, y: other };
    this.#view = { ...before, x: next.x, y: next.y === next.x ? null : next.y };
    if (xSelect !== null) xSelect.value = String(this.#view.x);
    if (ySelect !== null) ySelect.value = this.#view.y === null ? '' : String(this.#view.y);
    this.#offerFixed();
    this.#draw();
  }

  #offerFixed(): void {
    const { axes, layout } = this.#table;
    const holder = byId('fixed');
    holder.replaceChildren();
    if (layout === 'list') return;
    axes.forEach((axis, k) => {
      if (k === this.#view.x || k === this.#view.y || axis.values.length < 2) return;
      const select = document.createElement('select');
      axis.values.forEach((value, i) => {
        const option = document.createElement('option');
        option.value = String(i);
        option.textContent = formatQuantity(value, axis.unit === '1' ? '' : axis.unit, 4);
        option.selected = i === this.#view.fixed[k];
        select.append(option);
      });
      select.addEventListener('change', () => {
        const fixed = this.#view.fixed.map((at, axisIndex) => (axisIndex === k ? Number(select.value) : at));
        const at = indicesOf(axes, this.#selected).map((i, axisIndex) => (axisIndex === k ? Number(select.value) : i));
        this.#view = { ...this.#view, fixed };
        this.#selected = placeOf(axes, at);
        this.#draw();
      });
      const label = document.createElement('label');
      label.append(`${axis.path} at `, select);
      holder.append(label);
    });
  }

  #key(event: KeyboardEvent): void {
    const target = event.target as HTMLElement;
    if (event.ctrlKey || event.altKey || event.metaKey || /^(INPUT|SELECT|TEXTAREA)$/.test(target.tagName)) return;
    if (target.closest('.scroll, pre') !== null) return;
    const steps: Readonly<Record<string, readonly [axis: 'x' | 'y', by: number]>> = {
      ArrowLeft: ['x', -1],
      ArrowRight: ['x', 1],
      ArrowDown: ['y', -1],
      ArrowUp: ['y', 1],
    };
    const step = steps[event.key];
    if (step === undefined) return;
    const [which, by] = step;
    const axis = this.#view[which];
    // without a second axis, up and down scroll the page as everywhere
    if (axis === null) return;
    event.preventDefault();
    const { axes, layout } = this.#table;
    if (layout === 'list') {
      const order = pointsAlong(this.#table, this.#view);
      this.#select(order[order.indexOf(this.#selected) + by]);
      return;
    }
    const { values } = axes[axis];
    const rising = values.map((_, i) => i).sort((a, b) => values[a] - values[b]);
    const at = indicesOf(axes, this.#selected);
    const next = rising[rising.indexOf(at[axis]) + by];
    if (next !== undefined)
      this.#select(
        placeOf(
          axes,
          at.map((i, k) => (k === axis ? next : i)),
        ),
      );
  }

  #select(place: number | undefined): void {
    if (place === undefined) return;
    this.#selected = place;
    this.#draw();
  }

  #layOut(): void {
    const width = innerWidth(this.#drawn);
    if (width === this.#width) return;
    this.#width = width;
    this.#draw();
  }

  #draw(): void {
    const table = this.#table;
    const view = this.#view;
    const name = this.#quantity.value;
    const figures: Figure[] =
      table.axes.length === 0
        ? []
        : view.y === null
          ? [curveFigure(table, view, name, this.#selected, this.#width)]
          : [
              verdictMap(table, view, this.#selected, this.#width, canvasAddress),
              quantityMap(table, view, name, this.#selected, this.#width, canvasAddress),
            ];
    this.#drawn.replaceChildren(
      ...figures.map((figure) => {
        const holder = plot(figure);
        holder.classList.add('points');
        holder.addEventListener('click', (event) => this.#select(this.#pointUnder(event, holder, figure)));
        return holder;
      }),
    );
    this.#describe();
  }

  #pointUnder(event: MouseEvent, holder: HTMLElement, { box }: Figure): number | undefined {
    const svg = holder.firstElementChild as SVGElement;
    const { left, top, width } = svg.getBoundingClientRect();
    const scale = svg.clientWidth / width;
    const sx = ((event.clientX - left) * scale - box.left) / box.width;
    const sy = 1 - ((event.clientY - top) * scale - box.top) / box.height;
    if (this.#view.y !== null) return pointAt(this.#table, this.#view, sx, sy);
    const axis = curveAxis(this.#table.axes[this.#view.x])(box.width);
    const distance = (place: number): number => Math.abs(axis.at(axisValue(this.#table, place, this.#view.x)) - sx);
    return pointsAlong(this.#table, this.#view).reduce((best, place) => (distance(place) < distance(best) ? place : best));
  }

  /** What was found at the chosen point. */
  #describe(): void {
    const table = this.#table;
    const place = this.#selected;
    // what was searched for comes first
    const columns = [...table.columns].sort((a, b) => Number(b.name.startsWith('found_')) - Number(a.name.startsWith('found_')));
    const rows = columns.flatMap((column) => {
      const value = meaningAt(column, place);
      if (value === null) return [];
      const shown =
        typeof value === 'number' ? formatQuantity(value, column.units === '1' ? '' : column.units, 4) : value.replaceAll('-', ' ');
      return [
        el(
          'tr',
          {},
          el('th', { scope: 'row' }, column.longName),
          el('td', { 'data-headline': column.name, 'data-value': String(value) }, shown),
        ),
      ];
    });
    const where = table.axes.map((axis, k) =>
      el(
        'tr',
        {},
        el('th', { scope: 'row' }, axis.path),
        el('td', {}, formatQuantity(axisValue(table, place, k), axis.unit === '1' ? '' : axis.unit, 5)),
      ),
    );
    byId('point').replaceChildren(
      toNode(el('h3', {}, `Point ${place}`)),
      toNode(el('p', {}, together(table.reasons[place] ?? ''))),
      toNode(el('table', {}, el('tbody', {}, where, rows))),
    );
    document.body.dataset.point = String(place);
  }
}

void begin<ScanPageData>(async (data) => {
  const columns = await Promise.all(data.columns.map(async (column) => ({ ...column, values: await exact(column.values) })));
  new ScanViewer({ ...data, columns, reasons: await texts(data.reasons) });
});
