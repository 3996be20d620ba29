import { formatQuantity } from '../../units/index.ts';
import type { Figure } from '../figure/frame.ts';
import { FIELDS, nearest, type RunField, type RunScalar, type RunSeries } from '../run/data.ts';
import { PROFILES, pathFigure, profileFigure, type TimeFigureName, timeFigure, timeFigureNames } from '../run/figures.ts';
import type { RunPageData } from '../run/page.ts';
import { TIME_AXES, type TimeAxisKind, type TimeScale, timeScale } from '../run/time-axis.ts';
import { canvasAddress, toNode } from './dom.ts';
import { exact, field } from './unpack.ts';

/** The script of run pages: draws the figures and links them in time. */

const UNITS: Readonly<Record<RunScalar, string>> = {
  supplyVoltage: 'V',
  openGapVoltage: 'V',
  gapVoltage: 'V',
  conductionCurrent: 'A',
  totalCurrent: 'A',
  supplyCurrent: 'A',
  gapEnergy: 'J',
  sourceEnergy: 'J',
};

function byId<T extends HTMLElement>(id: string): T {
  const found = document.getElementById(id);
  if (found === null) throw new Error(`the page has no ${id}`);
  return found as T;
}

async function unpacked(data: RunPageData): Promise<RunSeries> {
  const entries = async <K extends string, V>(record: Readonly<Record<K, V>>, open: (value: V) => Promise<unknown>): Promise<unknown> =>
    Object.fromEntries(await Promise.all(Object.entries(record).map(async ([key, value]) => [key, await open(value as V)] as const)));
  const [time, x, scalars, fields] = await Promise.all([
    exact(data.time),
    exact(data.x),
    entries(data.scalars, exact) as Promise<RunSeries['scalars']>,
    entries(data.fields as Record<RunField, NonNullable<RunPageData['fields'][RunField]>>, field) as Promise<RunSeries['fields']>,
  ]);
  const absent = Object.fromEntries(FIELDS.map((key) => [key, null]));
  return { time, x, scalars, fields: { ...absent, ...fields }, setting: data.setting, events: data.events };
}

/** A figure over time in the page. */
interface Panel {
  readonly holder: HTMLElement;
  readonly figure: Figure;
  readonly cursor: readonly SVGElement[];
  readonly readings: readonly { readonly node: globalThis.Element; readonly key: RunScalar }[];
}

class RunView {
  readonly #run: RunSeries;
  readonly #column: HTMLElement = byId('over-time');
  readonly #now: HTMLElement = byId('now');
  readonly #moment: HTMLInputElement = byId('moment');
  readonly #where: HTMLElement = byId('where');
  readonly #hold: HTMLElement = byId('hold');
  #axis: TimeAxisKind = 'activity';
  #scale: TimeScale;
  #panels: Panel[] = [];
  #index: number;
  #held = false;
  #width = 0;
  #nowWidth = 0;
  #pending = false;

