/** Figures of an answer: each names the engine's key that it shows. */

import { el, setAttribute, setText } from './dom.js';
import { show } from './units.js';

/**
 * The value under a key, dots for nesting: `worst.lean_deg`, `lean_deg.12`.
 * @param {any} answer
 * @param {string} key
 */
export function valueAt(answer, key) {
  return key.split('.').reduce((part, name) => part?.[name], answer) ?? null;
}

/**
 * A figure that can be pointed at another key of the answer.
 * @param {string} kind kind of quantity, for units.js
 * @param {{signed?: boolean, class?: string}} [options]
 */
export function createFigure(kind, { signed = false, class: name = 'figure' } = {}) {
  const node = el('span', { class: name, text: '–' });
  return {
    node,
    /**
     * @param {any} answer
     * @param {string} key
     * @param {import('./units.js').Units} units
     */
    update(answer, key, units) {
      const value = valueAt(answer, key);
      setAttribute(node, 'data-answer', key);
      setText(node, kind === 'word' ? String(value ?? '–') : show(kind, value, units, { signed }));
    },
  };
}
