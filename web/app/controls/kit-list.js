/** What is kept of a kind, as a list: open, ride, copy, delete. */

import { el, setAttribute } from '../dom.js';
import { kept, kit } from '../kit.js';
import { t } from '../text.js';

/**
 * @param {object} given
 * @param {ReturnType<import('../store.js').createStore>} given.store
 * @param {'boards'|'riders'} given.kind
 * @param {(state: any) => string} given.openId id of the one that is open
 * @param {(entry: import('../kit.js').Entry) => string} given.detail
 * @param {(entry: import('../kit.js').Entry) => void} given.onOpen
 * @param {(entry: import('../kit.js').Entry) => void} [given.onRide]
 */
export function createKitList({ store, kind, openId, detail, onOpen, onRide }) {
  const list = el('ul', { class: 'kit', 'aria-label': t(`kit.${kind}`) });
  const undo = el('button', { type: 'button', class: 'board-button', text: t('undo'), on: { click: () => store.undo() } });
  const node = el('div', {}, list, undo);
  let shown = '';

  const action = (key, name, onClick) => el('button', { type: 'button', class: 'kit-action', text: t(key), 'aria-label': `${t(key)}: ${name}`, on: { click: onClick } });
  function change(patch) {
    store.set(patch, { undo: 'kit' });
    store.seal();
  }

  function rowOf(entry) {
    const { id, name } = entry;
    return el('li', { 'data-id': id },
      el('button', { type: 'button', class: 'kit-open', on: { click: () => onOpen(entry) } },
        el('span', { class: 'kit-name', text: name }), ' ', el('span', { class: 'kit-detail', text: [entry.invented ? t('kit.invented') : '', detail(entry)].filter(Boolean).join(', ') })),
      el('div', { class: 'kit-actions' },
        onRide ? action('kit.ride', name, () => onRide(entry)) : null,
        action('kit.copy', name, () => change(kit.copy(store.get(), kind, id, t('kit.copyName', { name })).patch)),
        action('kit.delete', name, () => {
          const next = list.querySelector(`[data-id="${CSS.escape(id)}"]`)?.nextElementSibling?.dataset.id;
          change(kit.remove(store.get(), kind, id));
          // The focus stays in the list.
          (list.querySelector(next ? `[data-id="${CSS.escape(next)}"] button` : 'li:last-child button') ?? undo).focus();
        })));
  }

  return {
    node,
    update(state) {
      const entries = kept(state, kind);
      const wanted = JSON.stringify([entries, state.units]);
      if (wanted !== shown) {
        shown = wanted;
        list.replaceChildren(...entries.map(rowOf));
      }
      for (const row of list.children) setAttribute(row.firstElementChild, 'aria-current', row.dataset.id === openId(state) ? 'true' : null);
      const what = store.undoable();
      setAttribute(undo, 'aria-disabled', what ? null : 'true');
      setAttribute(undo, 'aria-label', what ? null : t('undo.none'));
    },
  };
}
