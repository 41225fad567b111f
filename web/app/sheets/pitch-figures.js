/** All figures of the pitch, one tap away: every leg, every clothing, stopping, and the sweep. */

import { el, setShown, setText } from '../dom.js';
import { createSweep } from '../pictures/sweep.js';
import { formatNumber, t } from '../text.js';
import { show, symbol, unitOf } from '../units.js';
import { put, putMargin, putStop } from '../views/pitch-figures.js';
import { down, pitchText, up } from '../views/pitch-words.js';
import { createSheet } from './sheet.js';

/** Pitches of the sweep's table, degrees. */
const TABLE_DEG = [5, 10, 15, 20, 25, 30, 35, 40, 45, 50];

/** A row of figures: label, then pieces of text of which some are figures with a key. */
function row(label) {
  const pieces = [el('span'), el('span'), el('span')];
  const node = el('div', { class: 'row' }, el('dt', { text: t(label) }), el('dd', {}, ...pieces));
  return { node, pieces };
}

/** Rows for figures that stand alone; gives a function that fills them. */
function plainRows(list) {
  const rows = list.map(([label]) => row(label));
  return {
    nodes: rows.map(({ node }) => node),
    /** `at`: key of the part of the answer that the rows are about */
    update(part, at, units) {
      list.forEach(([, kind, key, none], i) => {
        const value = key.split('.').reduce((inner, name) => inner?.[name], part) ?? null;
        const word = kind === 'limit';
        put(rows[i].pieces[0], value === null ? t(none ?? '–') : word ? t(`limit.${value}`) : show(kind, value, units), `${at}.${key}`);
      });
    },
  };
}

const STAND = [
  ['pitch.figures.edge', 'angle', 'standing.edge_angle_deg'],
  ['pitch.figures.angulated', 'angle', 'standing.angulated_edge_angle_deg'],
  ['pitch.figures.limit', 'limit', 'standing.limit'],
  ['pitch.figures.catch', 'angle', 'standing.edge_catch_below_deg'],
];
const PASSAGE = [
  ['pitch.figures.in', 'speed', 'speed_in_mps'],
  ['pitch.figures.out', 'speed', 'speed_out_mps'],
];
const LEVEL = [
  ['pitch.figures.speedsUp', 'pitch', 'speeds_up_above_deg'],
  ['pitch.figures.stopsAfter', 'slope', 'distance_m', 'pitch.figures.runs'],
  ['pitch.figures.endSpeed', 'speed', 'end_speed_mps'],
  ['pitch.figures.topSpeed', 'speed', 'top_speed_mps'],
];

function createLeg() {
  const summary = el('summary');
  const [stand, passage] = [plainRows(STAND), plainRows(PASSAGE)];
  const margin = row('pitch.figures.margin');
  const washes = row('pitch.figures.washes');
  const sideslip = row('pitch.figures.sideslip');
  const brake = row('pitch.figures.brake');
  const node = el('details', {}, summary, el('dl', { class: 'rows' }, ...stand.nodes, margin.node, washes.node, sideslip.node, ...passage.nodes, brake.node));
  return {
    node,
    update(answer, index, units) {
      const leg = answer.legs[index];
      const at = `legs.${index}`;
      setText(summary, t('pitch.figures.legSummary', {
        leg: index + 1, pitch: (leg.pitch_deg < 0 ? '↗' : '') + pitchText(leg.pitch_deg, units),
        length: show('slope', leg.length_m, units), snow: t(`snow.${leg.snow}.short`),
      }));
      stand.update(leg, at, units);
      putMargin(margin.pieces, leg.standing.grip_margin, `${at}.standing.grip_margin`);
      const { low, high } = leg.standing.washes_out_above_deg;
      const open = low !== null && high === null;
      put(washes.pieces[0], low === null ? t('pitch.figures.washesNever') : open
        ? t('pitch.figures.washesFrom', { pitch: down('pitch', low, units) }) : down('pitch', low, units, true), `${at}.standing.washes_out_above_deg.low`);
      put(washes.pieces[1], high === null ? '' : '–');
      put(washes.pieces[2], high === null ? '' : up('pitch', high, units), high && `${at}.standing.washes_out_above_deg.high`);
      const slip = leg.standing.sideslip_deg;
      put(sideslip.pieces[0], slip ? show('angle', slip.min, units) : t('pitch.figures.sideslipNone'), slip && `${at}.standing.sideslip_deg.min`);
      put(sideslip.pieces[1], slip ? ` ${t('figure.window.to')} ` : '');
      put(sideslip.pieces[2], slip ? show('angle', slip.max, units) : '', slip && `${at}.standing.sideslip_deg.max`);
      passage.update(answer.slide.legs[index], `slide.legs.${index}`, units);
      const braking = leg.stopping_distance_m;
      putStop(brake.pieces, { band_m: braking }, answer.fall.speed_mps, units);
      brake.pieces.forEach((piece) => {
        if (piece.dataset.answer) piece.dataset.answer = piece.dataset.answer.replace('stopping.band_m', `${at}.stopping_distance_m`);
      });
    },
  };
}

