/** What to change, in words: how much, and what it becomes. Only shown values are rounded. */

import { formatNumber, t } from '../text.js';
import { show, symbol, unitOf } from '../units.js';

/** Kind of quantity of each input. */
const KINDS = {
  speed_mps: 'speedWindow', pitch_deg: 'pitch', angulation_deg: 'angle', sidecut_radius_m: 'length', line_radius_m: 'tightest',
};

/**
 * The engine's change in words.
 * @param {{input: string, from: any, to: any, enough: boolean}} change
 * @param {import('../units.js').Units} units
 * @returns {{way: string, values: Record<string, string>}} `way`: ending of the text's key
 */
export function changeWords({ input, from, to }, units) {
  if (input === 'snow') {
    return { way: 'snow', values: { snow: t(`snow.${to}.short`), title: t(`snow.${to}`), to: t(`snow.${to}`) } };
  }
  const kind = KINDS[input];
  const values = { to: kind === 'pitch' || kind === 'angle' ? fine(kind, to, units) : show(kind, to, units) };
  if (from === null) return { way: `${input}.drift`, values };
  return { way: `${input}.${to < from ? 'less' : 'more'}`, values: { ...values, cost: cost(kind, from, to, units) } };
}

/** A value to a tenth. */
function fine(kind, value, units) {
  const unit = unitOf(kind, units);
  return formatNumber(unit.show(value), { decimals: 1, least: 0 }) + symbol(unit);
}

/** How far apart two values are, rounded up: who follows the words goes far enough. */
function cost(kind, from, to, units) {
  const unit = unitOf(kind, units);
  const apart = Math.abs(unit.show(to) - unit.show(from));
  const step = apart < 10 ? 0.1 : 1;
  return formatNumber(Math.max(1, Math.ceil(apart / step - 1e-3)) * step, { decimals: 1, least: 0 }) + symbol(unit);
}

/**
 * Puts a change into the state exactly as the engine gave it; undone on its own.
 * @param {ReturnType<import('../store.js').createStore>} store
 */
export function applyChange(store, { input, to }) {
  store.set({ inputs: { [input]: to } }, { undo: input, alone: true });
}
