/** The legs of the slope: one to ten, of which one has its numbers on the page. */

import { createNumber } from '../controls/number.js';
import { el, setAttribute, setShown, setText } from '../dom.js';
import { formatNumber, t } from '../text.js';
import { show, symbol, unitOf } from '../units.js';
import { EMPTY_LEG, GIVEN, legPatch, MOST_LEGS, pitchOf, selectedLeg } from './pitch-state.js';

/** Numbers of a leg: name in the text table, the leg's key, what says that it is this one. */
const NUMBERS = [
  { key: 'leg_pitch', by: 'pitch_deg', kind: 'pitch', span: [0, 50] },
  { key: 'leg_percent', by: 'percent', kind: 'percent', span: [0, 100] },
  { key: 'leg_drop', by: 'drop_m', kind: 'slope', span: [0, 100] },
  { key: 'leg_length', by: null, kind: 'slope', span: [5, 300] },
];

/**
 * @param {ReturnType<import('../store.js').createStore>} store
 * @param {{onMore: () => void}} given `onMore`: opens the rest of a leg
 */
export function createLegs(store, { onMore }) {
  const tabs = Array.from({ length: MOST_LEGS }, (_, index) => {
    const number = el('span', { class: 'leg-number', text: formatNumber(index + 1) });
    const steep = el('span', { class: 'leg-steep' });
    const long = el('span', { class: 'leg-long' });
    const fault = el('span', { class: 'visually-hidden' });
    return { steep, long, fault, node: el('button', {
      type: 'button', class: 'leg', on: { click: () => store.set({ pitch: { selected: index } }) },
    }, el('span', { class: 'visually-hidden', text: t('pitch.leg.word') }), ' ', number, ' ', steep, ' ', long, fault) };
  });
  const add = el('button', { type: 'button', class: 'plain-button', text: t('pitch.leg.add'), on: { click: added } });
  const own = el('button', { type: 'button', class: 'own', text: t('pitch.own'), on: { click: startOwn } });
  const more = el('button', { type: 'button', class: 'plain-button', 'aria-haspopup': 'dialog', on: { click: onMore } });
  const numbers = NUMBERS.map((given) => ({ by: given.by, control: legNumber(store, given) }));
  const list = el('div', { class: 'legs', role: 'group', 'aria-label': t('pitch.legs') }, ...tabs.map(({ node }) => node));
  const node = el('div', { class: 'profile-entry' }, own, list, ...numbers.map(({ control }) => control.node), el('div', { class: 'leg-row' }, more, add));

  function added() {
    const pitch = pitchOf(store.get());
    const { index } = selectedLeg(pitch);
    const legs = [...pitch.legs.slice(0, index + 1), EMPTY_LEG, ...pitch.legs.slice(index + 1)];
    store.set({ pitch: { legs, selected: index + 1, demo: false, notice: null } }, { undo: 'pitch-legs' });
    store.seal();
    focusFirst();
  }

  function startOwn() {
    store.set({
      pitch: { legs: [EMPTY_LEG], selected: 0, demo: false, name: '', fall_at_m: 0, notice: null },
      answers: { pitch: undefined },
    }, { undo: 'pitch-legs' });
    store.seal();
    focusFirst();
  }

  function focusFirst() {
    node.querySelector('.number:not([hidden]) .field').focus();
  }

  /**
   * @param {any} state
   * @param {{field: string, problem: string, allowed: string}[]} errors
   */
  function update(state, errors) {
    const pitch = pitchOf(state);
    const { index, leg } = selectedLeg(pitch);
    tabs.forEach((tab, i) => {
      const one = pitch.legs[i];
      setShown(tab.node, Boolean(one));
      if (!one) return;
      const wrong = errors.some(({ field }) => field.startsWith(`legs[${i}].`));
      setText(tab.steep, legValue(one.by, one.value, state.units));
      setText(tab.long, legValue('length_m', one.length_m, state.units) + (wrong ? ' !' : ''));
      setText(tab.fault, wrong ? ` ${t('pitch.leg.wrong')}` : '');
      setAttribute(tab.node, 'aria-pressed', String(i === index));
      setAttribute(tab.node, 'data-wrong', wrong);
    });
    setShown(list, pitch.legs.length > 1);
    setShown(add, pitch.legs.length < MOST_LEGS);
    setShown(own, pitch.demo);
    setText(more, pitch.legs.length > 1 ? t('pitch.leg.moreShort', { leg: index + 1 }) : t('pitch.leg.moreOne'));
    for (const { by, control } of numbers) {
      const shown = by === null || by === leg.by;
      setShown(control.node, shown);
      if (shown) control.update(state, errors);
    }
  }

  return { node, update };
}

/** A number of the selected leg. */
function legNumber(store, { key, by, kind, span }) {
  const name = by === null ? 'length_m' : 'value';
  return createNumber({
    key, kind, span, store, start: span[0],
    bind: {
      read: (state) => selectedLeg(pitchOf(state)).leg[name],
      write(value) {
        const pitch = pitchOf(store.get());
        return legPatch(pitch, selectedLeg(pitch).index, { [name]: value });
      },
      path: (state) => `legs[${selectedLeg(pitchOf(state)).index}].${by ?? 'length_m'}`,
    },
  });
}

/** An entry of a leg as it stands on its button; a dash where there is none. */
export function legValue(key, value, units) {
  const kind = GIVEN[key] ?? 'slope';
  if (typeof value !== 'number') return value === '' ? '–' : String(value).slice(0, 6);
  if (kind !== 'pitch') return show(kind, value, units);
  const unit = unitOf(kind, units);
  return formatNumber(unit.show(value), { decimals: 1, least: 0 }) + symbol(unit);
}
