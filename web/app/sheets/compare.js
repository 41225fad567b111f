/** Two to four boards side by side for one rider, one range of pitch, one snow. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure, valueAt } from '../figure.js';
import { createWindows } from '../pictures/windows.js';
import { formatNumber, t } from '../text.js';
import { show, unitOf } from '../units.js';
import { chosenBoards, kept } from '../kit.js';
import { boardOf, MOST_OTHERS } from '../views/board-state.js';
import { allReasons, rangeText } from '../views/board-words.js';
import { createSheet } from './sheet.js';

/** Rows of the table: text key, whether it is there, what stands in a cell. */
const ROWS = [
  { key: 'carves', kind: 'bareSpeed', of: ['carve_speed_mps.min', 'carve_speed_mps.max'], none: 'compare.noSpeed' },
  { key: 'radius', kind: 'length', of: ['radius_at_45_m.bent'], or: ['radius_at_45_m.hard_snow'] },
  { key: 'drag', kind: 'angle', of: ['drag_angle_deg.least'], none: 'board.never' },
  { key: 'masses', range: 'mass_range_kg', kind: 'mass' },
  { key: 'chance', kind: 'share', of: ['chance_holds'] },
];

/**
 * @param {object} given
 * @param {ReturnType<import('../store.js').createStore>} given.store
 * @param {() => void} given.onOpen all boards are wanted from now on
 * @param {(state: any) => string} given.rider for whom, in a few words
 * @param {(state: any) => string} given.openName name of the open board
 */
