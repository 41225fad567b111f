/** What the app is not, in full. */

import { el } from '../dom.js';
import { t } from '../text.js';
import { createSheet } from './sheet.js';

export function createCautionSheet() {
  const [first, ...others] = ['caution.1', 'caution.2', 'caution.3', 'caution.4'];
  return createSheet('caution', null, el('p', { class: 'lead', text: t(first) }),
    ...others.map((key) => el('p', { text: t(key) })));
}
