import type { Figure } from '../figure/frame.ts';
import type { Scale } from '../figure/scale.ts';
import { nearest } from '../nearest.ts';
import { toNode } from './dom.ts';

/** Figures over time that share one moment: pointer, keys, slider and event buttons move it in all of them. The page's fixed parts (`linked-section.ts`) have
 *  the places for all of this. */
export interface LinkedFigures {
  /** [s] never falling; moments are its indices */
  readonly time: Float64Array;
  readonly events: readonly { readonly name: string; readonly time: number; readonly text: string }[];
  readonly axes: readonly { readonly kind: string; readonly explanation: string }[];
  /** the moment shown first */
  readonly first: number;
  readonly scale: (axis: string) => (length: number) => Scale;
  /** figures over time, in order */
  readonly overTime: (scale: (length: number) => Scale, width: number) => readonly { readonly name: string; readonly figure: Figure }[];
  /** figures of one moment */
  readonly now: (index: number, width: number) => readonly Figure[];
  /** what stands beside the name of a curve */
  readonly reading: (key: string, index: number) => string;
  /** the moment in words */
  readonly where: (index: number) => string;
}

interface Panel {
  readonly holder: HTMLElement;
  readonly figure: Figure;
  readonly cursor: readonly SVGElement[];
  readonly readings: readonly { readonly node: globalThis.Element; readonly key: string }[];
}

export function byId<T extends HTMLElement>(id: string): T {
  const found = document.getElementById(id);
  if (found === null) throw new Error(`the page has no ${id}`);
  return found as T;
}

/** A figure in a frame of its own. */
export function plot(figure: Figure): HTMLElement {
  const holder = document.createElement('figure');
  holder.className = 'plot card';
  holder.append(toNode(figure.root));
  return holder;
}

/** Room inside of a column for a figure [px]. */
export function innerWidth(column: HTMLElement): number {
  return Math.max(280, Math.floor(column.clientWidth) - 16);
}

export class LinkedView {
  readonly #of: LinkedFigures;
  readonly #column: HTMLElement = byId('over-time');
  readonly #now: HTMLElement = byId('now');
  readonly #moment: HTMLInputElement = byId('moment');
  readonly #where: HTMLElement = byId('where');
  readonly #hold: HTMLElement = byId('hold');
  #axis: string;
  #scale: (length: number) => Scale;
  #panels: Panel[] = [];
  #index: number;
  #held = false;
  #width = 0;
  #nowWidth = 0;
  #pending = false;

  constructor(of: LinkedFigures) {
    this.#of = of;
    this.#axis = of.axes[0].kind;
    this.#index = of.first;
    this.#listen();
    this.#scale = of.scale(this.#axis);
    this.#layOut();
    new ResizeObserver(() => this.#layOut()).observe(document.body);
  }

  #listen(): void {
    const { time, events } = this.#of;
    this.#moment.addEventListener('input', () => this.#go(Number(this.#moment.value)));
    this.#hold.addEventListener('click', () => this.#setHeld(!this.#held));
    for (const event of events) {
      const button = document.createElement('button');
      button.type = 'button';
      button.textContent = event.name;
      button.title = event.text;
      button.addEventListener('click', () => this.#go(nearest(time, event.time)));
      byId('events').append(button);
    }
    for (const input of document.querySelectorAll<HTMLInputElement>('input[name=axis]')) {
      // a browser may restore what was chosen before
      if (input.checked) this.#axis = input.value;
      input.addEventListener('change', () => {
        this.#axis = input.value;
        this.#drawAll();
      });
    }
    document.addEventListener('keydown', (event) => this.#key(event));
    openForPrint();
  }

  #key(event: KeyboardEvent): void {
    const target = event.target as HTMLElement;
    if (event.ctrlKey || event.altKey || event.metaKey) return;
    const last = this.#of.time.length - 1;
    if (event.key === '[' || event.key === ']') {
      const events = this.#of.events.map(({ time }) => nearest(this.#of.time, time));
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
    this.#index = Math.min(this.#of.time.length - 1, Math.max(0, index));
    if (this.#pending) return;
    this.#pending = true;
    requestAnimationFrame(() => {
      this.#pending = false;
      this.#drawNow();
    });
  }

  #layOut(): void {
    const [width, nowWidth] = [innerWidth(this.#column), innerWidth(this.#now)];
    if (width === this.#width && nowWidth === this.#nowWidth) return;
    [this.#width, this.#nowWidth] = [width, nowWidth];
    this.#drawAll();
  }

  #drawAll(): void {
    byId('axis-explanation').textContent = this.#of.axes.find(({ kind }) => kind === this.#axis)?.explanation ?? '';
    this.#scale = this.#of.scale(this.#axis);
    this.#panels = this.#of.overTime(this.#scale, this.#width).map(({ name, figure }) => this.#panel(name, figure));
    this.#column.replaceChildren(...this.#panels.map(({ holder }) => holder));
    this.#drawNow();
  }

  #panel(name: string, figure: Figure): Panel {
    const holder = plot(figure);
    holder.classList.add('timed');
    holder.dataset.figure = name;
    const svg = holder.firstElementChild as SVGElement;
    const { box } = figure;
    const cursor = ['halo', 'now'].map((kind) => {
      const line = document.createElementNS('http://www.w3.org/2000/svg', 'line');
      line.setAttribute('class', kind);
      line.setAttribute('y1', String(box.top));
      line.setAttribute('y2', String(box.top + box.height));
      svg.append(line);
      return line;
    });
    const indexAt = (event: MouseEvent): number => {
      const { left, width } = svg.getBoundingClientRect();
      const share = (((event.clientX - left) / width) * svg.clientWidth - box.left) / box.width;
      return nearest(this.#of.time, this.#scale(box.width).from(Math.min(1, Math.max(0, share))));
    };
    svg.addEventListener('pointermove', (event) => {
      if (!this.#held) this.#go(indexAt(event));
    });
    svg.addEventListener('click', (event) => {
      this.#setHeld(!this.#held);
      this.#go(indexAt(event));
    });
    const readings = [...svg.querySelectorAll('[data-reading]')].map((node) => ({ node, key: node.getAttribute('data-reading') ?? '' }));
    return { holder, figure, cursor, readings };
  }

  #drawNow(): void {
    const { time, reading, where, now } = this.#of;
    const i = this.#index;
    const scale = this.#scale(1);
    for (const { figure, cursor, readings } of this.#panels) {
      const x = String(figure.box.left + scale.at(time[i]) * figure.box.width);
      for (const line of cursor) {
        line.setAttribute('x1', x);
        line.setAttribute('x2', x);
      }
      for (const { node, key } of readings) node.textContent = reading(key, i);
    }
    this.#now.replaceChildren(...now(i, this.#nowWidth).map(plot));
    this.#where.textContent = where(i);
    this.#moment.value = String(i);
    this.#moment.setAttribute('aria-valuetext', where(i));
    document.body.dataset.index = String(i);
    document.body.dataset.time = String(time[i]);
  }
}

/** Paper has no switches: what is folded in is printed too. */
export function openForPrint(): void {
  window.addEventListener('beforeprint', () => {
    for (const details of document.querySelectorAll('details')) details.open = true;
  });
}

/** Runs the script of a page, and says in the page when all is drawn. */
export async function begin<T>(draw: (data: T) => Promise<void> | void): Promise<void> {
  await draw(JSON.parse(byId('data').textContent ?? '') as T);
  document.body.dataset.ready = String(Math.round(performance.now()));
}