  constructor(run: RunSeries) {
    this.#run = run;
    this.#scale = timeScale(this.#axis, run);
    const interesting = run.events[run.events.length - 1]?.time ?? run.time[run.time.length - 1];
    this.#index = nearest(run.time, interesting);
    this.#listen();
    this.#layOut();
    new ResizeObserver(() => this.#layOut()).observe(document.body);
  }

  #listen(): void {
    this.#moment.addEventListener('input', () => this.#go(Number(this.#moment.value)));
    this.#hold.addEventListener('click', () => this.#setHeld(!this.#held));
    const events = byId('events');
    for (const { name, time } of this.#run.events) {
      const button = document.createElement('button');
      button.type = 'button';
      button.textContent = name;
      button.title = formatQuantity(time, 's', 4);
      button.addEventListener('click', () => this.#go(nearest(this.#run.time, time)));
      events.append(button);
    }
    for (const input of document.querySelectorAll<HTMLInputElement>('input[name=axis]')) {
      // a browser may restore what was chosen before
      if (input.checked) this.#axis = input.value as TimeAxisKind;
      input.addEventListener('change', () => {
        this.#axis = input.value as TimeAxisKind;
        this.#drawAll();
      });
    }
    document.addEventListener('keydown', (event) => this.#key(event));
    window.addEventListener('beforeprint', () => {
      for (const details of document.querySelectorAll('details')) details.open = true;
    });
  }

  #key(event: KeyboardEvent): void {
    const target = event.target as HTMLElement;
    if (event.ctrlKey || event.altKey || event.metaKey) return;
    const events = this.#run.events.map(({ time }) => nearest(this.#run.time, time));
    const last = this.#run.time.length - 1;
    if (event.key === '[' || event.key === ']') {
      const next = event.key === ']' ? events.find((i) => i > this.#index) : events.filter((i) => i < this.#index).pop();
      this.#go(next ?? (event.key === ']' ? last : 0));
      return;
    }
    // the slider and the radio buttons have their own arrows, and text that scrolls sideways too
    if (/^(INPUT|SELECT|TEXTAREA)$/.test(target.tagName) || target.closest('.scroll, pre') !== null) return;
    const step = event.shiftKey ? Math.max(1, Math.round(last / 20)) : 1;
    if (event.key === 'ArrowRight') this.#go(this.#index + step);
    else if (event.key === 'ArrowLeft') this.#go(this.#index - step);
    else return;
    event.preventDefault();
  }

  #setHeld(held: boolean): void {
    this.#held = held;
    this.#hold.setAttribute('aria-pressed', String(held));
  }

  #go(index: number): void {
    this.#index = Math.min(this.#run.time.length - 1, Math.max(0, index));
    if (this.#pending) return;
    this.#pending = true;
    requestAnimationFrame(() => {
      this.#pending = false;
      this.#drawNow();
    });
  }

  #layOut(): void {
    const inner = (holder: HTMLElement): number => Math.max(280, Math.floor(holder.clientWidth) - 16);
    const [width, nowWidth] = [inner(this.#column), inner(this.#now)];
    if (width === this.#width && nowWidth === this.#nowWidth) return;
    [this.#width, this.#nowWidth] = [width, nowWidth];
    this.#drawAll();
  }

  #drawAll(): void {
    const explanation = TIME_AXES.find(({ kind }) => kind === this.#axis)?.explanation ?? '';
    byId('axis-explanation').textContent = explanation;
    this.#scale = timeScale(this.#axis, this.#run);
    const layout = { width: this.#width, scale: this.#scale };
    const names = timeFigureNames(this.#run);
    this.#panels = names.map((name, i) =>
      this.#panel(name, timeFigure(name, this.#run, { ...layout, nameMarks: i % 2 === 0 }, canvasAddress)),
    );
    this.#column.replaceChildren(...this.#panels.map(({ holder }) => holder));
    this.#drawNow();
  }

  #panel(name: TimeFigureName, figure: Figure): Panel {
    const svg = toNode(figure.root) as SVGElement;
    const { box } = figure;
    const cursor = ['halo', 'now'].map((kind) => {
      const line = document.createElementNS('http://www.w3.org/2000/svg', 'line');
      line.setAttribute('class', kind);
      line.setAttribute('y1', String(box.top));
      line.setAttribute('y2', String(box.top + box.height));
      svg.append(line);
      return line;
    });
    const holder = document.createElement('figure');
    holder.className = 'plot card timed';
    holder.dataset.figure = name;
    holder.append(svg);
    const indexAt = (event: PointerEvent): number => {
      const { left, width } = svg.getBoundingClientRect();
      const share = (((event.clientX - left) / width) * svg.clientWidth - box.left) / box.width;
      return nearest(this.#run.time, this.#scale(box.width).from(Math.min(1, Math.max(0, share))));
    };
    svg.addEventListener('pointermove', (event) => {
      if (!this.#held) this.#go(indexAt(event));
    });
    svg.addEventListener('click', (event) => {
      this.#setHeld(!this.#held);
      this.#go(indexAt(event as PointerEvent));
    });
    const readings = [...svg.querySelectorAll('[data-reading]')].map((node) => ({
      node,
      key: node.getAttribute('data-reading') as RunScalar,
    }));
    return { holder, figure, cursor, readings };
  }

  #drawNow(): void {
    const run = this.#run;
    const i = this.#index;
    const t = run.time[i];
    const scale = this.#scale(1);
    for (const { figure, cursor, readings } of this.#panels) {
      const x = String(figure.box.left + scale.at(t) * figure.box.width);
      for (const line of cursor) {
        line.setAttribute('x1', x);
        line.setAttribute('x2', x);
      }
      for (const { node, key } of readings) node.textContent = formatQuantity(run.scalars[key][i], UNITS[key]);
    }
    const plots = [...PROFILES.map((name) => profileFigure(name, run, i, this.#nowWidth)), pathFigure(run, i, this.#nowWidth)];
    this.#now.replaceChildren(
      ...plots.map(({ root }) => {
        const holder = document.createElement('figure');
        holder.className = 'plot card';
        holder.append(toNode(root));
        return holder;
      }),
    );
    const where = `${formatQuantity(t, 's', 5)}: ${formatQuantity(run.scalars.gapVoltage[i], 'V')}, ${formatQuantity(run.scalars.conductionCurrent[i], 'A')}`;
    this.#where.textContent = where;
    this.#moment.value = String(i);
    this.#moment.setAttribute('aria-valuetext', where);
    document.body.dataset.index = String(i);
    document.body.dataset.time = String(t);
  }
}

async function start(): Promise<void> {
  const data = JSON.parse(byId('data').textContent ?? '') as RunPageData;
  new RunView(await unpacked(data));
  document.body.dataset.ready = String(Math.round(performance.now()));
}

void start();
