/** Who rides the boards: mass and style, usual speed and pitches; the riders that are kept. */

import { createChoice } from '../controls/choice.js';
import { createKitList } from '../controls/kit-list.js';
import { createNumber } from '../controls/number.js';
import { el, setText } from '../dom.js';
import { find, kit } from '../kit.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { boardOf, bound, RIDING_KINDS, SHARED_KEYS } from '../views/board-state.js';
import { createSheet } from './sheet.js';

const SHARED = { rider_mass_kg: 'mass', angulation_deg: 'angle', max_load_g: 'load' };
const LEVELS = ['snowboarders', 'beginner', 'intermediate', 'advanced'];

function ridden(state) {
  const { boot, riding } = boardOf(state);
  return { shared: Object.fromEntries(SHARED_KEYS.map((key) => [key, state.inputs[key]])), boot, riding };
}

/** Name of the open rider. */
function openRider(state) {
  const { rider_name: name, rider_id: id } = boardOf(state);
  const entry = find(state, 'riders', id);
  if (name) return name;
  if (!entry) return t('kit.newRider');
  return entry.invented && JSON.stringify(entry.values) !== JSON.stringify(ridden(state)) ? t('kit.changed', { name: entry.name }) : entry.name;
}

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createBoardRiderSheet(store, echo) {
  const riding = Object.entries(RIDING_KINDS).map(([key, kind]) => createNumber({ key, kind, id: `board-${key}`, bind: bound('riding', key),
    optional: key.startsWith('usual'), start: key === 'usual_speed_mps' ? 30 / 3.6 : 12, help: true, store }));
  const shared = Object.entries(SHARED).map(([key, kind]) => createNumber({ key, kind, id: `board-${key}`, help: true, store }));
  const level = createChoice({
    name: 'usual-level', legend: t('board.level'), question: 'usual_level', options: LEVELS.map((value) => ({ value, label: t(`board.level.${value}`) })),
    onChoose: (value) => {
      const { riding: now } = boardOf(store.get());
      store.set({ board: { riding: { ...now, usual_level: value, usual_speed_mps: null } } }, { undo: 'usual_level' });
      store.seal();
    },
  });
  const field = el('input', { id: 'rider-name', type: 'text', class: 'text-field', autocomplete: 'off', maxlength: 40, enterkeyhint: 'done',
    on: { input: () => store.set({ board: { rider_name: field.value } }, { undo: 'rider_name' }), change: () => store.seal(),
      keydown: (event) => { if (event.key === 'Enter') field.blur(); } } });
  const save = el('button', { type: 'button', class: 'board-button strong', text: t('kit.save'), on: { click: saveRider } });
  const status = el('p', { class: 'aside', role: 'status' });
  const list = createKitList({
    store, kind: 'riders', openId: (state) => boardOf(state).rider_id,
    detail: ({ values }) => show('mass', typeof values.shared.rider_mass_kg === 'number' ? values.shared.rider_mass_kg : null, store.get().units),
    onOpen({ id, values }) {
      store.set({ inputs: values.shared, board: { boot: values.boot, riding: values.riding, rider_id: id, rider_name: '' } }, { undo: 'kit.open' });
      store.seal();
    },
  });
  const usual = el('p', { class: 'aside' });
  const sheet = createSheet('board-rider', echo, ...shared.slice(0, 1).map(({ node }) => node), ...riding.slice(0, 2).map(({ node }) => node),
    level.node, riding[2].node, usual, riding[3].node, ...shared.slice(1).map(({ node }) => node),
    el('h3', { text: t('kit.riders') }), el('div', { class: 'name-row' }, el('label', { for: 'rider-name', text: t('kit.name') }), field, save), status, list.node,
    el('p', { class: 'aside', text: t('kit.riderNote') }));

  function saveRider() {
    const state = store.get();
    const { rider_id: id } = boardOf(state);
    const entry = find(state, 'riders', id);
    const name = openRider(state).trim() || t('kit.newRider');
    if (entry && !entry.invented) store.set({ ...kit.change(state, 'riders', id, name, ridden(state)), board: { rider_name: '' } }, { undo: 'kit' });
    else {
      const { patch, id: fresh } = kit.add(state, 'riders', name, ridden(state));
      store.set({ ...patch, board: { rider_id: fresh, rider_name: '' } }, { undo: 'kit' });
    }
    store.seal();
  }

  return {
    ...sheet,
    has: (field) => field in SHARED || field in RIDING_KINDS,
    update(state, errors, last) {
      if (!sheet.dialog.open) return;
      for (const number of [...shared, ...riding]) number.update(state, errors);
      const { riding: now } = boardOf(state);
      level.update(now.usual_speed_mps === null ? now.usual_level : null);
      const name = openRider(state);
      if (document.activeElement !== field && field.value !== name) field.value = name;
      const entry = find(state, 'riders', boardOf(state).rider_id);
      const changed = !entry || JSON.stringify(entry.values) !== JSON.stringify(ridden(state));
      setText(status, t(changed ? 'kit.unsaved' : entry.invented ? 'kit.isInventedRider' : 'kit.saved'));
      list.update(state);
      if (!last) return;
      const speed = last.boards.usual_speed_mps;
      setText(usual, t(`board.usual.${speed.source}`, { mean: show('speed', speed.mean, state.units), low: show('speed', speed.low, state.units), high: show('speed', speed.high, state.units) }));
    },
  };
}
