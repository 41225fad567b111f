/**
 * Units that people read against those that the engine speaks (SI, degrees). Only this module
 * converts; it knows no physics.
 */

import { formatNumber, t } from './text.js';

/**
 * @typedef {object} Unit
 * @property {string} label key of the unit's symbol in the text table
 * @property {(si: number) => number} show from the engine's unit to this one
 * @property {(shown: number) => number} read back
 * @property {number} decimals decimals of a shown result
 * @property {number} step one nudge of an input
 * @property {'up'|'down'} [toward] the safe side, to which a result is rounded; else to the nearest
 */

const factor = (label, perSi, decimals, step) => ({
  label, decimals, step, show: (si) => si * perSi, read: (shown) => shown / perSi,
});

const DEGREES = Math.PI / 180;

/** @type {Record<string, Record<string, Unit>>} */
const KINDS = {
  speed: {
    kmh: factor('unit.kmh', 3.6, 0, 1),
    mph: factor('unit.mph', 3600 / 1609.344, 0, 1),
    ms: factor('unit.ms', 1, 1, 0.5),
  },
  // The window's ends are worth a decimal: beyond them no carve balances.
  speedWindow: {
    kmh: factor('unit.kmh', 3.6, 1, 1),
    mph: factor('unit.mph', 3600 / 1609.344, 1, 1),
    ms: factor('unit.ms', 1, 1, 0.5),
  },
  pitch: {
    deg: factor('unit.deg', 1, 0, 1),
    percent: {
      label: 'unit.percent', decimals: 0, step: 1,
      show: (deg) => Math.tan(deg * DEGREES) * 100,
      read: (percent) => Math.atan(percent / 100) / DEGREES,
    },
  },
  angle: { deg: factor('unit.deg', 1, 0, 1) },
  length: { m: factor('unit.m', 1, 1, 0.5), ft: factor('unit.ft', 1 / 0.3048, 0, 1) },
  edge: { m: factor('unit.cm', 100, 0, 1), ft: factor('unit.in', 1 / 0.0254, 1, 0.5) },
  depth: { m: factor('unit.mm', 1000, 1, 1), ft: factor('unit.in', 1 / 0.0254, 2, 0.05) },
  mass: { m: factor('unit.kg', 1, 0, 1), ft: factor('unit.lb', 1 / 0.45359237, 0, 1) },
  // A board's measures: widths by tape, lengths along it, and what is small beside it.
  width: {
    cm: factor('unit.cm', 100, 1, 0.1), mm: factor('unit.mm', 1000, 0, 1), in: factor('unit.in', 1 / 0.0254, 2, 0.05),
  },
  along: {
    cm: factor('unit.cm', 100, 0, 1), mm: factor('unit.mm', 1000, 0, 5), in: factor('unit.in', 1 / 0.0254, 1, 0.5),
  },
  small: {
    cm: factor('unit.mm', 1000, 0, 1), mm: factor('unit.mm', 1000, 0, 1), in: factor('unit.in', 1 / 0.0254, 2, 0.05),
  },
  stiffness: { nm2: factor('unit.nm2', 1, 0, 10) },
  load: { g: factor('unit.g', 1, 2, 0.1) },
  // Nobody should read more grip, or a tighter line, than there is.
  share: { percent: { ...factor('unit.percent', 100, 0, 1), toward: 'down' } },
  tightest: {
    m: { ...factor('unit.m', 1, 1, 0.5), toward: 'up' }, ft: { ...factor('unit.ft', 1 / 0.3048, 0, 1), toward: 'up' },
  },
  percent: { percent: factor('unit.percent', 1, 0, 1) },
  // Along a slope metres are enough.
  slope: { m: factor('unit.m', 1, 0, 5), ft: factor('unit.ft', 1 / 0.3048, 0, 10) },
  altitude: { m: factor('unit.m', 1, 0, 100), ft: factor('unit.ft', 1 / 0.3048, 0, 500) },
  friction: { one: factor('unit.one', 1, 2, 0.05) },
  reaction: { s: factor('unit.s', 1, 1, 0.1) },
  temperature: { c: factor('unit.c', 1, 0, 1) },
  dragArea: { m2: factor('unit.m2', 1, 2, 0.05) },
  hundred: { count: { ...factor('unit.inHundred', 100, 0, 1), toward: 'down' } },
  fineAngle: { deg: factor('unit.deg', 1, 1, 1) },
  time: { s: factor('unit.s', 1, 1, 1) },
  distance: { m: factor('unit.m', 1, 0, 10), ft: factor('unit.ft', 1 / 0.3048, 0, 10) },
  count: { one: factor('unit.none', 1, 0, 1) },
};

KINDS.bareSpeed = KINDS.speedWindow;
KINDS.bareHundred = KINDS.hundred;
KINDS.partOfHundred = { count: factor('unit.inHundred', 100, 0, 1) };
KINDS.wholeSpeed = KINDS.speed;
/** Kinds whose unit stands beside them already. */
const BARE = ['bareSpeed', 'wholeSpeed', 'bareHundred', 'partOfHundred'];

/** What the settings offer. */
export const CHOICES = { speed: ['kmh', 'mph', 'ms'], pitch: ['deg', 'percent'], length: ['m', 'ft'], board: ['cm', 'mm', 'in'] };

/** @typedef {{speed: string, pitch: string, length: string, board: string}} Units */

/** @type {Units} */
export const DEFAULT_UNITS = { speed: 'kmh', pitch: 'deg', length: 'm', board: 'cm' };

/** Kinds that follow the choice of another. */
const FOLLOWS = {
  width: 'board', along: 'board', small: 'board', slope: 'length', altitude: 'length',
  edge: 'length', depth: 'length', mass: 'length', speedWindow: 'speed', bareSpeed: 'speed', wholeSpeed: 'speed', distance: 'length', tightest: 'length',
};

/**
 * The unit in which a kind of quantity is shown.
 * @param {string} kind
 * @param {Units} units
 * @returns {Unit}
 */
export function unitOf(kind, units) {
  const choice = units[FOLLOWS[kind] ?? kind];
  return KINDS[kind][choice] ?? Object.values(KINDS[kind])[0];
}

/** The symbol after a number: no space before a degree sign, a narrow one before the others. */
export function symbol(unit) {
  return unit.label === 'unit.deg' ? t(unit.label) : `\u202f${t(unit.label)}`;
}

/**
 * A result as text: number, then unit. A null is an en dash.
 * @param {string} kind
 * @param {number|null|undefined} value in the engine's unit
 * @param {Units} units
 * @param {{signed?: boolean}} [options]
 */
export function show(kind, value, units, { signed = false } = {}) {
  if (value === null || value === undefined) return '–';
  const unit = unitOf(kind, units);
  const number = formatNumber(rounded(unit.show(value), unit), { decimals: unit.decimals, signed });
  return BARE.includes(kind) ? number : number + symbol(unit);
}

/** To the safe side, where a unit has one; what is off by rounding alone is not moved a whole step. */
function rounded(shown, { toward, decimals }) {
  if (!toward) return shown;
  const steps = shown * 10 ** decimals;
  return (toward === 'up' ? Math.ceil(steps - 1e-6) : Math.floor(steps + 1e-6)) / 10 ** decimals;
}

/**
 * An input's value as it stands in its field: one decimal more than a result, where there is one.
 * @param {string} kind
 * @param {number} value
 * @param {Units} units
 */
export function showEntry(kind, value, units) {
  const unit = unitOf(kind, units);
  return formatNumber(unit.show(value), { decimals: unit.decimals + 1, least: 0 });
}