export function createPitchFiguresSheet() {
  const legs = Array.from({ length: 10 }, createLeg);
  const levels = [0, 1, 2].map(() => ({ title: el('h4'), rows: plainRows(LEVEL) }));
  const [brake, cannot, sight] = ['pitch.figures.brakeAll', 'pitch.figures.cannot', 'pitch.figures.sight'].map(row);
  const past = el('p', { class: 'aside', text: t('pitch.figures.past') });
  const sightNone = el('p', { class: 'aside', text: t('pitch.figures.sightNone') });
  const sweep = createSweep();
  const sweepBox = el('div', { class: 'sweep-box' }, sweep.node);
  const sweepNote = el('p', { class: 'aside' });
  const head = el('tr');
  const bodyRows = TABLE_DEG.map(() => el('tr', {}, el('th', { scope: 'row' }), el('td'), el('td'), el('td')));
  const caption = el('caption');
  const table = el('table', { class: 'sweep-table' }, caption, el('thead', {}, head), el('tbody', {}, ...bodyRows));
  head.append(el('th', { scope: 'col', text: t('pitch.sweep.pitch') }), ...['slick', 'middle', 'rough'].map((way) => el('th', { scope: 'col', text: t(`pitch.clothing.${way}`) })));
  const sheet = createSheet('pitch-figures', null,
    el('h3', { text: t('pitch.figures.stand') }), el('div', {}, ...legs.map(({ node }) => node)),
    el('h3', { text: t('pitch.figures.slide') }),
    ...levels.flatMap(({ title, rows }) => [title, el('dl', { class: 'rows' }, ...rows.nodes)]),
    el('h3', { text: t('pitch.figures.sweep') }), sweepNote, sweepBox, table,
    el('h3', { text: t('pitch.figures.stop') }),
    el('dl', { class: 'rows' }, brake.node, cannot.node, sight.node), past,
    el('p', { class: 'aside', text: t('pitch.figures.cannotWhy') }), sightNone);

  let drawn = null;
  function draw() {
    if (!drawn || !sweepBox.clientWidth) return;
    const { answer, units } = drawn;
    const speed = unitOf('speed', units);
    sweep.update({
      sweep: answer.sweep, nowDeg: answer.legs[answer.sweep.leg].pitch_deg,
      pitchText: (deg) => show('pitch', deg, units),
      ticks: Array.from({ length: 61 }, (_, i) => ({ speed_mps: speed.read(i * 10), text: formatNumber(i * 10) })),
      words: { y: `${t('pitch.sweep.y')},${symbol(speed)}`, now: t('pitch.sweep.now'),
        ...Object.fromEntries(['slick', 'middle', 'rough'].map((way) => [way, t(`pitch.clothing.${way}`)])) },
    }, { width: sweepBox.clientWidth, height: sweepBox.clientHeight, em: parseFloat(getComputedStyle(sweepBox).fontSize) });
  }
  new ResizeObserver(draw).observe(sweepBox);
  sweep.node.setAttribute('aria-label', t('pitch.sweep.label'));

  /**
   * @param {any} answer the pitch's
   * @param {import('../units.js').Units} units
   */
  function update(answer, units) {
    if (!sheet.dialog.open || !answer || (drawn?.answer === answer && drawn.units === units)) return;
    drawn = { answer, units };
    legs.forEach((leg, index) => {
      setShown(leg.node, index < answer.legs.length);
      if (index < answer.legs.length) leg.update(answer, index, units);
      leg.node.open = index === answer.weakest_leg;
    });
    levels.forEach(({ title, rows }, i) => {
      const { clothing, friction } = answer.levels[i];
      setText(title, t('pitch.figures.level', { clothing: t(`pitch.clothing.${clothing}`), friction: formatNumber(friction, { decimals: 3, least: 2 }) }));
      rows.update(answer.levels[i], `levels.${i}`, units);
    });
    putStop(brake.pieces, answer.stopping, answer.fall.speed_mps, units);
    setShown(past, Object.values(answer.stopping.past_profile).some(Boolean));
    const { low, high } = answer.stopping.cannot_stop_above_deg;
    put(cannot.pieces[0], down('pitch', low, units, true), 'stopping.cannot_stop_above_deg.low');
    put(cannot.pieces[1], '–');
    put(cannot.pieces[2], up('pitch', high, units), 'stopping.cannot_stop_above_deg.high');
    updateSight(answer.stopping.sight, units);
    setText(sweepNote, t('pitch.sweep.note', { leg: answer.sweep.leg + 1 }));
    setText(caption, t('pitch.sweep.table', { unit: symbol(unitOf('speed', units)).trim() }));
    const speed = unitOf('speed', units);
    bodyRows.forEach((tr, i) => {
      const at = answer.sweep.pitch_deg.indexOf(TABLE_DEG[i]);
      setText(tr.children[0], show('pitch', TABLE_DEG[i], units));
      answer.sweep.levels.forEach(({ foot_speed_mps }, j) => {
        put(tr.children[j + 1], formatNumber(speed.show(foot_speed_mps[at])), `sweep.levels.${j}.foot_speed_mps.${at}`);
      });
    });
    draw();
  }

  function updateSight(given, units) {
    setShown(sight.node, Boolean(given));
    setShown(sightNone, !given);
    if (!given) return;
    const { low, high } = given.speed_mps;
    const none = t('pitch.figures.noSpeed');
    setText(sight.node.firstChild, t('pitch.figures.sight', { distance: show('slope', given.distance_m, units) }));
    put(sight.pieces[0], low === null ? none : down('speed', low, units, true), 'stopping.sight.speed_mps.low');
    put(sight.pieces[1], high === null ? '' : ` ${t('figure.window.to')} `);
    put(sight.pieces[2], high === null ? '' : down('speed', high, units), 'stopping.sight.speed_mps.high');
  }

  return { ...sheet, update };
}
