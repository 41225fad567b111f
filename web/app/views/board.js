/**
 * The Board view: will this board suit this rider, before the money is spent. The contract of a
 * view: views/turn.js.
 */

import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createBendSheet } from '../sheets/bend.js';
import { createBoardRiderSheet } from '../sheets/board-rider.js';
import { createBoardsSheet, openName, saveBoard } from '../sheets/boards.js';
import { createBootsSheet } from '../sheets/boots.js';
import { createCompareSheet } from '../sheets/compare.js';
import { createMeasureSheet } from '../sheets/measure.js';
import { createSnowSheet } from '../sheets/snow.js';
import { hasText, t } from '../text.js';
import { show as showQuantity } from '../units.js';
import { chosenBoards } from '../kit.js';
import { createBoardAsker } from './board-ask.js';
import { createBoardPictures } from './board-pictures.js';
import { createRide } from './board-ride.js';
import { BOARD_KINDS, boardOf, bound } from './board-state.js';
import { createBoardVerdict } from './board-verdict.js';
import { boardReason, boardRemedy, firstToDrag, saidErrors } from './board-words.js';

const MEASURES = ['nose_m', 'waist_m', 'tail_m', 'effective_edge_m'];

/**
 * @param {HTMLElement} host
 * @param {{store: ReturnType<import('../store.js').createStore>, engine: any}} context
 */
export function createBoardView(host, context) {
  const { store, engine } = context;
  const verdict = createBoardVerdict();
  const asker = createBoardAsker({ store, engine, comparing: () => compareSheet.isOpen(), onChange: () => render() });
  const ride = createRide(context);
  const figures = createHeadFigures();
  const pictures = createBoardPictures({ onBoots: () => open(bootsSheet), onBend: () => open(bendSheet) });
  const numbers = MEASURES.map((key) => createNumber({ key, kind: BOARD_KINDS[key], id: `board-${key}`, bind: bound('board', key), store }));

  const measureSheet = createMeasureSheet(store, verdict.echo());
  const bootsSheet = createBootsSheet(store, verdict.echo());
  const bendSheet = createBendSheet(context, verdict.echo());
  const riderSheet = createBoardRiderSheet(store, verdict.echo());
  const snowSheet = createSnowSheet(store, verdict.echo(), 'board-snow');
  const boardsSheet = createBoardsSheet(store, ride, null);
  const compareSheet = createCompareSheet({ store, onOpen: () => update(store.get()), rider: riderText, openName }, null);

  const name = el('span', { class: 'board-name' });
  const nameNote = el('span', { class: 'kit-detail' });
  const title = el('div', { class: 'board-title' },
    el('button', { type: 'button', class: 'board-open', 'aria-haspopup': 'dialog', on: { click: () => open(boardsSheet) } }, name, ' ', nameNote),
    el('button', { type: 'button', class: 'board-button', text: t('kit.save'), on: { click: () => saveBoard(store) } }));
  const docks = Object.fromEntries(Object.entries({
    boots: ['dock.boots', bootsSheet], bend: ['dock.bend', bendSheet], measure: ['dock.measure', measureSheet], compare: ['dock.compare', compareSheet],
    rider: ['dock.rider', riderSheet], snow: ['sheet.snow', snowSheet],
  }).map(([key, [label, sheet]]) => [key, dockButton(label, () => open(sheet))]));
  const undo = dockButton('undo', () => store.undo());
  const go = el('button', { type: 'button', class: 'ride', text: t('kit.ride'), on: { click: () => ride(null) } });
  setText(docks.measure.value, t('dock.measure.value'));

  host.append(
    el('div', { class: 'look' }, verdict.node, figures.node, pictures.node),
    el('div', { class: 'set' }, title, ...numbers.map(({ node }) => node),
      el('div', { class: 'dock board-dock' }, ...Object.values(docks).map(({ node }) => node), undo.node), go));

  function open(sheet) {
    sheet.open();
    render();
  }

  function update(state) {
    asker.update(state);
    render();
  }

  function render() {
    const state = store.get();
    const { units, inputs } = state;
    const { boot, board } = boardOf(state);
    const errors = saidErrors(asker.errors());
    const last = state.answers.board ?? null;
    for (const number of numbers) number.update(state, errors);
    setText(name, openName(state));
    setText(nameNote, t(/^demo-/.test(boardOf(state).board_id) ? 'kit.invented' : 'kit.mine'));
    setText(docks.boots.value, typeof boot.sole_length_m === 'number' ? showQuantity('width', boot.sole_length_m, units) : t('dock.none'));
    setText(docks.bend.value, typeof board.stiffness_nm2 === 'number' ? showQuantity('stiffness', board.stiffness_nm2, units) : t('dock.none'));
    setText(docks.compare.value, t('dock.compare.value', { n: chosenBoards(state).length + 1 }));
    setText(docks.rider.value, typeof inputs.rider_mass_kg === 'number' ? showQuantity('mass', inputs.rider_mass_kg, units) : '!');
    setText(docks.snow.value, t(`snow.${inputs.snow}`));
    setText(docks.snow.label, t('dock.snow', { snow: t(`snow.${inputs.snow}.short`) }));
    for (const [key, sheet] of Object.entries({ boots: bootsSheet, bend: bendSheet, rider: riderSheet })) {
      setAttribute(docks[key].node, 'data-wrong', errors.some(({ field }) => sheet.has(field)));
    }
    setAttribute(docks.measure.node, 'data-wrong', errors.some(({ field }) => !MEASURES.includes(field) && field !== 'compared'
      && ![bootsSheet, bendSheet, riderSheet].some((sheet) => sheet.has(field))));
    const what = store.undoable();
    setText(undo.value, what ? undoName(what) : '–');
    setAttribute(undo.node, 'aria-disabled', what ? null : 'true');
    setAttribute(undo.node, 'aria-label', what ? t('undo.what', { name: undoName(what) }) : t('undo.none'));

    const old = whyOld(errors);
    if (last) {
      const side = last.boards.boards[0];
      verdict.update(side.verdict, boardReason(side, units, riderText(state)), boardRemedy(side, last.answer, units), old !== '' || !asker.settled());
    } else verdict.update(null, t(old || 'engine.starting'), '', true);
    figures.update(last, units);
    pictures.update(last && { answer: last.answer, question: last.questions.board, units }, old && t(last ? `${old}.last` : old));
    setAttribute(go, 'aria-disabled', old ? 'true' : null);
    for (const sheet of [measureSheet, bootsSheet, bendSheet, riderSheet]) sheet.update(state, errors, last);
    snowSheet.update(state);
    boardsSheet.update(state);
    compareSheet.update(state, errors, last, asker.settled());
  }

  /** Why what is shown is not the answer to what is set, as a key; empty: it is, or will be at once. */
  function whyOld(errors) {
    if (engine.state !== 'ready') return `engine.${engine.state}`;
    if (errors.some(({ field }) => field !== 'compared')) return 'engine.stale';
    return engine.arrays ? '' : 'board.engine.bend';
  }

  function riderText(state) {
    const { units, inputs } = state;
    const { riding } = boardOf(state);
    const known = (kind, value) => showQuantity(kind, typeof value === 'number' ? value : null, units);
    return t('compare.rider', {
      mass: known('mass', inputs.rider_mass_kg), snow: t(`snow.${inputs.snow}.short`),
      low: known('pitch', riding.pitch_low_deg), high: known('pitch', riding.pitch_high_deg),
    });
  }

  return {
    show: () => setShown(host, true),
    hide: () => setShown(host, false),
    update,
  };
}

