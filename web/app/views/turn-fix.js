/** What would make it hold, under the reason: one button, one tap. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { t } from '../text.js';
import { applyChange, changeWords } from './change-words.js';

/**
 * @param {object} given
 * @param {ReturnType<import('../store.js').createStore>} given.store
 * @param {() => void} given.onList opens the list of all changes
 */
export function createFix({ store, onList }) {
  const figure = createFigure('tightest');
  const [before, after] = [el('span'), el('span')];
  const node = el('button', { type: 'button', class: 'fix', hidden: true, on: { click: pressed } }, before, figure.node, after);
  /** The change that a press makes; null: it opens the list. */
  let change = null;

  function pressed() {
    if (node.getAttribute('aria-disabled')) return;
    if (change) applyChange(store, change);
    else onList();
  }

  return {
    node,
    /** The button's words, empty where there is none. */
    text: () => (node.hidden ? '' : node.innerText),
    /**
     * @param {any} answer the turn's
     * @param {{answer: any, old: boolean}} full what to change, and whether it is for another turn
     * @param {import('../units.js').Units} units
     */
    update(answer, full, units) {
      setShown(node, answer.verdict !== 'holds');
      if (node.hidden) {
        setAttribute(figure.node, 'data-answer', null);
        return;
      }
      const changes = full.answer?.changes ?? [];
      const drifts = answer.verdict === 'too_fast' && answer.drift !== null;
      const best = changes.find(({ enough }) => enough) ?? null;
      change = drifts ? changes.find(({ input, enough }) => enough && input === 'line_radius_m') ?? best : best;
      let text = full.old || !changes.length ? t('fix.unknown') : t('fix.nothing');
      if (drifts) text = t('fix.too_fast');
      else if (change) {
        const { way, values } = changeWords(change, units);
        text = t(`fix.${way}`, values);
      }
      const [start, end = ''] = text.split('{figure}');
      setText(before, start);
      setText(after, end);
      setShown(figure.node, drifts);
      if (drifts) figure.update(answer, 'drift.line_radius_m', units);
      else setAttribute(figure.node, 'data-answer', null);
      setAttribute(node, 'aria-disabled', full.old ? 'true' : null);
      setAttribute(node, 'data-change', change?.input ?? null);
    },
  };
}
