/** The boards that are kept, and the open one's name. */

import { createKitList } from '../controls/kit-list.js';
import { el, setShown, setText } from '../dom.js';
import { kit } from '../kit.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { boardOf, openBoard } from '../views/board-state.js';
import { createSheet } from './sheet.js';

/** Whether the open board differs from what is kept of it. */
export function edited(state) {
  const entry = openBoard(state);
  const { board, name } = boardOf(state);
  return !entry || JSON.stringify(entry.values) !== JSON.stringify(board) || (name !== '' && name !== entry.name);
}

/** Name of the open board. */
export function openName(state) {
  const { name } = boardOf(state);
  const entry = openBoard(state);
  if (name) return name;
  if (!entry) return t('kit.newBoard');
  return entry.invented && edited(state) ? t('kit.changed', { name: entry.name }) : entry.name;
}

/**
 * Keeps the open board: what is kept of it is replaced; an invented one stays, beside a new one.
 * @param {ReturnType<import('../store.js').createStore>} store
 */
export function saveBoard(store) {
  const state = store.get();
  const { board, name } = boardOf(state);
  const entry = openBoard(state);
  const called = name.trim() || openName(state);
  if (entry && !entry.invented) {
    store.set({ ...kit.change(state, 'boards', entry.id, called, board), board: { name: '' } }, { undo: 'kit' });
  } else {
    const { patch, id } = kit.add(state, 'boards', called, board);
    store.set({ ...patch, board: { board_id: id, name: '' } }, { undo: 'kit' });
  }
  store.seal();
}

/**
 * @param {ReturnType<import('../store.js').createStore>} store
 * @param {(entry: import('../kit.js').Entry) => void} onRide
 */
export function createBoardsSheet(store, onRide, echo) {
  const field = el('input', { id: 'board-name', type: 'text', class: 'text-field', autocomplete: 'off', maxlength: 40, enterkeyhint: 'done',
    on: { input: () => store.set({ board: { name: field.value } }, { undo: 'board_name' }), change: () => store.seal(),
      keydown: (event) => { if (event.key === 'Enter') field.blur(); } } });
  const save = el('button', { type: 'button', class: 'board-button strong', text: t('kit.save'), on: { click: () => saveBoard(store) } });
  const saved = el('p', { class: 'aside', role: 'status' });
  const list = createKitList({
    store, kind: 'boards', openId: (state) => boardOf(state).board_id,
    detail: ({ values }) => t('kit.board.detail', { waist: show('width', asNumber(values.waist_m), store.get().units), edge: show('along', asNumber(values.effective_edge_m), store.get().units) }),
    onOpen: (entry) => {
      // The one that was open takes its place beside it.
      const { compared, board_id: before } = boardOf(store.get());
      store.set({ board: { board: entry.values, board_id: entry.id, name: '',
        compared: compared.map((id) => (id === entry.id ? before : id)) } }, { undo: 'kit.open' });
      store.seal();
      sheet.dialog.close();
    },
    onRide,
  });
  const sheet = createSheet('boards', echo, el('div', { class: 'name-row' }, el('label', { for: 'board-name', text: t('kit.name') }), field, save), saved,
    el('h3', { text: t('kit.boards') }), list.node, el('p', { class: 'aside', text: t('kit.note') }));
  return {
    ...sheet,
    update(state) {
      if (!sheet.dialog.open) return;
      const name = openName(state);
      if (document.activeElement !== field && field.value !== name) field.value = name;
      const changed = edited(state);
      setShown(save, true);
      setText(saved, t(changed ? 'kit.unsaved' : openBoard(state)?.invented ? 'kit.isInvented' : 'kit.saved'));
      list.update(state);
    },
  };
}

const asNumber = (value) => (typeof value === 'number' ? value : null);
