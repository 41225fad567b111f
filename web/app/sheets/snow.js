/** Snow by the hand hardness test. */

import { createChoice } from '../controls/choice.js';
import { el } from '../dom.js';
import { drawHandTest } from '../pictures/hand-test.js';
import { t } from '../text.js';
import { createSheet } from './sheet.js';

/** The classes, softest first. */
export const SNOWS = ['F', '4F', '1F', 'P', 'K', 'I'];

/**
 * @param {ReturnType<import('../store.js').createStore>} store
 * @param {Node|null} echo the verdict, beside the sheet's name
 * @param {string} [name] where another view has this sheet, too
 */
export function createSnowSheet(store, echo, name = 'snow') {
  const choice = createChoice({
    name, legend: t('sheet.snow'), legendHidden: true, question: 'snow',
    options: SNOWS.map((code) => ({
      value: code, label: t(`snow.${code}.title`), detail: t(`snow.${code}.how`),
      picture: drawHandTest(code),
    })),
    onChoose: (code) => store.set({ inputs: { snow: code } }, { undo: 'snow' }),
  });
  const sheet = createSheet(name, echo, el('p', { text: t('snow.intro') }), choice.node,
    el('p', { class: 'aside', text: t('snow.source') }));
  return { ...sheet, update: (state) => choice.update(state.inputs.snow) };
}
