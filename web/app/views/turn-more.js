/** What is one tap behind the Turn view: how sure, what to change, window, line, run. */

import { el, setAttribute, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createChangesSheet } from '../sheets/changes.js';
import { createLineSheet } from '../sheets/line.js';
import { createRunSheet } from '../sheets/run.js';
import { createSureSheet } from '../sheets/sure.js';
import { createWindowSheet } from '../sheets/window.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { createFix } from './turn-fix.js';
import { createFullAnswer } from './turn-full.js';
import { driftLeads } from './turn-shown.js';

const SHEETS = {
  changes: createChangesSheet, sure: createSureSheet, window: createWindowSheet, line: createLineSheet, run: createRunSheet,
};

/**
 * @param {object} given
 * @param {ReturnType<import('../store.js').createStore>} given.store
 * @param {any} given.engine
 * @param {() => Node} given.echo the verdict in short, for a sheet that covers it
 * @param {() => void} given.onChange what is shown has changed, though the state has not
 */
export function createTurnMore({ store, engine, echo, onChange }) {
  const full = createFullAnswer({ engine, channel: 'turn-full', onAnswer: onChange });
  /** Where the drifted line leads, the chance is for the turn on it. */
  const onLine = createFullAnswer({ engine, channel: 'turn-full-line', onAnswer: onChange });
  const forCarve = { get answer() { return full.answer; }, get old() { return full.old; }, get errors() { return full.errors; }, lineM: null };
  const reference = createReference(engine, onChange);
  /** Sheets by name; each is made when it is first opened. */
  const sheets = {};
  const open = (name) => {
    sheets[name] ??= SHEETS[name]({ store, engine, echo, onChange, reference });
    sheets[name].open();
    reference.want();
    onChange();
  };
  const fix = createFix({ store, onList: () => open('changes') });
  const chance = createChance(() => open('sure'));
  const ways = Object.keys(SHEETS).map((name) => ({ name, ...createWay(name, () => open(name)) }));

  return {
    fix,
    chance: chance.node,
    ways: el('div', { class: 'ways', role: 'group', 'aria-label': t('ways.label') }, ...ways.map(({ node }) => node)),
    /** @param {object} question the turn's, checked or not */
    ask(question) {
      full.want({ ...question, spread: store.get().turn.spread });
    },
    /**
     * @param {import('../store.js').State} state
     * @param {{question: any, answer: any, wider: any}|undefined} kept
     * @param {{field: string, problem: string, allowed: string}[]} errors
     */
    update(state, kept, errors) {
      const { units } = state;
      const drifts = Boolean(kept) && driftLeads(kept.answer);
      if (drifts) {
        onLine.want({ ask: 'turn', ...state.inputs, line_radius_m: kept.answer.drift.line_radius_m, spread: state.turn.spread, suggest: false });
      }
      const sure = drifts ? onLine : forCarve;
      if (kept) fix.update(kept.answer, full, units);
      chance.update(sure, units);
      for (const { name, node, value } of ways) {
        if (name !== 'line') continue;
        setAttribute(node, 'data-wrong', errors.some(({ field }) => field === 'line_radius_m' || field === 'from_phase_deg'));
        const radius = state.inputs.line_radius_m;
        setText(value, typeof radius === 'number' ? t('ways.line.line', { radius: show('length', radius, units) }) : t('ways.line.carve'));
      }
      for (const sheet of Object.values(sheets)) {
        if (sheet.dialog.open) sheet.update({ state, kept, full, sure, errors });
      }
    },
  };
}

/** A button to a sheet: what it is about, and its name. */
function createWay(name, onClick) {
  const key = `ways.${name}.name`;
  const named = t(key) === key ? t(`sheet.${name}`) : t(key);
  const value = el('span', { class: 'dock-value', text: named });
  return {
    node: el('button', { type: 'button', class: 'dock-button', 'data-sheet': name, 'aria-haspopup': 'dialog', on: { click: onClick } },
      el('span', { class: 'dock-label', text: t(`ways.${name}`) }), ' ', value),
    value,
  };
}

/** The chance among the view's figures; a tap says what it rests on. */
function createChance(onClick) {
  const figure = createFigure('bareHundred');
  const unit = el('span', { class: 'in-hundred', text: t('unit.inHundred') });
  const node = el('button', { type: 'button', class: 'chance', 'aria-haspopup': 'dialog', on: { click: onClick } },
    el('span', { class: 'chance-label', text: t('figure.chance') }), ' ', el('span', { class: 'chance-value' }, figure.node, ' ', unit));
  return {
    node,
    update({ answer, old }, units) {
      figure.update(answer, 'chance_holds', units);
      const chance = answer?.chance_holds ?? null;
      setAttribute(node, 'aria-label', chance === null ? t('figure.chance.none')
        : t('figure.chance.label', { chance: show('hundred', chance, units).replace('\u202f', ' ') }));
      setAttribute(node, 'data-old', old);
    },
  };
}

/** What the answers rest on, asked once when first wanted. */
function createReference(engine, onAnswer) {
  let asked = false;
  const reference = {
    answer: null,
    async want() {
      if (asked) return;
      asked = true;
      try {
        reference.answer = await engine.ask('turn-reference', { ask: 'reference' });
        onAnswer();
      } catch {
        asked = false;
      }
    },
  };
  return reference;
}
