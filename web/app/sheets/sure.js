/** How sure: the chance, the band of the margin, and how well each input is known. */

import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createBand } from '../pictures/band.js';
import { createMeasured } from '../pictures/measured.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { createSheet } from './sheet.js';

/** Inputs that are rough, with the kind of quantity of their spread. */
const SPREADS = {
  pitch_deg: 'angle', speed_share: 'share', sidecut_share: 'share', angulation_deg: 'angle', line_share: 'share', snow_share: 'share',
};
const STATES = ['holds', 'marginal', 'washes_out', 'too_fast', 'too_slow'];

/** @param {{store: any, echo: () => Node, reference: {answer: any}}} given */
export function createSureSheet({ store, echo, reference }) {
  const chance = createFigure('hundred');
  const [before, after] = [el('span'), el('span')];
  const lead = el('p', { class: 'lead', hidden: true }, before, chance.node, after);
  const waiting = el('p', { text: t('sure.waiting') });
  const onLine = el('p', { class: 'aside' });
  const shares = STATES.map((state) => ({ state, figure: createFigure('partOfHundred') }));
  const list = el('dl', { class: 'rows shares' }, ...shares.map(({ state, figure }) =>
    el('div', { class: 'row' }, el('dt', { text: t(`state.${state}`) }), el('dd', {}, figure.node))));
  const band = createBand();
  const picture = createMeasured('band-box', band.node, draw);
  const along = el('div', { class: 'found', hidden: true }, el('h3', { text: t('sure.band') }), picture.node,
    el('p', { class: 'aside', text: t('sure.band.key') }));
  const found = el('div', { class: 'found', hidden: true }, el('h3', { text: t('sure.of') }), list);
  const numbers = Object.entries(SPREADS).map(([key, kind]) => createSpread(key, kind, store, reference));
  const reset = el('button', { type: 'button', class: 'act', text: t('sure.reset'),
    on: { click: () => store.set({ turn: { spread: {} } }, { undo: 'spread' }) } });
  const sheet = createSheet('sure', lead, waiting, onLine, along,
    el('h3', { text: t('sure.spread') }), el('p', { class: 'aside', text: t('sure.spread.help') }),
    ...numbers.map(({ number }) => number.node), reset, found);
  sheet.dialog.querySelector('.sheet-head').append(echo());
  let drawn = null;

  function draw(size) {
    if (!drawn) return;
    const { answer, units } = drawn;
    band.update({
      phases: answer.phase_deg, ...answer.margin_band, margin: answer.grip_margin,
      words: { holds: show('share', 0.15, units), zero: show('share', 0, units), goes: t('sure.goes'),
        start: t('sure.start'), fall: t('sure.fall'), end: t('sure.end') },
    }, size);
  }

  return {
    ...sheet,
    update({ state, sure: full, errors }) {
      const { units } = state;
      for (const { key, number, mark } of numbers) {
        number.update(state, errors.concat(full.errors));
        setText(mark, t(key in state.turn.spread ? 'sure.yours' : 'sure.assumed'));
        setShown(number.node, key !== 'line_share' || state.inputs.line_radius_m !== null);
      }
      setShown(reset, Object.keys(state.turn.spread).length > 0);
      const answer = full.answer?.chance_holds === null ? null : full.answer;
      setShown(lead, answer !== null);
      setShown(waiting, answer === null);
      for (const one of [along, found]) {
        setShown(one, answer !== null);
        setAttribute(one, 'data-old', full.old);
      }
      setShown(onLine, full.lineM !== null);
      if (full.lineM !== null) setText(onLine, t('sure.onLine', { radius: show('tightest', full.lineM, units) }));
      setAttribute(lead, 'data-old', full.old);
      if (!answer) return;
      const [start, end = ''] = t('sure.lead').split('{chance}');
      setText(before, start);
      setText(after, end);
      chance.update(answer, 'chance_holds', units);
      for (const { state: name, figure } of shares) figure.update(answer, `chances.${name}`, units);
      drawn = { answer, units };
      setAttribute(band.node, 'aria-label', bandLabel(answer, units));
      picture.redraw();
    },
  };
}

/** How rough one input is. What is not set is as assumed. */
function createSpread(key, kind, store, reference) {
  const path = `spread.${key}`;
  const mark = el('span', { text: t('sure.assumed') });
  const number = createNumber({
    key: path, kind, store, aside: mark,
    bind: {
      read: (state) => state.turn.spread[key] ?? reference.answer?.turn_spread?.[key] ?? '',
      write: (value) => ({ turn: { spread: { ...store.get().turn.spread, [key]: value } } }),
      path: () => path,
    },
  });
  return { key, number, mark };
}

/** The band in words. */
function bandLabel({ phase_deg: phases, margin_band: { low, high } }, units) {
  const span = (i) => (low[i] === null ? t('sure.band.none') : t('sure.band.span', {
    low: show('share', low[i], units, { signed: true }), high: show('share', high[i], units, { signed: true }) }));
  const known = phases.map((_, i) => i).filter((i) => low[i] !== null);
  const worst = known.reduce((least, i) => (least === null || low[i] < low[least] ? i : least), null);
  return t('sure.band.label', {
    start: span(0), middle: span(Math.round((phases.length - 1) / 2)), end: span(phases.length - 1),
    worst: worst === null ? '–' : show('angle', phases[worst], units),
  });
}