export function createCompareSheet({ store, onOpen, rider, openName }, echo) {
  const who = el('p', { class: 'aside' });
  const wait = el('p', { class: 'lead', text: t('compare.wait') });
  const windows = createWindows();
  const note = el('p', { class: 'aside' });
  const table = el('div', { class: 'compare', role: 'table', 'aria-label': t('sheet.compare') });
  const reasons = el('div', { class: 'compare-reasons' });
  const result = el('div', { class: 'compare-result' }, table, windows.node, note, reasons);
  const choices = el('div', { class: 'checks' });
  const tooMany = el('p', { class: 'aside', text: t('compare.most', { n: MOST_OTHERS + 1 }) });
  const wrong = el('p', { class: 'error', role: 'alert', hidden: true, text: t('compare.error') });
  const sheet = createSheet('compare', echo, who, wait, result, el('h3', { text: t('compare.choose') }), wrong, choices, tooMany);
  new ResizeObserver(() => drawn && windows.update(drawn)).observe(windows.node);
  let drawn = null;
  let choicesFor = '';

  function toggle(id, chosen) {
    const { compared } = boardOf(store.get());
    store.set({ board: { compared: chosen ? [...compared, id] : compared.filter((one) => one !== id) } }, { undo: 'compare' });
    store.seal();
  }

  function updateChoices(state) {
    const open = boardOf(state).board_id;
    const chosen = chosenBoards(state).map(({ id }) => id);
    const boards = kept(state, 'boards').filter(({ id }) => id !== open);
    const wanted = JSON.stringify(boards.map(({ id, name }) => [id, name]));
    if (wanted !== choicesFor) {
      choicesFor = wanted;
      choices.replaceChildren(...boards.map(({ id, name, invented }) => el('label', { class: 'option' },
        el('input', { type: 'checkbox', value: id, on: { change: (event) => toggle(id, event.target.checked) } }),
        el('span', { class: 'option-text' }, el('span', { class: 'option-label', text: name }),
          invented ? el('span', { class: 'option-detail', text: t('kit.invented') }) : null))));
    }
    for (const label of choices.children) {
      const [input] = label.children;
      input.checked = chosen.includes(input.value);
      input.disabled = !input.checked && chosen.length >= MOST_OTHERS;
      setAttribute(label, 'data-chosen', input.checked);
      setAttribute(label, 'data-disabled', input.disabled);
    }
    setShown(tooMany, chosen.length >= MOST_OTHERS);
  }

  function cellOf(row, boards, i, units) {
    const side = boards.boards[i];
    if (row.range) return el('span', { 'data-answer': `boards.${i}.${row.range}`, text: side[row.range] ? rangeText(side[row.range], row.kind, units) : '–' });
    const keys = row.or && valueAt(side, row.of[0]) === null ? row.or : row.of;
    const least = keys[0] === 'drag_angle_deg.least';
    const paths = least ? leastDrag(side) : keys;
    if (least && side.drag_angle_deg === null) return el('span', { text: '–' });
    if (!paths || paths.every((path) => valueAt(side, path) === null)) return el('span', { text: row.none ? t(row.none) : '–' });
    const figures = paths.map((path) => {
      const figure = createFigure(row.kind);
      figure.update(boards, `boards.${i}.${path}`, units);
      return figure.node;
    });
    return el('span', {}, ...figures.flatMap((node, k) => (k ? ['–', node] : [node])));
  }

  function updateTable(boards, names, units) {
    const speed = show('bareSpeed', 0, units) && unitOf('speed', units);
    const cell = (i, ...content) => el('div', { role: 'cell' }, el('span', { class: 'cell-name', 'aria-hidden': 'true', text: names[i] }), ...content);
    const rows = [el('div', { role: 'row', class: 'names' }, el('div', { role: 'columnheader', class: 'what visually-hidden', text: t('compare.what') }),
      ...names.map((name, i) => el('div', { role: 'columnheader' }, el('span', { class: 'board-name', text: name }),
        el('span', { class: 'side', 'data-verdict': boards.boards[i].verdict, 'data-answer': `boards.${i}.verdict`, text: t(`board.verdict.short.${boards.boards[i].verdict}`) }))))];
    for (const row of ROWS) {
      if (row.key === 'chance' && boards.boards[0].chance_holds === undefined) continue;
      rows.push(el('div', { role: 'row' }, el('div', { role: 'rowheader', class: 'what', text: t(`compare.${row.key}`, { unit: t(speed.label) }) }),
        ...names.map((_, i) => cell(i, cellOf(row, boards, i, units)))));
    }
    table.style.setProperty('--boards', names.length);
    table.replaceChildren(...rows);
  }

  return {
    ...sheet,
    open() {
      sheet.open();
      onOpen();
    },
    isOpen: () => sheet.dialog.open,
    update(state, errors, last, settled) {
      if (!sheet.dialog.open) return;
      updateChoices(state);
      setText(who, rider(state));
      const others = chosenBoards(state);
      const fits = last?.all === true && settled && last.boards.boards.length === Math.max(2, others.length + 1);
      setShown(wrong, errors.some(({ field }) => field === 'compared'));
      setShown(wait, !fits && others.length > 0 && !errors.length);
      setShown(result, fits && others.length > 0);
      if (!fits || !others.length) return;
      const names = [openName(state), ...others.map(({ name }) => name)];
      const { boards } = last;
      const { units } = state;
      updateTable(boards, names, units);
      const { low, mean, high } = boards.usual_speed_mps;
      const speed = unitOf('speed', units);
      drawn = { usual: { low, mean, high }, boards: names.map((name, i) => ({ name, windows: boards.boards[i].speed_windows })),
        unit: speed.show, write: (value) => formatNumber(value),
        words: { none: t('compare.noSpeed'), usual: t('compare.usual', { low: show('wholeSpeed', low, units), high: show('speed', high, units) }),
          label: t('compare.picture', { boards: names.map((name, i) => `${name}: ${spoken(boards.boards[i], units)}`).join('; '), low: show('speed', low, units), high: show('speed', high, units) }) } };
      windows.update(drawn);
      const pitches = boards.boards[0].speed_windows.map(({ pitch_deg: pitch }) => pitch);
      setText(note, t('compare.note', { low: show('pitch', pitches[0], units), high: show('pitch', pitches.at(-1), units) }));
      reasons.replaceChildren(...names.map((name, i) => el('div', {}, el('h3', {}, `${name}: ${t(`board.verdict.in.${boards.boards[i].verdict}`)}`),
        ...allReasons(boards.boards[i], units).map((text) => el('p', { text })))));
    },
  };
}

function leastDrag({ drag_angle_deg: angles }) {
  const ends = ['toe', 'heel'].filter((end) => angles?.[end] !== null && angles?.[end] !== undefined);
  if (!ends.length) return null;
  return [`drag_angle_deg.${ends.reduce((least, end) => (angles[end] < angles[least] ? end : least))}`];
}

const spoken = (side, units) => (side.carve_speed_mps
  ? `${show('speed', side.carve_speed_mps.min, units)} – ${show('speed', side.carve_speed_mps.max, units)}` : t('compare.noSpeed'));
