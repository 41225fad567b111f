/**
 * A sheet that slides nothing: a native dialog with its way out at the bottom, where a thumb in a
 * glove reaches. The browser keeps the focus inside and gives it back on closing.
 */

import { el } from '../dom.js';
import { t } from '../text.js';

/**
 * @param {string} name
 * @param {Node|null} aside stands beside the sheet's name
 * @param {...Node} content
 */
export function createSheet(name, aside, ...content) {
  const title = el('h2', { id: `sheet-${name}-title`, text: t(`sheet.${name}`), tabindex: '-1', autofocus: true });
  const body = el('div', { class: 'sheet-body' }, ...content);
  // Where nothing inside takes the focus, the text itself does: it may need scrolling by keys.
  if (!body.querySelector('input, button')) body.tabIndex = 0;
  const dialog = el('dialog', {
    class: 'sheet', id: `sheet-${name}`, 'aria-labelledby': title.id,
    // A press on the dimmed page behind the sheet closes it.
    on: { click: (event) => { if (event.target === dialog) dialog.close(); } },
  }, el('div', { class: 'sheet-frame' }, el('div', { class: 'sheet-head' }, title, aside), body,
    el('button', { type: 'button', class: 'sheet-close', text: t('sheet.close'), on: { click: () => dialog.close() } })));
  document.body.append(dialog);
  return {
    dialog,
    body,
    open() {
      dialog.showModal();
      body.scrollTop = 0;
    },
  };
}
