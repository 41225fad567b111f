/** A run of turns: how it ends, where it first fails, and whether any speed carves the pitch. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createMeasured } from '../pictures/measured.js';
import { createRunPicture, runHeight, STRIPS } from '../pictures/run.js';
import { formatNumber, t } from '../text.js';
import { show, symbol, unitOf } from '../units.js';
import { createRunSetup, runQuestion } from './run-setup.js';
import { createSheet } from './sheet.js';

const ROWS = [
  ['run.time', 'time', 'time_s'], ['run.distance', 'distance', 'distance_m'], ['run.top', 'speed', 'top_speed_mps'],
  ['run.end', 'speed', 'end_speed_mps'], ['run.worst', 'share', 'worst.grip_margin'], ['run.critical', 'fineAngle', 'critical_pitch_deg'],
];

/** @param {{store: any, engine: any, onChange: () => void}} given */
export function createRunSheet({ store, engine, onChange }) {
  const word = el('p', { class: 'lead', 'data-run': '' });
  const why = el('p');
  const noSpeed = el('p', { class: 'strong no-speed' });
  const noSpeedWhy = el('p', { class: 'aside', text: t('run.noSpeed.why') });
  const drift = el('button', { type: 'button', class: 'act', on: { click: toggleLine } });
  const picture = createRunPicture();
  const box = createMeasured('run-box', picture.node, draw);
  const rows = ROWS.map(([label, kind, key]) => {
    const figure = createFigure(kind, { signed: kind === 'share' });
    return { figure, key, node: el('div', { class: 'row' }, el('dt', { text: t(label) }), el('dd', {}, figure.node)) };
  });
  const friction = el('p', { class: 'aside', text: t('run.driftFriction') });
  const result = el('div', { class: 'run-result', 'data-ask': 'run' }, noSpeed, noSpeedWhy, drift, box.node, friction,
    el('dl', { class: 'rows' }, ...rows.map(({ node }) => node)));
  const setup = createRunSetup(store);
  const sheet = createSheet('run', null, el('div', { role: 'status' }, word, why), result, setup.node);

  let asked = '';
  /** The question of the answer that is shown. */
  let answered = '';
  let errors = [];
  let answer = null;
  /** The line that a press of the button sets; null: carve. */
  let line = null;
  let units = null;

  async function ask(question) {
    const wanted = JSON.stringify(question);
    if (wanted === asked) return;
    asked = wanted;
    try {
      // The first run is shown before its critical pitch is known, which takes longer.
      const steps = answer ? [question] : [{ ...question, critical: false }, question];
      for (const step of steps) {
        const found = await engine.ask('turn-run', step);
        if (found === null || asked !== wanted) return;
        errors = found.error ?? [];
        if (!found.error) answer = found;
        if (step === question) answered = wanted;
        onChange();
      }
    } catch {
      // The engine has failed; the view says so.
    }
  }

  function toggleLine() {
    store.set({ inputs: { line_radius_m: line } }, { undo: 'line_radius_m', alone: true });
  }

  function draw(size) {
    if (!answer) return;
    const { path, fails_at: fails } = answer;
    picture.update({ path, fails, words: {
      path: t('run.path'), fails: fails ? t(`state.${fails.state}`) : '',
      titles: Object.fromEntries(STRIPS.map(({ name }) => [name, t(`run.${name}`)])),
      spans: spansOf(path, units, true),
      units: Object.fromEntries(STRIPS.map(({ name, kind }) => [name, symbol(unitOf(kind, units)).trim()])),
    } }, size);
  }

  return {
    ...sheet,
    update({ state, kept }) {
      units = state.units;
      ask(runQuestion(state));
      setup.update(state, errors);
      setShown(result, answer !== null);
      setAttribute(result, 'data-old', asked !== answered);
      if (!answer) {
        setText(word, t(errors.length ? 'run.unknown' : 'run.waiting'));
        return;
      }
      const { fails_at: fails, legs, end } = answer;
      setText(word, fails ? t(`run.fails.${fails.state}`, { turn: fails.turn }) : t(`run.verdict.${answer.verdict}`));
      setAttribute(word, 'data-run', answer.verdict);
      const sentences = [];
      if (fails) {
        sentences.push(t('run.fails.why', {
          phase: show('angle', fails.phase_deg, units), distance: show('distance', fails.distance_m, units),
          speed: show('speed', fails.speed_mps, units), why: t(`run.why.${fails.limit ?? fails.state}`),
        }));
        if (fails.state === 'washes_out') sentences.push(t('run.past'));
      }
      if (end === 'stops') sentences.push(t('run.stops'));
      setText(why, sentences.join(' '));
      const steep = legs?.find((leg) => leg.no_speed_carves);
      if (steep) setText(noSpeed, legs.length > 1 ? t('run.noSpeed.leg', { pitch: show('pitch', steep.pitch_deg, units) }) : t('run.noSpeed'));
      const carves = state.inputs.line_radius_m === null;
      for (const one of [noSpeed, noSpeedWhy]) setShown(one, carves && Boolean(steep));
      line = carves ? kept?.answer.drift?.line_radius_m ?? null : null;
      setShown(drift, !carves || line !== null);
      setText(drift, carves ? t('run.drift', { radius: show('tightest', line, units) }) : t('run.carve'));
      setShown(friction, answer.cautions.includes('drift_friction'));
      for (const { figure, key } of rows) figure.update(answer, key, units);
      const spans = spansOf(answer.path, units);
      setAttribute(picture.node, 'aria-label', t('run.picture.label', {
        fails: `${word.textContent}.`, ...spans }));
      box.node.style.height = `${runHeight(answer.path, box.node.clientWidth || 330)}px`;
      box.redraw();
    },
  };
}

/** Least and most of each strip, in words; `bare`: without the unit. */
function spansOf(path, units, bare = false) {
  return Object.fromEntries(STRIPS.map(({ name, key, kind }) => {
    const known = path[key].filter((value) => value !== null);
    if (!known.length) return [name, '–'];
    const unit = unitOf(kind, units);
    const decimals = Math.min(1, unit.decimals);
    const [from, to] = [Math.min(...known), Math.max(...known)].map((value) => formatNumber(unit.show(value), { decimals }));
    return [name, from === to ? from : t(bare ? 'run.picture.bare' : 'run.picture.span', { from, to }) + (bare ? '' : symbol(unit))];
  }));
}
