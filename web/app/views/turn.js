/**
 * The Turn view: will the edge hold through this turn, how close is it, where does it go first.
 *
 * A view is one module `views/<name>.js` with `create<Name>View(host, context)`; it fills `host`
 * once and returns `show()`, `hide()` and `update(state)`, which is called after every change of
 * the store or of the engine while the view is shown. `context` is `{store, engine}`:
 * `engine.ask(channel, question)`, `engine.state` ('starting', 'ready', 'failed') and
 * `engine.arrays` (numpy has joined: an answer may say more). A view asks
 * on channels of its own name and keeps its last good answer in `state.answers.<name>`.
 */

import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createFiguresSheet } from '../sheets/figures.js';
import { createRiderSheet } from '../sheets/rider.js';
import { createSnowSheet } from '../sheets/snow.js';
import { hasText, t } from '../text.js';
import { show as showQuantity } from '../units.js';
import { createTurnMore } from './turn-more.js';
import { createTurnPictures } from './turn-pictures.js';
import { driftLeads, shownTurn } from './turn-shown.js';
import { createVerdict } from './turn-verdict.js';

/** Inputs on the page, with the ends of their sliders; typing goes as far as the engine does. */
const SLIDERS = [
  { key: 'pitch_deg', kind: 'pitch', span: [0, 50] },
  { key: 'speed_mps', kind: 'speed', span: [0, 25] },
  { key: 'sidecut_radius_m', kind: 'length', span: [4, 20] },
];
/** While a slider moves only the verdict is asked for: chances and suggestions take longer. */
const AT_ONCE = { samples: 0, suggest: false };
const FIGURES = [
  ['lean', 'angle', 'lean_deg', {}],
  ['edge', 'angle', 'edge_angle_deg', {}],
  ['margin', 'share', 'grip_margin', { signed: true }],
];

/**
 * @param {HTMLElement} host
 * @param {{store: ReturnType<import('../store.js').createStore>, engine: any}} context
 */
