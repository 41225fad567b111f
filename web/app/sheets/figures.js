/** All figures of the turn, one tap away. */

import { el, setShown, setText } from '../dom.js';
import { createFigure, valueAt } from '../figure.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { createSheet } from './sheet.js';
import { statesAlong } from '../views/turn-shown.js';

/** Rows of figures: text key of the row, kind of quantity, key in the answer. */
const WORST = [
  ['figure.lean', 'angle', 'worst.lean_deg'],
  ['figure.edge', 'angle', 'worst.edge_angle_deg'],
  ['figure.margin', 'share', 'worst.grip_margin'],
  ['figure.load', 'load', 'worst.load_g'],
  ['figure.radius', 'length', 'worst.turn_radius_m'],
  ['figure.penetration', 'depth', 'worst.penetration_m'],
];
const DRIFT = [
  ['figure.radius', 'tightest', 'drift.line_radius_m'],
  ['figure.lean', 'angle', 'drift.lean_deg'],
  ['figure.edge', 'angle', 'drift.edge_angle_deg'],
  ['figure.margin', 'share', 'drift.grip_margin'],
  ['figure.load', 'load', 'drift.load_g'],
];

export function createFiguresSheet() {
  const rows = (list) => list.map(([label, kind, key]) => {
    const figure = createFigure(kind, { signed: kind === 'share' });
    return { figure, key, node: el('div', { class: 'row' }, el('dt', { text: t(label) }), el('dd', {}, figure.node)) };
  });
  const worst = rows(WORST);
  const drift = rows(DRIFT);
  const from = createFigure('speedWindow');
  const to = createFigure('speedWindow');
  const windowRow = el('p', { class: 'window' }, from.node, ` ${t('figure.window.to')} `, to.node);
  const noWindow = el('p', { text: t('figure.window.none') });
  const worstWhere = el('p', { class: 'aside' });
  const driftWhy = el('p', { class: 'aside' });
  const driftList = el('dl', { class: 'rows' }, ...drift.map((row) => row.node));
  const along = el('ul', { class: 'along' });
  const sheet = createSheet('figures', null,
    el('h3', { text: t('figure.window') }), windowRow, noWindow,
    el('h3', { text: t('figure.worst') }), worstWhere, el('dl', { class: 'rows' }, ...worst.map((row) => row.node)),
    el('h3', { text: t('figure.drift') }), driftWhy, driftList,
    el('h3', { text: t('along.title') }), along);

  /**
   * @param {any} answer the turn's
   * @param {import('../units.js').Units} units
   */
  function update(answer, units) {
    if (!sheet.dialog.open || !answer) return;
    for (const { figure, key } of [...worst, ...drift]) figure.update(answer, key, units);
    from.update(answer, 'carve_speed_mps.min', units);
    to.update(answer, 'carve_speed_mps.max', units);
    setShown(windowRow, answer.carve_speed_mps !== null);
    setShown(noWindow, answer.carve_speed_mps === null);
    setShown(driftList, answer.drift !== null);
    setText(driftWhy, t(answer.drift ? `figure.drift.${answer.drift.bounded_by}` : 'figure.drift.none'));
    setText(worstWhere, t('figure.worst.where', {
      phase: show('angle', valueAt(answer, 'worst.phase_deg'), units),
      limit: answer.worst.limit ? t(`limit.${answer.worst.limit}`) : '–',
    }));
    along.replaceChildren(...statesAlong(answer).map(({ fromDeg, toDeg, state }) => el('li', {
      text: t('along.range', { from: show('angle', fromDeg, units), to: show('angle', toDeg, units), state: t(`state.${state}`) }),
    })));
  }

  return { ...sheet, update };
}
