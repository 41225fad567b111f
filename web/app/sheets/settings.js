/** Units and look, and whether the app is ready for the hill. */

import { createChoice } from '../controls/choice.js';
import { el, setText } from '../dom.js';
import { t } from '../text.js';
import { CHOICES } from '../units.js';
import { LOOKS } from '../look.js';
import { createSheet } from './sheet.js';

export function createSettingsSheet(store) {
  const of = (values) => values.map((value) => ({ value, label: t(`settings.${value}`) }));
  const units = Object.entries(CHOICES).map(([kind, values]) => ({
    kind,
    choice: createChoice({
      name: kind, legend: t(`settings.units.${kind}`), options: of(values),
      onChoose: (value) => store.set({ units: { [kind]: value } }, { undo: 'settings' }),
    }),
  }));
  const look = createChoice({
    name: 'look', legend: t('settings.look'), options: of(LOOKS),
    onChoose: (value) => store.set({ look: value }, { undo: 'settings' }),
  });
  const hill = el('p', { class: 'aside' });
  const sheet = createSheet('settings', null, ...units.map(({ choice }) => choice.node), look.node, hill);
  return {
    ...sheet,
    update(state) {
      for (const { kind, choice } of units) choice.update(state.units[kind]);
      look.update(state.look);
    },
    /** @param {string} text whether the app is ready for the hill */
    sayReady: (text) => setText(hill, text),
  };
}
