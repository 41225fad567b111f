/** Numbers that the Pitch view holds itself. */

import { createNumber } from '../controls/number.js';
import { t } from '../text.js';
import { pitchOf } from './pitch-state.js';

/**
 * A number of the view's own part of the state; takes what createNumber takes, and
 * @param {ReturnType<import('../store.js').createStore>} store
 * @param {{key: string, text?: string, usual?: boolean}} given `text`: its name in the text table,
 *   `usual`: left empty it is the engine's usual value, not none
 */
export function ownNumber(store, { key, text = key, usual = false, ...given }) {
  const number = createNumber({
    ...given, key: text, store, id: `pitch-${key}`,
    bind: {
      read: (state) => pitchOf(state)[key],
      write: (value) => ({ pitch: { [key]: value, notice: null } }),
      path: () => key,
    },
  });
  if (usual) number.node.querySelector('.field').placeholder = t('input.usual');
  return number;
}
