/** The few large figures beside the headline. */

import { el, setAttribute, setText } from '../dom.js';
import { formatNumber, t } from '../text.js';
import { show, unitOf } from '../units.js';
import { down, up } from './pitch-words.js';

/** A margin at one end of its band, in percent, `round`ed outward. */
export function marginText(value, round) {
  if (value === null) return '–';
  const unit = unitOf('share', {});
  return formatNumber(round(unit.show(value)), { signed: true });
}

export function createPitchFigures() {
  const piece = () => el('span');
  const edge = piece();
  const margin = [piece(), piece(), piece()];
  const stop = [piece(), piece(), piece()];
  const entry = (label, nodes) => el('div', {}, el('dt', { text: t(`pitch.figure.${label}`) }), el('dd', {}, ...nodes));
  const node = el('dl', { class: 'figures' }, entry('edge', [edge]), entry('margin', margin), entry('stop', stop));

  return {
    node,
    /** @param {any} answer null: none yet */
    update(answer, units) {
      if (!answer) {
        for (const one of [edge, ...margin, ...stop]) put(one, '');
        for (const one of [edge, margin[0], stop[0]]) put(one, '–');
        return;
      }
      put(edge, show('angle', answer.stand_edge_angle_deg, units), 'stand_edge_angle_deg');
      const at = `legs.${answer.weakest_leg}.standing.grip_margin`;
      putMargin(margin, answer.legs[answer.weakest_leg].standing.grip_margin, at);
      putStop(stop, answer.stopping, answer.fall.speed_mps, units);
    },
  };
}

export function putMargin([from, between, to], { low, high }, key) {
  const [least, most] = [marginText(low, Math.floor), marginText(high, Math.ceil)];
  const one = low === high || least === most;
  const sign = low === null ? '' : `\u202f${t('unit.percent')}`;
  put(from, one ? marginText(low, Math.round) + sign : least, `${key}.low`);
  put(between, one ? '' : ` ${t('figure.window.to')} `);
  put(to, one ? '' : most + sign, one ? null : `${key}.high`);
}

export function putStop([from, between, to], { band_m: band }, speed, units) {
  if (speed === 0) {
    put(from, t('pitch.figure.none'), null);
    put(between, '');
    put(to, '');
  } else if (band.low === null) {
    put(from, t('pitch.figure.never'), 'stopping.band_m.low');
    put(between, '');
    put(to, '');
  } else {
    put(from, down('slope', band.low, units, band.high !== null), 'stopping.band_m.low');
    put(between, band.high === null ? ' ' : '–');
    put(to, band.high === null ? t('pitch.figure.unsure') : up('slope', band.high, units), 'stopping.band_m.high');
    setAttribute(to, 'class', band.high === null ? 'lesser' : null);
  }
}

export function put(node, text, key = null) {
  setText(node, text);
  setAttribute(node, 'data-answer', key);
  setAttribute(node, 'class', null);
}
