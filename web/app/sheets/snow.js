/** Snow by the hand hardness test. */

import { createChoice } from '../controls/choice.js';
import { el } from '../dom.js';
import { drawHandTest } from '../pictures/hand-test.js';
import { t } from '../text.js';
import { createSheet } from './sheet.js';

/** The classes, softest first. */
export const SNOWS = ['F', '4F', '1F', 'P', 'K', 'I'];

export function createSnowSheet(store) {
  const choice = createChoice({
    name: 'snow', legend: t('sheet.snow'), legendHidden: true, question: 'snow',
    options: SNOWS.map((code) => ({
      value: code, label: t(`snow.${code}`), detail: `${t(`snow.${code}.how`)}: ${t(`snow.${code}.piste`)}`,
      picture: drawHandTest(code),
    })),
    onChoose: (code) => store.set({ inputs: { snow: code } }, { undo: 'snow' }),
  });
  const sheet = createSheet('snow', el('p', { text: t('snow.intro') }), choice.node,
    el('p', { class: 'aside', text: t('snow.source') }));
  return { ...sheet, update: (state) => choice.update(state.inputs.snow) };
}
