/** What a tape measure and a spec sheet add: stated radius, stance, more widths along the edge. */

import { createNumber } from '../controls/number.js';
import { el, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { BOARD_KINDS, boardOf, bound, boundWidth, MOST_WIDTHS } from '../views/board-state.js';
import { statedReason } from '../views/board-words.js';
import { createSheet } from './sheet.js';

const KEYS = ['stated_radius_m', 'front_insert_width_m', 'rear_insert_width_m', 'stance_width_m', 'setback_m', 'camber_m'];
const STARTS = { stated_radius_m: 8, front_insert_width_m: 0.26, rear_insert_width_m: 0.26, stance_width_m: 0.52 };

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createMeasureSheet(store, echo) {
  const numbers = KEYS.map((key) => createNumber({ key, kind: BOARD_KINDS[key], id: `board-${key}`, bind: bound('board', key),
    optional: true, start: STARTS[key] ?? 0, help: true, store }));
  const rows = Array.from({ length: MOST_WIDTHS }, (_, i) => {
    const pair = [['at_m', 'along'], ['width_m', 'width']].map(([key, kind]) =>
      createNumber({ key, kind, id: `board-width-${i}-${key}`, bind: boundWidth(i, key), store }));
    return { pair, node: el('fieldset', { class: 'width-row' }, el('legend', { text: t('board.width.row', { n: i + 1 }) }), ...pair.map(({ node }) => node)) };
  });
  const button = (key, onClick) => el('button', { type: 'button', class: 'board-button', text: t(key), on: { click: onClick } });
  const more = button('board.width.add', () => setWidths(added(kept())));
  const fewer = button('board.width.remove', () => setWidths(widths().length > 3 ? widths().slice(0, -1) : null));
  const radius = createFigure('length', { class: 'big' });
  const spread = createFigure('length');
  const stated = el('p', { class: 'aside' });
  const radii = el('ul', { class: 'along' });
  const sheet = createSheet('measure', echo,
    el('p', { class: 'lead' }, `${t('board.sidecut')} `, radius.node), el('p', { class: 'aside' }, `${t('board.byTape')} `, spread.node),
    stated, numbers[0].node, el('h3', { text: t('board.width.title') }), el('p', { class: 'aside', text: t('board.width.help') }), radii,
    ...rows.map(({ node }) => node), el('div', { class: 'buttons' }, more, fewer), el('h3', { text: t('board.bindings') }), ...numbers.slice(1).map(({ node }) => node));

  const widths = () => boardOf(store.get()).board.widths ?? [];
  const kept = () => store.get().answers.board;
  function setWidths(next) {
    store.set({ board: { board: { ...boardOf(store.get()).board, widths: next } } }, { undo: 'widths' });
    store.seal();
  }
  /** One width more, or the first three: read off the picture, to be set right with a tape. */
  function added(last) {
    const edge = boardOf(store.get()).board.effective_edge_m;
    const half = typeof edge === 'number' ? edge / 2 : 0.6;
    const near = (at) => {
      const outline = last?.answer.picture.outline;
      if (!outline) return null;
      const i = outline.x_m.reduce((best, x, k) => (Math.abs(x - at) < Math.abs(outline.x_m[best] - at) ? k : best), 0);
      return { at_m: Math.round(outline.x_m[i] * 1000) / 1000, width_m: Math.round(outline.y_m[i] * 2000) / 1000 };
    };
    const rowAt = (at) => near(at) ?? { at_m: at, width_m: null };
    if (!widths().length) return [-half / 2, 0, half / 2].map(rowAt);
    // In the widest gap.
    const places = [-half, ...widths().map(({ at_m }) => at_m), half];
    const gap = places.slice(1).map((place, i) => place - places[i]);
    const widest = gap.indexOf(Math.max(...gap));
    return widths().toSpliced(widest, 0, rowAt(places[widest] + gap[widest] / 2));
  }

  return {
    ...sheet,
    update(state, errors, last) {
      if (!sheet.dialog.open) return;
      for (const number of numbers) number.update(state, errors);
      const count = widths().length;
      rows.forEach(({ pair, node }, i) => {
        setShown(node, i < count);
        if (i < count) for (const number of pair) number.update(state, errors);
      });
      setShown(more, count < MOST_WIDTHS);
      setShown(fewer, count > 0);
      if (!last) return;
      const { answer } = last;
      radius.update(answer, 'sidecut_radius_m', state.units);
      spread.update(answer, 'sidecut_spread_m', state.units);
      setText(stated, statedText(answer.stated_radius, state.units));
      radii.replaceChildren(...(answer.radii ?? []).map((row) => el('li', { text: t(row.radius_m === null ? 'board.radii.straight' : row.spread_m === null ? 'board.radii.rough' : 'board.radii.row', {
        at: show('along', row.at_m, state.units, { signed: true }), radius: show('length', row.radius_m, state.units), spread: show('length', row.spread_m, state.units) }) })));
    },
  };
}

function statedText(stated, units) {
  if (!stated) return '';
  const values = { stated: show('length', stated.stated_m, units), measured: show('length', stated.measured_m, units),
    difference: show('share', stated.difference, units, { signed: true }) };
  if (stated.agrees) return t('board.stated.agrees', values);
  return `${t('board.stated.differs', values)} ${stated.reasons.map((reason) => statedReason(reason, units)).join(' ')}`;
}