/** Few and large: sidecut radius, the speeds that it carves, drag angle against what is asked. */
function createHeadFigures() {
  const radius = createFigure('length');
  const [from, to] = [createFigure('wholeSpeed'), createFigure('speed')];
  const drag = createFigure('angle');
  const [never, none, dragLabel] = [el('span', { hidden: true }), el('span', { hidden: true, text: t('board.noSpeed') }), el('dt')];
  const carves = el('span', {}, from.node, '–', to.node);
  const spread = createFigure('length');
  const pitches = el('dd', { class: 'beside' });
  const asked = el('dd', { class: 'beside' });
  const group = (dt, big, beside) => el('div', {}, dt, el('dd', {}, ...big), beside);
  const node = el('dl', { class: 'figures board-figures' },
    group(el('dt', { text: t('board.sidecut.head') }), [radius.node], el('dd', { class: 'beside' }, '± ', spread.node)),
    group(el('dt', { text: t('board.carves.head') }), [carves, none], pitches), group(dragLabel, [drag.node, never], asked));
  return {
    node,
    update(last, units) {
      setText(dragLabel, t('board.drags.none'));
      if (!last) return;
      const { answer, boards } = last;
      radius.update(answer, 'sidecut_radius_m', units);
      spread.update(answer, 'sidecut_spread_m', units);
      const { speed_windows: windows, carve_speed_mps: window } = boards.boards[0];
      setShown(carves, window !== null);
      setShown(none, window === null);
      from.update(boards, 'boards.0.carve_speed_mps.min', units);
      to.update(boards, 'boards.0.carve_speed_mps.max', units);
      setText(pitches, t('board.carves.on', { low: showQuantity('pitch', windows[0].pitch_deg, units), high: showQuantity('pitch', windows.at(-1).pitch_deg, units) }));
      const first = firstToDrag(answer.boot);
      setShown(drag.node, first !== null);
      setShown(never, first === null);
      setText(never, t(answer.boot ? 'board.never' : 'board.notSet'));
      if (first) drag.update(answer, `drag_angle_deg.${first.end}`, units);
      setText(dragLabel, first ? t('board.drags.head', { end: t(`board.part.${first.end}`) }) : t('board.drags.none'));
      setText(asked, answer.needed ? t('board.drags.asked', { edge: showQuantity('angle', answer.needed.edge_angle_deg, units) }) : '');
    },
  };
}

/** What an undo takes back, by name. */
function undoName(what) {
  const key = ['input', 'sheet', 'undo'].map((place) => `${place}.${what}`).find(hasText);
  return key ? t(key) : t('undo.change');
}

/** A button under the controls: what it is about, and what is set. */
function dockButton(label, onClick) {
  const name = el('span', { class: 'dock-label', text: t(label) });
  const value = el('span', { class: 'dock-value' });
  return { node: el('button', { type: 'button', class: 'dock-button', on: { click: onClick } }, name, ' ', value), label: name, value };
}
