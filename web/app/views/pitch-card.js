/** What stands on the card, as plain text: the sheet shows it, the image draws it. */

import { formatNumber, locale, t } from '../text.js';
import { show } from '../units.js';
import { marginText } from './pitch-figures.js';
import { headlinePieces } from './pitch-headline.js';
import { down, fromTo, pitchText, reason, sentenceText, wayText } from './pitch-words.js';
import { pitchOf } from './pitch-state.js';

/**
 * @param {any} state
 * @returns {{name: string, demo: boolean, headline: string, reason: string, sentences: string[],
 *   ways: string, numbers: [string, string][], inputs: string, cautions: string[], steep: boolean, sources: string[],
 *   date: string}}
 */
export function cardContent(state) {
  const { question, answer } = state.answers.pitch;
  const { units } = state;
  const pitch = pitchOf(state);
  return {
    name: pitch.name || t('card.title'),
    demo: pitch.demo,
    headline: headlinePieces(answer, units).map(({ text }) => text).join(''),
    reason: reason(answer, units),
    sentences: answer.sentences.map((sentence) => sentenceText(sentence, units)),
    ways: `${t('card.key')} ${answer.levels.map((level) => wayText(level, units)).join('; ')}.`,
    numbers: numbers(answer, units),
    inputs: inputs(question, answer, units),
    cautions: [t('caution.1'), ...(answer.cautions.includes('avalanche') ? [t('caution.2')] : [])],
    steep: answer.cautions.includes('avalanche'),
    sources: ['clothing', 'snow', 'air', 'assumed'].map((key) => t(`card.source.${key}`)),
    date: t('card.date', { date: new Intl.DateTimeFormat(locale, { dateStyle: 'long' }).format(new Date()) }),
  };
}

function numbers(answer, units) {
  const { standing } = answer.legs[answer.weakest_leg];
  const { band, stopping, fall } = answer;
  const margins = [[standing.grip_margin.low, Math.floor], [standing.grip_margin.high, Math.ceil]].map((pair) => marginText(...pair));
  const washes = standing.washes_out_above_deg;
  const [near, far] = [band.distance_m.low, band.distance_m.high];
  const rows = [
    ['card.edge', show('angle', answer.stand_edge_angle_deg, units)],
    ['card.margin', standing.grip_margin.low === null ? '–'
      : `${margins[0] === margins[1] ? margins[0] : t('pitch.fromTo', { from: margins[0], to: margins[1] })}\u202f${t('unit.percent')}`],
    ['card.washes', washes.low === null ? t('pitch.figures.washesNever') : washes.high === null
      ? t('pitch.figures.washesFrom', { pitch: down('pitch', washes.low, units) })
      : fromTo('pitch', washes.low, washes.high, units)],
    ['card.slide', t(`card.slide.${band.stops}`, {
      distance: near === null || far === null ? '' : fromTo('slope', near, far, units),
      least: near === null ? '' : down('slope', near, units),
    })],
    ['card.end', fromTo('speed', band.end_speed_mps.low, band.end_speed_mps.high, units)],
    ['card.top', fromTo('speed', band.top_speed_mps.low, band.top_speed_mps.high, units)],
    ['card.cannot', t('card.cannot.value', { pitch: fromTo('pitch', stopping.cannot_stop_above_deg.low, stopping.cannot_stop_above_deg.high, units) })],
  ].map(([key, value]) => [t(key), value]);
  if (fall.speed_mps > 0) {
    const { low, high } = stopping.band_m;
    rows.splice(6, 0, [t('card.brake', { speed: show('speed', fall.speed_mps, units) }),
      low === null ? t('pitch.figure.never') : high === null ? t('card.brake.unsure', { least: down('slope', low, units) })
        : fromTo('slope', low, high, units)]);
  }
  if (stopping.sight) {
    const { low, high } = stopping.sight.speed_mps;
    const text = high === null ? t('pitch.figures.noSpeed') : t('pitch.fromTo', {
      from: low === null ? t('pitch.figures.noSpeed') : down('speed', low, units, true), to: down('speed', high, units) });
    rows.push([t('card.sight', { distance: show('slope', stopping.sight.distance_m, units) }), text]);
  }
  return rows;
}

function inputs(question, answer, units) {
  const { stopping, band } = answer;
  const two = (value) => formatNumber(value, { decimals: 2, least: 0 });
  return [
    ...answer.legs.map(({ pitch_deg, length_m, snow }) => t(pitch_deg < 0 ? 'card.input.rise' : 'card.input.leg', {
      pitch: pitchText(pitch_deg, units), length: show('slope', length_m, units), snow: t(`snow.${snow}.short`),
    })),
    t('card.input.fall', { speed: show('speed', answer.fall.speed_mps, units), place: show('slope', answer.fall.at_m, units) }),
    t('card.input.mass', { mass: show('mass', question.rider_mass_kg, units) }),
    t('card.input.edge', { edge: show('edge', question.effective_edge_m, units), angulation: show('angle', question.angulation_deg, units) }),
    t('card.input.clothing', { low: two(band.friction.low), high: two(band.friction.high) }),
    t('card.input.air', { altitude: show('altitude', question.altitude_m, units) }),
    t('card.input.brake', {
      gripLow: two(stopping.braking_friction.low), gripHigh: two(stopping.braking_friction.high),
      timeLow: two(stopping.reaction_time_s.low), timeHigh: show('reaction', stopping.reaction_time_s.high, units),
    }),
  ].join('; ') + '.';
}