export function createTurnView(host, { store, engine }) {
  const further = createTurnMore({ store, engine, echo: () => verdict.echo(), onChange: () => renderFurther() });
  const verdict = createVerdict(further.fix);
  const figures = FIGURES.map(([name, kind, key, options]) => ({ key, name, figure: createFigure(kind, options), label: el('dt', { text: t(`figure.${name}`) }) }));
  const pictures = createTurnPictures({ onPick: (index) => { picked = index; render(); } });
  const speedWindow = createWindow();
  const numbers = SLIDERS.map((input) => createNumber({
    ...input, aside: input.key === 'speed_mps' ? speedWindow.node : undefined, store }));
  const snowSheet = createSnowSheet(store, verdict.echo());
  const riderSheet = createRiderSheet(store, verdict.echo());
  const figuresSheet = createFiguresSheet();
  const snow = dockButton('sheet.snow', snowSheet.open);
  const rider = dockButton('dock.rider', riderSheet.open);
  const more = dockButton('dock.more', () => {
    figuresSheet.open();
    drawn = [];
    render();
  });
  const undo = dockButton('undo', () => store.undo());
  setText(more.value, t('dock.figures'));

  host.append(
    el('div', { class: 'look' }, verdict.node,
      el('div', { class: 'figures' }, el('dl', {}, ...figures.map(({ label, figure }) =>
        el('div', {}, label, el('dd', {}, figure.node)))), further.chance),
      pictures.node),
    el('div', { class: 'set' }, ...numbers.map((number) => number.node),
      el('div', { class: 'dock' }, snow.node, rider.node, more.node, undo.node), further.ways));

  let asked = '';
  let errors = [];
  /** Index of the phase that the reader looks at; null: the tightest point. */
  let picked = null;
  /** Whether the engine has answered since the page was opened. */
  let fresh = false;
  /** What the answer on the page was drawn from. */
  let drawn = [];

  async function ask(question) {
    const mine = asked;
    try {
      const answer = await engine.ask('turn', question);
      if (answer === null) return;
      if (answer.error) {
        errors = answer.error;
        render();
        return;
      }
      let wider = null;
      if (driftLeads(answer)) {
        wider = await engine.ask('turn-line', { ...question, line_radius_m: answer.drift.line_radius_m });
        if (wider === null || asked !== mine) return;
        if (wider.error) wider = null; // a line too wide to be asked about
      }
      errors = [];
      picked = null;
      fresh = true;
      store.set({ answers: { turn: { question, answer, wider } } });
    } catch {
      // The engine has failed; main.js hears of it and has the view updated.
    }
  }

  function update(state) {
    const question = { ask: 'turn', ...state.inputs, ...AT_ONCE };
    const wanted = JSON.stringify(question);
    if (wanted !== asked) {
      asked = wanted;
      ask(question);
    }
    further.ask({ ask: 'turn', ...state.inputs });
    render();
  }

  function render() {
    const state = store.get();
    const { units, inputs } = state;
    const kept = state.answers.turn;
    for (const number of numbers) {
      number.update(state, errors, number.key === 'speed_mps' ? kept?.answer.carve_speed_mps ?? null : undefined);
    }
    snowSheet.update(state);
    riderSheet.update(state, errors);
    setText(snow.label, t('dock.snow', { snow: t(`snow.${inputs.snow}.short`) }));
    setText(snow.value, t(`snow.${inputs.snow}`));
    setText(rider.value, typeof inputs.rider_mass_kg === 'number' ? showQuantity('mass', inputs.rider_mass_kg, units) : '!');
    setAttribute(rider.node, 'data-wrong', errors.some(({ field }) => riderSheet.has(field)));
    const what = store.undoable();
    setText(undo.value, what ? undoName(what) : '–');
    setAttribute(undo.node, 'aria-disabled', what ? null : 'true');
    setAttribute(undo.node, 'aria-label', what ? t('undo.what', { name: undoName(what) }) : t('undo.none'));

    const old = engine.state !== 'ready' ? `engine.${engine.state}` : errors.length ? 'engine.stale' : '';
    verdict.say(kept ? '' : t(old || 'engine.starting'));
    if (!kept) {
      pictures.preview(typeof inputs.pitch_deg === 'number' ? inputs.pitch_deg : 0);
      return;
    }
    // Drawn again only if something in it has changed: an input alone changes no picture.
    const from = [kept, units, picked, old];
    try {
      if (from.some((part, i) => part !== drawn[i])) {
        drawn = from;
        renderAnswer(kept, units, old);
      }
      renderFurther();
    } catch (problem) {
      if (fresh) throw problem;
      // What was kept is another version's answer: do without.
      store.set({ answers: { turn: null } });
    }
  }

  function renderFurther() {
    const state = store.get();
    further.update(state, state.answers.turn, errors);
  }

  function renderAnswer({ question, answer, wider }, units, old) {
    const shown = shownTurn(answer, wider, picked);
    verdict.update(answer, units, Boolean(old));
    for (const { figure, key, name, label } of figures) {
      figure.update(shown.source, shown.key(key), units);
      setText(label, shown.picked ? t(`figure.${name}.at`, { phase: showQuantity('angle', shown.phaseDeg, units) }) : t(`figure.${name}`));
    }
    pictures.update({ shown, answer, question, units, old: old && t(`${old}.last`) });
    speedWindow.update(answer, units);
    figuresSheet.update(answer, units);
  }

  return {
    show: () => setShown(host, true),
    hide: () => setShown(host, false),
    update,
  };
}

/** Between which speeds the whole turn carves, in a few words for the slider. */
function createWindow() {
  const figures = { from: createFigure('bareSpeed'), to: createFigure('bareSpeed') };
  const parts = t('figure.window.short').split(/\{(\w+)\}/).map((part, i) => (i % 2 ? figures[part].node : part));
  const some = el('span', { hidden: true }, ...parts);
  const none = el('span', { hidden: true, text: t('figure.window.shortNone') });
  return {
    node: el('span', {}, some, none),
    update(answer, units) {
      setShown(some, answer.carve_speed_mps !== null);
      setShown(none, answer.carve_speed_mps === null);
      figures.from.update(answer, 'carve_speed_mps.min', units);
      figures.to.update(answer, 'carve_speed_mps.max', units);
    },
  };
}

/** What an undo takes back, by name. */
function undoName(what) {
  return t(hasText(`input.${what}`) ? `input.${what}` : `sheet.${what}`);
}

/** A button under the controls: what it is about, and what is set. */
function dockButton(label, onClick) {
  const name = el('span', { class: 'dock-label', text: t(label) });
  const value = el('span', { class: 'dock-value' });
  return {
    node: el('button', { type: 'button', class: 'dock-button', on: { click: onClick } }, name, ' ', value),
    label: name,
    value,
  };
}
