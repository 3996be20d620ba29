import { type Element, el } from './element.ts';

/** The fixed parts around figures that share one moment: slider, buttons, choice of the time axis, and empty columns for the script. */
export function linkedSection({
  heading,
  shows,
  moments,
  axes,
}: {
  readonly heading: string;
  /** completes "to choose the moment that …" */
  readonly shows: string;
  readonly moments: number;
  readonly axes: readonly { readonly kind: string; readonly name: string; readonly explanation: string }[];
}): Element {
  return el(
    'section',
    { id: 'figures', 'aria-labelledby': 'figures-heading' },
    el('h2', { id: 'figures-heading' }, heading),
    el(
      'p',
      { class: 'faint no-print' },
      `All figures are linked: point at any figure over time, or use the slider and the arrow keys, to choose the moment that ${shows}. `,
      'A click or tap holds it; [ and ] step from event to event.',
    ),
    withoutScript(),
    el(
      'div',
      { class: 'rail', role: 'group', 'aria-label': 'Linked time' },
      el('output', { class: 'where', id: 'where', for: 'moment' }, ''),
      el('input', { type: 'range', id: 'moment', min: 0, max: Math.max(0, moments - 1), value: 0, step: 1, 'aria-label': 'Moment' }),
      el('button', { type: 'button', id: 'hold', 'aria-pressed': 'false' }, 'Hold'),
      el('span', { class: 'choices', id: 'events', role: 'group', 'aria-label': 'Events' }),
    ),
    el(
      'fieldset',
      { class: 'choices no-print' },
      el('legend', {}, 'Time axis'),
      axes.map(({ kind, name, explanation }, i) =>
        el('label', { title: explanation }, el('input', { type: 'radio', name: 'axis', value: kind, checked: i === 0 }), ` ${name}`),
      ),
      el('span', { class: 'faint', id: 'axis-explanation' }, axes[0].explanation),
    ),
    el('div', { class: 'bench' }, el('div', { class: 'time-column', id: 'over-time' }), el('div', { class: 'now-column', id: 'now' })),
  );
}

export function withoutScript(): Element {
  return el(
    'noscript',
    {},
    el(
      'p',
      {},
      'The figures are drawn by the script inside of this page, which is switched off here. gapwake report FILE.h5 --figures DIR writes them as files.',
    ),
  );
}
