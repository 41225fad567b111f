/** A board's answer in words. */

import { hasText, t } from '../text.js';
import { show } from '../units.js';

/** Values that an engine's reason carries: name in the texts, kind of quantity. */
const VALUES = {
  speed_mps: ['speed', 'speed'], limit_mps: ['limit', 'speed'], drag_angle_deg: ['drag', 'angle'],
  needed_edge_angle_deg: ['needed', 'angle'], clear_waist_m: ['waist', 'width'], overhang_m: ['overhang', 'small'],
  spread_m: ['spread', 'length'], least_m: ['least', 'length'], most_m: ['most', 'length'],
  effective_edge_m: ['edge', 'along'], waist_m: ['waist', 'width'],
};

/** Values of a reason as text. */
function written(reason, units) {
  return Object.fromEntries(Object.entries(VALUES).filter(([key]) => key in reason)
    .map(([key, [name, kind]]) => [name, show(kind, key === 'overhang_m' ? Math.abs(reason[key]) : reason[key], units)]));
}

/**
 * The deciding reason of a verdict, or that there is none, in a sentence.
 * @param {any} side a board of the comparison's answer
 * @param {string} rider for whom
 */
export function boardReason(side, units, rider = '') {
  const [first] = side.reasons;
  return first ? t(`board.why.${first.code}`, written(first, units)) : t(side.carve_speed_mps ? 'board.why.suits' : 'board.why.suitsDrifted', { rider }).trim();
}

/** What would clear it, or what has not been looked at. */
export function boardRemedy(side, board, units) {
  const [first] = side.reasons;
  if (first) {
    const key = `board.fix.${first.code}`;
    if (first.code === 'boot_drags' && first.clear_waist_m === null) return '';
    if (first.code === 'too_soft' || first.code === 'too_stiff') return stiffnessToLookFor(side.stiffness_range_nm2, units);
    return hasText(key) ? t(key, written(first, units)) : '';
  }
  const least = leastDragDeg(side);
  if (least !== null && side.needed && least < side.needed.edge_angle_deg) {
    return t('board.close.boot', { drag: show('angle', least, units), needed: show('angle', side.needed.edge_angle_deg, units) });
  }
  const missing = [board.bend === null ? 'bend' : '', board.boot === null ? 'boots' : ''].filter(Boolean);
  return missing.length ? t(`board.unchecked.${missing.join('.')}`) : '';
}

/** The lesser drag angle of toe and heel, null: neither drags, or no boots. */
function leastDragDeg({ drag_angle_deg: angles }) {
  const known = Object.values(angles ?? {}).filter((angle) => angle !== null);
  return known.length ? Math.min(...known) : null;
}

/** All reasons of a board, each a sentence. */
export function allReasons(side, units) {
  if (!side.reasons.length) return [boardReason(side, units)];
  return side.reasons.map((reason) => t(`board.why.${reason.code}`, written(reason, units)));
}

/** Why a stated radius and the widths differ. */
export const statedReason = (reason, units) => t(`board.stated.${reason.code}`, written(reason, units));

/** A range in words: open ends, or none at all. */
export function rangeText(range, kind, units, none = 'range.none') {
  if (!range) return t(none);
  const { min, max } = range;
  if (min === null && max === null) return t('range.any');
  if (min === null) return t('range.upTo', { max: show(kind, max, units) });
  if (max === null) return t('range.from', { min: show(kind, min, units) });
  return t('range.both', { min: show(kind, min, units), max: show(kind, max, units) });
}

export const stiffnessToLookFor = (range, units) =>
  (range ? t('board.fix.stiffness', { range: rangeText(range, 'stiffness', units) }) : t('board.fix.noStiffness'));

/** Which end of which boot drags first, null: none does. */
export function firstToDrag(boot) {
  if (!boot) return null;
  const ends = ['front', 'rear'].flatMap((foot) => ['toe', 'heel'].map((end) => ({ foot, end, deg: boot[foot][end].drag_angle_deg })))
    .filter(({ deg }) => deg !== null);
  return ends.reduce((least, one) => (least === null || one.deg < least.deg ? one : least), null);
}

/** What the turn that the boot must clear is, and what it asks for. */
export function neededText(needed, boards, question, units) {
  if (!needed) return t('board.needed.none');
  return t(`board.needed.${needed.by}`, {
    edge: show('angle', needed.edge_angle_deg, units), radius: show('length', needed.turn_radius_m, units),
    speed: show('speed', question.speed_mps, units), pitch: show('pitch', question.pitch_deg, units),
  });
}

/** The engine's complaint where it is about two fields at once, in words; others as they are. */
export function saidErrors(errors) {
  const texts = [
    [/^below (nose|tail)_m$/, (found) => t(`board.error.waist.${found[1]}`)],
    [/^a sidecut radius from ([\d.]+) to ([\d.]+) m$/, (found) => t('board.error.radius', { low: found[1], high: found[2] })],
    [/^waist_m or more$/, () => t('board.error.narrow')],
    [/^bindings within/, () => t('board.error.stance')],
    [/^from tail to nose/, () => t('board.error.order')],
    [/^pitch_low_deg or more$/, () => t('board.error.pitch')],
    [/take less weight$/, () => t('board.error.sag')],
    [/^a stiffness from ([\d.]+) to ([\d.]+)/, (found) => t('board.error.stiffness', { low: found[1], high: found[2] })],
  ];
  return errors.map((error) => {
    if (/^(null|'') is not a number|is missing/.test(error.problem)) return { ...error, text: t('board.error.missing') };
    for (const [pattern, say] of texts) {
      const found = pattern.exec(error.allowed);
      if (found) return { ...error, text: say(found) };
    }
    return error;
  });
}
