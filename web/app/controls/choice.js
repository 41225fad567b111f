/** One of a few, as native radio buttons with large targets. */

import { el, setAttribute } from '../dom.js';

/**
 * @param {object} given
 * @param {string} given.name
 * @param {string} given.legend
 * @param {boolean} [given.legendHidden] the legend is for screen readers alone
 * @param {{value: string, label: string, detail?: string, picture?: Node}[]} given.options
 * @param {string} [given.question] the question's key, where it is one
 * @param {(value: string) => void} given.onChoose
 */
export function createChoice({ name, legend, legendHidden, options, question, onChoose }) {
  const inputs = options.map(({ value }) => el('input', {
    type: 'radio', name: `choice-${name}`, value, 'data-question': question ?? null,
    on: { change: () => onChoose(value) },
  }));
  const node = el('fieldset', { class: 'choice' },
    el('legend', { text: legend, class: legendHidden ? 'visually-hidden' : null }),
    el('div', { class: 'options' }, ...options.map(({ label, detail, picture }, i) =>
      el('label', { class: 'option' }, inputs[i], picture ?? null,
        el('span', { class: 'option-text' }, el('span', { class: 'option-label', text: label }),
          detail ? el('span', { class: 'option-detail', text: detail }) : null)))));

  function update(chosen) {
    for (const input of inputs) {
      if (input.checked !== (input.value === chosen)) input.checked = input.value === chosen;
      setAttribute(input.parentElement, 'data-chosen', input.value === chosen);
    }
  }

  return { node, update };
}
