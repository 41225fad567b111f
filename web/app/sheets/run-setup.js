/** What a run is made of: start, turns, and the hill as one pitch or several. */

import { createChoice } from '../controls/choice.js';
import { createNumber } from '../controls/number.js';
import { el, setShown, setText } from '../dom.js';
import { t } from '../text.js';

/** As the engine has it where a run says nothing. */
const TURNS = 10;
const START_PHASE_DEG = 20;
const LEG_LENGTH_M = 60;
const MOST_LEGS = 10;

/** The run's own settings with what stands for those that are not set. */
export function runOf({ turn: { run }, inputs }) {
  return { start_speed_mps: inputs.speed_mps, turns: TURNS, start_phase_deg: START_PHASE_DEG, legs: null, ...run };
}

/** @param {import('../store.js').State} state */
export function runQuestion(state) {
  const { pitch_deg, speed_mps: _speed, from_phase_deg: _from, ...shared } = state.inputs;
  const { legs, ...run } = runOf(state);
  return { ask: 'run', ...shared, ...run, ...(legs ? { legs } : { pitch_deg }) };
}

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createRunSetup(store) {
  const put = (patch) => ({ turn: { run: { ...store.get().turn.run, ...patch } } });
  const asTurn = el('span');
  const numbers = [['start_speed_mps', 'speed', asTurn], ['turns', 'count'], ['start_phase_deg', 'angle']].map(([key, kind, aside]) => createNumber({
    key: `run.${key}`, kind, aside, store,
    bind: { read: (state) => runOf(state)[key], write: (value) => put({ [key]: value }), path: () => key },
  }));
  const hill = createChoice({
    name: 'run-hill', legend: t('run.hill'),
    options: [{ value: 'pitch', label: t('run.onPitch') }, { value: 'legs', label: t('run.onLegs') }],
    onChoose: (value) => store.set(put({ legs: value === 'pitch' ? null : firstLegs() }), { undo: 'run' }),
  });
  const legsBox = el('div', { class: 'run-legs' });
  const add = el('button', { type: 'button', class: 'act', text: t('run.addLeg'), on: { click: addLeg } });
  let legNumbers = [];

  const legsNow = () => runOf(store.get()).legs ?? [];
  function firstLegs() {
    const pitch = store.get().inputs.pitch_deg;
    return [0, 1].map(() => ({ pitch_deg: typeof pitch === 'number' ? pitch : 15, length_m: LEG_LENGTH_M }));
  }
  function addLeg() {
    store.set(put({ legs: [...legsNow(), { ...legsNow().at(-1) }] }), { undo: 'run' });
    store.seal();
  }
  function removeLeg(i) {
    store.set(put({ legs: legsNow().filter((_, j) => j !== i) }), { undo: 'run' });
    store.seal();
  }
  function build(count) {
    legNumbers = Array.from({ length: count }, (_, i) => [['pitch_deg', 'pitch'], ['length_m', 'distance']].map(([key, kind]) => createNumber({
      key: `run.${key}`, id: `run-leg-${i}-${key}`, kind, store,
      bind: {
        read: (state) => runOf(state).legs?.[i]?.[key] ?? '',
        write: (value) => put({ legs: legsNow().map((leg, j) => (j === i ? { ...leg, [key]: value } : leg)) }),
        path: () => `legs[${i}].${key}`,
      },
    })));
    legsBox.replaceChildren(...legNumbers.map((pair, i) => el('fieldset', { class: 'run-leg' },
      el('legend', { text: t('run.leg', { n: i + 1 }) }), ...pair.map(({ node }) => node),
      count > 1 ? el('button', { type: 'button', class: 'act', text: t('run.removeLeg', { n: i + 1 }), on: { click: () => removeLeg(i) } }) : null)));
  }

  return {
    node: el('div', { class: 'run-setup' }, el('h3', { text: t('run.set') }), ...numbers.map(({ node }) => node), hill.node, legsBox, add),
    update(state, errors) {
      const { legs } = runOf(state);
      setText(asTurn, 'start_speed_mps' in state.turn.run ? '' : t('run.asTurn'));
      hill.update(legs ? 'legs' : 'pitch');
      setShown(legsBox, Boolean(legs));
      setShown(add, Boolean(legs) && legs.length < MOST_LEGS);
      if ((legs?.length ?? 0) !== legNumbers.length) build(legs?.length ?? 0);
      for (const number of [...numbers, ...legNumbers.flat()]) number.update(state, errors);
    },
  };
}
