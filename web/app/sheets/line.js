/** The line that is ridden, carved or drifted, where it catches an edge, and the turn's shape. */

import { createChoice } from '../controls/choice.js';
import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createShape } from '../pictures/shape.js';
import { drawWarningSign } from '../pictures/warning-sign.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { createSheet } from './sheet.js';

/** Row of figures: text, kind of quantity, key in the answer's lists and in its `drift`. */
const ROWS = [
  ['figure.radius', 'length', 'turn_radius_m', 'line_radius_m'],
  ['figure.lean', 'angle', 'lean_deg', 'lean_deg'],
  ['figure.leastEdge', 'angle', 'least_edge_angle_deg', 'least_edge_angle_deg'],
  ['figure.edge', 'angle', 'edge_angle_deg', 'edge_angle_deg'],
  ['figure.margin', 'share', 'grip_margin', 'grip_margin'],
  ['figure.driftAngle', 'fineAngle', 'drift_angle_deg', 'drift_angle_deg'],
  ['figure.groove', 'depth', 'groove_width_m', 'groove_width_m'],
];
/** A line to start from where the engine knows none, m. */
const SOME_LINE_M = 10;

/** @param {{store: any, echo: () => Node}} given */
export function createLineSheet({ store, echo }) {
  let kept = null;
  let full = null;
  const how = createChoice({
    name: 'line', legend: t('line.how'), question: null,
    options: ['carve', 'line'].map((value) => ({ value, label: t(`line.${value}`) })),
    onChoose: (value) => setLine(value === 'carve' ? null : startLine()),
  });
  const offer = el('button', { type: 'button', class: 'act', on: { click: () => setLine(tightest()) } });
  const radius = createNumber({ key: 'line_radius_m', kind: 'length', span: [3, 40], optional: true, start: SOME_LINE_M, store });
  const pivoted = el('p', { class: 'strong', hidden: true });
  const title = el('h3');
  const rows = ROWS.map(([label, kind, key, driftKey]) => {
    const figure = createFigure(kind, { signed: kind === 'share' });
    return { figure, key, driftKey, node: el('div', { class: 'row' }, el('dt', { text: t(label) }), el('dd', {}, figure.node)) };
  });
  /** What only a drifting board has. */
  const drifting = rows.filter(({ driftKey }) => ['drift_angle_deg', 'groove_width_m', 'least_edge_angle_deg'].includes(driftKey));
  const list = el('dl', { class: 'rows' }, ...rows.map(({ node }) => node));
  const sign = drawWarningSign();
  const catchText = el('span');
  const catches = el('p', { class: 'catch' }, sign, catchText);
  const shape = createShape();
  const start = createNumber({ key: 'from_phase_deg', kind: 'angle', span: [0, 80], help: true, store });
  const sheet = createSheet('line', echo(), how.node, offer, radius.node, pivoted,
    el('h3', { text: t('line.catch.title') }), catches, title, list,
    el('h3', { text: t('line.shape') }), el('div', { class: 'shape-box' }, shape.node, start.node));

  function setLine(line) {
    store.set({ inputs: { line_radius_m: line } }, { undo: 'line_radius_m', alone: true });
  }
  /** The engine's tightest line that holds, put inside its bound where the full answer has it. */
  function tightest() {
    const change = full?.old ? null : full?.answer?.changes?.find(({ input, enough }) => enough && input === 'line_radius_m');
    return change?.to ?? kept?.answer.drift?.line_radius_m ?? null;
  }
  function startLine() {
    return tightest() ?? SOME_LINE_M;
  }

  return {
    ...sheet,
    update(now) {
      ({ kept, full } = now);
      const { state, errors } = now;
      const { units, inputs } = state;
      const onLine = inputs.line_radius_m !== null;
      how.update(onLine ? 'line' : 'carve');
      setShown(radius.node, onLine);
      radius.update(state, errors);
      start.update(state, errors);
      if (!kept) return;
      const { answer } = kept;
      const offered = answer.drift && !['holds', 'too_slow'].includes(answer.verdict) && Math.abs((inputs.line_radius_m ?? 0) - answer.drift.line_radius_m) > 0.01;
      setShown(offer, Boolean(offered));
      if (offered) setText(offer, t('line.offer', { radius: show('tightest', answer.drift.line_radius_m, units) }));

      const pivots = answer.phase_deg.filter((_, i) => answer.pivoted[i]);
      setShown(pivoted, pivots.length > 0);
      if (pivots.length) setText(pivoted, t('line.pivoted', { phases: spans(pivots, answer.phase_deg, units) }));

      const drifts = !onLine && answer.verdict === 'too_fast' && answer.drift !== null;
      const worst = drifts ? answer.drift.phase_deg : answer.worst.phase_deg;
      const index = answer.phase_deg.indexOf(worst);
      setShown(list, drifts || answer.worst.lean_deg !== null);
      setText(title, list.hidden ? t('line.none', { phase: show('angle', worst, units), state: t(`state.${answer.worst.state}`) }) : t(drifts ? 'line.figures.tightest' : 'line.figures', { phase: show('angle', worst, units) }));
      for (const { figure, key, driftKey } of rows) figure.update(answer, drifts ? `drift.${driftKey}` : `${key}.${index}`, units);
      for (const { node } of drifting) setShown(node, drifts || onLine);
      sayCatch(answer, onLine, units);
      shape.update(answer.picture.path_m);
      setAttribute(shape.node, 'aria-label', t('line.shape.label', { from: show('angle', answer.phase_deg[0], units) }));
    },
  };

  /** Where the downhill edge can catch, in the trade's words. */
  function sayCatch({ edge_catch: { clearance_angle_deg: clear, phases_deg: own }, drift, phase_deg: all, verdict }, onLine, units) {
    const phases = onLine ? own : verdict === 'too_fast' ? drift?.edge_catch_phases_deg ?? [] : [];
    setAttribute(catches, 'data-warning', phases.length > 0);
    setShown(sign, phases.length > 0);
    const angle = clear === null ? '' : ceilAngle(clear, units);
    const key = clear === null ? '.anywhere' : phases.length ? '' : onLine ? '.clear' : '.carve';
    setText(catchText, t(`line.catch${key}`, { angle, phases: spans(phases.length ? phases : all, all, units) }));
    setAttribute(catchText, 'data-answer', 'edge_catch.clearance_angle_deg');
  }
}

/** To the next full degree: who keeps it tilted as shown is clear. */
function ceilAngle(deg, units) {
  return show('angle', Math.ceil(deg - 1e-9), units);
}

/** Phases as stretches: "0° to 65°". */
function spans(phases, all, units) {
  const runs = [];
  for (const phase of phases) {
    const run = runs.at(-1);
    if (run && all.indexOf(phase) === all.indexOf(run[1]) + 1) run[1] = phase;
    else runs.push([phase, phase]);
  }
  return runs.map(([from, to]) => (from === to ? show('angle', from, units)
    : t('line.phases', { from: show('angle', from, units), to: show('angle', to, units) }))).join(', ');
}
