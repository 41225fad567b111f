/** What of a pitch's answer the drawing shows, with its labels. */

import { WAYS } from '../pictures/profile.js';
import { formatNumber, t } from '../text.js';
import { show, unitOf } from '../units.js';
import { fromTo, pitchText } from './pitch-words.js';

/**
 * @param {any} answer
 * @param {import('../units.js').Units} units
 */
export function shownProfile(answer, units) {
  return {
    profile: answer.profile,
    legs: answer.legs.map(({ start_m, end_m, pitch_deg, length_m }) => {
      const steep = (pitch_deg < 0 ? '↗' : '') + pitchText(pitch_deg, units);
      return { start_m, end_m, short: steep, text: `${steep}  ${show('slope', length_m, units)}` };
    }),
    fall: { at_m: answer.fall.at_m, text: t('pitch.picture.fall') },
    halts: answer.levels.filter(({ stops }) => stops).map(({ stops_at_m }) => stops_at_m),
    asks: !answer.levels.some(({ friction }) => friction === answer.slide.friction),
    speedText(slow, fast, last) {
      if (last) return fromTo('speed', slow, fast, units);
      const [low, high] = [slow, fast].map((speed) => formatNumber(unitOf('speed', units).show(speed)));
      return low === high ? high : `${low}–${high}`;
    },
    rules: [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000, 10000].map((length) => ({
      length_m: unitOf('slope', units).read(length), text: show('slope', unitOf('slope', units).read(length), units),
    })),
  };
}

/** The drawing in words. */
export function profileLabel(answer, units) {
  const last = answer.legs.at(-1);
  return t('pitch.picture.label', {
    length: show('slope', last.end_m, units),
    drop: show('slope', answer.legs.reduce((sum, { drop_m }) => sum + drop_m, 0), units),
    legs: answer.legs.map(({ pitch_deg, length_m }, i) => t(pitch_deg < 0 ? 'pitch.picture.rise' : 'pitch.picture.leg', {
      leg: i + 1, pitch: pitchText(pitch_deg, units), length: show('slope', length_m, units),
    })).join(' '),
    place: show('slope', answer.fall.at_m, units),
    ways: WAYS.map((clothing, i) => t(`pitch.picture.way.${answer.levels[i].stops ? 'stops' : 'runs'}`, {
      clothing: t(`pitch.clothing.${clothing}`), distance: show('slope', answer.levels[i].distance_m, units),
      speed: show('speed', answer.levels[i].end_speed_mps, units),
    })).join(' '),
  });
}
