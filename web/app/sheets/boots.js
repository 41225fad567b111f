/** Boots and bindings: how far they stand out, when they drag, what waist would clear them. */

import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { BOOT_KINDS, bound } from '../views/board-state.js';
import { neededText } from '../views/board-words.js';
import { createSheet } from './sheet.js';

const ENDS = ['front.toe', 'front.heel', 'rear.toe', 'rear.heel'];
const KEYS = ['sole_length_m', 'front_angle_deg', 'rear_angle_deg', 'toe_height_m', 'heel_height_m', 'front_toeward_m', 'rear_toeward_m', 'sole_width_m'];

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createBootsSheet(store, echo) {
  const numbers = KEYS.map((key) => createNumber({ key: `boot.${key}`, kind: BOOT_KINDS[key], id: `board-boot-${key}`, bind: bound('boot', key),
    optional: key === 'sole_length_m', start: 0.3, help: true, store }));
  const ends = ENDS.map((name) => {
    const [out, drags] = [createFigure('small', { signed: true }), createFigure('angle')];
    const never = el('span', { text: t('board.never') });
    return { name, out, drags, never, node: el('div', { class: 'row', role: 'row' }, el('span', { role: 'rowheader', text: t(`board.end.${name}`) }),
      el('span', { class: 'cell', role: 'cell' }, out.node), el('span', { class: 'cell', role: 'cell' }, drags.node, never)) };
  });
  const head = el('div', { class: 'row head', role: 'row' }, ...['board.end', 'board.overhang', 'board.drags'].map((key) =>
    el('span', { role: 'columnheader', text: t(key) })));
  const table = el('div', { class: 'rows end-rows', role: 'table', 'aria-label': t('sheet.boots') }, head, ...ends.map(({ node }) => node));
  const asks = el('p', { class: 'lead' });
  const waist = createFigure('width');
  const clearLine = el('p', {}, `${t('board.clearWaist')} `, waist.node);
  const any = el('p', { text: t('board.clearAny') });
  const none = el('p', { class: 'lead', text: t('board.noBoots') });
  const sheet = createSheet('boots', echo, none, asks, table, clearLine, any, el('p', { class: 'aside', text: t('board.overhang.note') }),
    ...numbers.map(({ node }) => node));

  return {
    ...sheet,
    has: (field) => field.startsWith('boot'),
    update(state, errors, last) {
      if (!sheet.dialog.open) return;
      for (const number of numbers) number.update(state, errors);
      const answer = last?.answer;
      const boot = answer?.boot;
      setShown(none, !boot);
      for (const node of [asks, table]) setShown(node, Boolean(boot));
      setShown(clearLine, Boolean(boot) && boot.clear_waist_m !== null);
      setShown(any, Boolean(boot) && boot.clear_waist_m === null);
      if (!boot) return;
      setText(asks, neededText(answer.needed, last.boards, last.questions.board, state.units));
      for (const { name, out, drags, never } of ends) {
        out.update(answer, `boot.${name}.overhang_m`, state.units);
        drags.update(answer, `boot.${name}.drag_angle_deg`, state.units);
        const [foot, end] = name.split('.');
        const angle = boot[foot][end].drag_angle_deg;
        setShown(drags.node, angle !== null);
        setShown(never, angle === null);
        setAttribute(drags.node, 'data-short', angle !== null && answer.needed !== null && angle < answer.needed.edge_angle_deg);
      }
      waist.update(answer, 'boot.clear_waist_m', state.units);
    },
  };
}
