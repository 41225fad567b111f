/** The turn in words. */

import { t } from '../text.js';
import { show } from '../units.js';

/** The verdict's reason, one sentence. */
export function why({ reason: { state, limit, zone } }) {
  return t(limit ? `why.${state}.${limit}` : `why.${state}`,
    { close: t(`close.${zone}`), Zone: t(`Zone.${zone}`) });
}

/** Where the section is drawn. */
export function caption(shown, answer, units) {
  const phase = show('angle', shown.phaseDeg, units);
  if (shown.picked) return t('picture.at', { phase, zone: t(`zone.${shown.zone}`) });
  if (shown.drifts) {
    return t('picture.atDrift', { phase, radius: show('tightest', answer.drift.line_radius_m, units) });
  }
  if (shown.leanDeg === null) return t('picture.at', { phase, zone: t(`zone.${shown.placeZone}`) });
  return t(shown.zone === 'whole' ? 'picture.atWhole' : 'picture.atWorst', { phase, zone: t(`zone.${shown.zone}`) });
}

/** The section picture in words. */
export function sectionLabel(shown, answer, units) {
  const where = caption(shown, answer, units);
  if (shown.leanDeg === null) return t('picture.section.none', { where });
  return t('picture.section.label', {
    where, lean: show('angle', shown.leanDeg, units), edge: show('angle', shown.edgeDeg, units),
    margin: show('share', shown.margin, units, { signed: true }), limit: t(`limit.${shown.limit}`),
  });
}

/** The place in the turn in words, for the slider on the turn from above. */
export function placeText(shown, units) {
  const values = { phase: show('angle', shown.phaseDeg, units), zone: t(`zone.${shown.zone}`),
    state: t(`state.${shown.state}`) };
  if (shown.margin === null) return t('picture.above.valueNone', values);
  return t('picture.above.value', { ...values, margin: show('share', shown.margin, units, { signed: true }) });
}
