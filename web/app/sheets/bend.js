/** Bend and bite: what the board carves under this rider, and its stiffness measured at home. */

import { createNumber } from '../controls/number.js';
import { el, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { drawSupports } from '../pictures/supports.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { boardOf, bound } from '../views/board-state.js';
import { rangeText, saidErrors } from '../views/board-words.js';
import { createSheet } from './sheet.js';

const ROWS = [
  ['board.bend.radius', 'length', 'bend.turn_radius_m'], ['board.bend.hard', 'length', 'hard_snow_radius_m'],
  ['board.bend.contact', 'along', 'bend.contact_length_m'], ['board.bend.depth', 'depth', 'bend.max_depth_m'],
  ['board.bend.front', 'length', 'bend.local_radius_m.front'], ['board.bend.middle', 'length', 'bend.local_radius_m.middle'],
  ['board.bend.rear', 'length', 'bend.local_radius_m.rear'],
];
const HOME = { supports_m: 'along', load_kg: 'mass', sag_m: 'small' };

/** @param {{store: ReturnType<import('../store.js').createStore>, engine: any}} context */
export function createBendSheet({ store, engine }, echo) {
  const own = createNumber({ key: 'stiffness_nm2', kind: 'stiffness', id: 'board-stiffness', bind: bound('board', 'stiffness_nm2'), optional: true, start: 180, help: true, store });
  const rows = ROWS.map(([label, kind, key]) => {
    const figure = createFigure(kind);
    return { figure, key, node: el('div', { class: 'row' }, el('dt', { text: t(label) }), el('dd', {}, figure.node)) };
  });
  const list = el('dl', { class: 'rows' }, ...rows.map(({ node }) => node));
  const fit = el('p', { class: 'lead' });
  const oval = el('p');
  const masses = el('p');
  const look = el('p');
  const home = Object.entries(HOME).map(([key, kind]) => createNumber({ key, kind, id: `board-home-${key}`, bind: bound('home', key),
    optional: true, start: key === 'sag_m' ? 0.02 : 1, help: true, store }));
  const result = createFigure('stiffness', { class: 'big' });
  const [low, high] = [createFigure('stiffness'), createFigure('stiffness')];
  const weakest = el('span');
  const use = el('button', { type: 'button', class: 'board-button', on: { click: () => put(found.stiffness_nm2) } });
  const measured = el('div', { class: 'measured', hidden: true }, el('p', { class: 'lead' }, result.node),
    el('p', { class: 'aside' }, low.node, ` ${t('figure.window.to')} `, high.node, ' ', weakest), use);
  const typical = el('div', { class: 'buttons' });
  const sheet = createSheet('bend', echo, fit, list, oval, masses, look, own.node, el('h3', { text: t('board.typical') }), typical,
    el('p', { class: 'aside', text: t('board.typical.note') }), el('h3', { text: t('board.home') }), drawSupports({ supports: t('board.home.supports'), weight: t('board.home.weight'), sag: t('board.home.sag') }),
    el('ol', { class: 'steps' }, ...[1, 2, 3, 4].map((n) => el('li', { text: t(`board.home.${n}`) }))), ...home.map(({ node }) => node), measured);

  let asked = '';
  let found = null;
  let errors = [];

  function put(value) {
    store.set({ board: { board: { ...boardOf(store.get()).board, stiffness_nm2: value } } }, { undo: 'stiffness_nm2' });
    store.seal();
  }

  /** The measurement at home, once all of it is there; else the typical values alone. */
  async function ask(values) {
    const mine = asked;
    const whole = Object.values(values).every((value) => value !== null);
    try {
      const answer = await engine.ask('stiffness', { ask: 'stiffness', ...(whole ? values : { supports_m: 1, load_kg: 20, sag_m: 0.02 }) });
      if (answer === null || mine !== asked) return;
      errors = answer.error ? saidErrors(answer.error) : [];
      found = whole && !answer.error ? answer : null;
      if (answer.typical) showTypical(answer.typical);
      update(store.get(), null, store.get().answers.board);
    } catch {
      // The engine has failed; main.js hears of it.
    }
  }

  function showTypical(entries) {
    if (typical.childElementCount) return;
    typical.append(...entries.map(({ code, stiffness_nm2: value, source }) => el('button', { type: 'button', class: 'board-button', on: { click: () => put(value) } },
      el('span', {}, t('board.typical.entry', { name: t(`board.typical.${code}`), value: show('stiffness', value, store.get().units) })),
      el('span', { class: 'source', text: t(`board.source.${source}`) }))));
  }

  let lastErrors = [];
  function update(state, boardErrors, last) {
    if (boardErrors) lastErrors = boardErrors;
    if (!sheet.dialog.open) return;
    const values = boardOf(state).home;
    const wanted = JSON.stringify(values);
    if (wanted !== asked && engine.state === 'ready') {
      asked = wanted;
      ask(values);
    }
    own.update(state, lastErrors);
    for (const number of home) number.update(state, errors);
    setShown(measured, found !== null);
    if (found) {
      result.update(found, 'stiffness_nm2', state.units);
      low.update(found, 'low_nm2', state.units);
      high.update(found, 'high_nm2', state.units);
      setText(weakest, found.weakest ? t(`board.weakest.${found.weakest}`) : '');
      setText(use, t('board.home.use', { value: show('stiffness', found.stiffness_nm2, state.units) }));
    }
    if (!last) return;
    const { answer } = last;
    const bent = answer.bend?.converged === true;
    setText(fit, t(!answer.bend ? 'board.bend.none' : bent ? `board.bend.${answer.bend.fit}` : 'board.bend.failed', { edge: show('angle', answer.bend?.edge_angle_deg ?? null, state.units) }));
    setShown(list, bent);
    if (bent) for (const { figure, key } of rows) figure.update(answer, key, state.units);
    setShown(oval, bent);
    if (bent) setText(oval, t(answer.bend.oval ? 'board.bend.oval' : 'board.bend.round', { share: show('share', answer.bend.oval_share, state.units) }));
    setShown(masses, Boolean(answer.bend));
    setText(masses, t('board.masses', { range: rangeText(answer.mass_range_kg, 'mass', state.units, 'range.noMass') }));
    setText(look, t('board.look', { range: rangeText(answer.stiffness_range_nm2, 'stiffness', state.units, 'range.none') }));
  }

  return { ...sheet, update, has: (field) => field === 'stiffness_nm2' };
}
