/**
 * The pitch in words. Figures of a band are rounded outward, so that a sentence is never surer than
 * the band that it rests on; the same sense as the engine's own English.
 */

import { formatNumber, t } from '../text.js';
import { show, symbol, unitOf } from '../units.js';

/** A figure of a band, rounded down, in the reader's unit. */
export const down = (kind, value, units, bare = false) => outward(Math.floor, kind, value, units, bare);
/** The same rounded up. */
export const up = (kind, value, units, bare = false) => outward(Math.ceil, kind, value, units, bare);

function outward(round, kind, value, units, bare) {
  const unit = unitOf(kind, units);
  return formatNumber(round(unit.show(value))) + (bare ? '' : symbol(unit));
}

/** From one end of a band to the other; once where both read the same. */
export function fromTo(kind, low, high, units) {
  const from = down(kind, low, units, true);
  const to = up(kind, high, units);
  return from === up(kind, high, units, true) ? to : t('pitch.fromTo', { from, to });
}

/** A pitch to a tenth where it has one. */
export function pitchText(deg, units) {
  const unit = unitOf('pitch', units);
  return formatNumber(unit.show(Math.abs(deg)), { decimals: 1, least: 0 }) + symbol(unit);
}

/** An angle that the edge takes: always degrees. */
const angleText = (deg) => formatNumber(deg, { decimals: 1, least: 0 }) + t('unit.deg');

/**
 * A sentence of the engine in words.
 * @param {{code: string, values: Record<string, any>}} sentence
 * @param {import('../units.js').Units} units
 */
export function sentenceText({ code, values }, units) {
  const kind = code.split('_')[0];
  return { stand, slide, stop }[kind](code, values, units);
}

function stand(code, values, units) {
  if (code === 'stand_level') return t('pitch.stand_level');
  const where = values.weakest_pitch_deg === values.pitch_deg ? t('pitch.stand.there')
    : t('pitch.stand.weakest', { pitch: pitchText(values.weakest_pitch_deg, units) });
  return t('pitch.stand', {
    pitch: pitchText(values.pitch_deg, units), edge: angleText(values.edge_angle_deg), where,
    snow: t(`pitch.snow.${values.snow}`), verdict: t(`pitch.${code}`),
  });
}

function slide(code, values, units) {
  const start = values.speed_mps === 0 ? t('pitch.slide.standing')
    : t('pitch.slide.start', { speed: show('speed', values.speed_mps, units) });
  const { distance_low_m: near, distance_high_m: far } = values;
  const text = t(`pitch.${code}`, {
    start,
    clothing: t('pitch.slide.clothing', {
      low: formatNumber(values.friction_low, { decimals: 2, least: 0 }),
      high: formatNumber(values.friction_high, { decimals: 2, least: 0 }),
    }),
    least: near === null ? '' : down('slope', near, units),
    distance: near === null || far === null ? '' : fromTo('slope', near, far, units),
    most: up('speed', values.end_speed_high_mps, units),
    speed: fromTo('speed', values.end_speed_low_mps, values.end_speed_high_mps, units),
  });
  // Who stays, and who leaves the profile in any case, does not slide back on it.
  const back = values.may_slide_back && ['slide_stops_all', 'slide_stops_some'].includes(code);
  return back ? `${text} ${t('pitch.slide.back')}` : text;
}

function stop(code, values, units) {
  const { distance_low_m: near, distance_high_m: far } = values;
  return t(`pitch.${code}`, {
    speed: show('speed', values.speed_mps, units),
    past: values.past_profile ? t('pitch.stop.past') : '',
    least: near === null ? '' : down('slope', near, units),
    distance: near === null || far === null ? '' : fromTo('slope', near, far, units),
  });
}

/**
 * The headline: its text with `{low}` and `{high}` for figures of the answer, by the whole band.
 * @returns {{text: string, slide: 'all'|'some'|'none'}}
 */
export function headline(answer, units) {
  const { stops, distance_m: distance } = answer.band;
  const slide = answer.sentences[1].code;
  if (slide === 'slide_stays') return { text: t('pitch.headline.stays'), slide: 'all' };
  if (stops !== 'all') return { text: t(`pitch.headline.${stops}`), slide: stops };
  const one = down('slope', distance.low, units) === up('slope', distance.high, units);
  return { text: t(one ? 'pitch.headline.one' : 'pitch.headline.all'), slide: 'all' };
}

/** The reason under the headline, short; the sentences say it in full. */
export function reason(answer, units) {
  const { band } = answer;
  const back = band.may_slide_back && band.stops !== 'none' ? ` ${t('pitch.slide.back')}` : '';
  const fall = t(answer.fall.at_m === 0 ? 'pitch.reason.fallTop' : 'pitch.reason.fall', {
    speed: show('speed', answer.fall.speed_mps, units), place: show('slope', answer.fall.at_m, units),
  });
  if (answer.sentences[1].code === 'slide_stays') return t('pitch.reason.stays');
  return fall + t(`pitch.reason.${band.stops}`, {
    least: band.distance_m.low === null ? '' : down('slope', band.distance_m.low, units),
    most: up('speed', band.end_speed_mps.high, units),
    end: fromTo('speed', band.end_speed_mps.low, band.end_speed_mps.high, units),
    top: fromTo('speed', band.top_speed_mps.low, band.top_speed_mps.high, units),
  }) + back;
}

/** Where the slide in one clothing ends, in a few words. */
export function wayText({ clothing, stops, distance_m, end_speed_mps }, units) {
  return t(stops ? 'pitch.key.stops' : 'pitch.key.runs', {
    clothing: t(`pitch.clothing.${clothing}`), distance: show('slope', distance_m, units), speed: show('speed', end_speed_mps, units),
  });
}
