/** Who falls, in what, in which air, and who brakes: what changes less often than the slope. */

import { createNumber } from '../controls/number.js';
import { el } from '../dom.js';
import { t } from '../text.js';
import { ownNumber } from '../views/pitch-own.js';
import { createSheet } from './sheet.js';

/** Inputs that this view shares with the others. */
const SHARED = [
  { key: 'rider_mass_kg', kind: 'mass' },
  { key: 'angulation_deg', kind: 'angle' },
  { key: 'max_load_g', kind: 'load' },
  { key: 'effective_edge_m', kind: 'edge' },
  { key: 'drag_angle_deg', kind: 'angle', optional: true, start: 60 },
];
const BOARD = [{ key: 'waist_m', kind: 'edge' }];
const SLIDE = [
  { key: 'fall_at_m', kind: 'slope' },
  { key: 'clothing_friction', kind: 'friction', optional: true, usual: true, start: 0.335 },
  { key: 'drag_area_m2', kind: 'dragArea' },
  { key: 'altitude_m', kind: 'altitude' },
  { key: 'air_temperature_c', kind: 'temperature', optional: true, usual: true, start: 0 },
];
const STOP = [
  { key: 'sight_distance_m', kind: 'slope', optional: true, start: 30 },
  { key: 'braking_friction', kind: 'friction', optional: true, usual: true, start: 0.35 },
  { key: 'reaction_time_s', kind: 'reaction', optional: true, usual: true, start: 1 },
];

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createPitchRiderSheet(store) {
  const shared = SHARED.map((given) => createNumber({ ...given, help: true, store, id: `pitch-${given.key}` }));
  const [board, slide, stop] = [BOARD, SLIDE, STOP].map((list) => list.map((given) => ownNumber(store, { ...given, help: true })));
  const all = [...shared, ...board, ...slide, ...stop];
  const keys = [...SHARED, ...BOARD, ...SLIDE, ...STOP].map(({ key }) => key);
  const nodes = (list) => list.map(({ node }) => node);
  const sheet = createSheet('pitch-rider', null,
    el('h3', { text: t('pitch.rider.slide') }), ...nodes(slide),
    el('h3', { text: t('pitch.rider.stop') }), ...nodes(stop),
    el('h3', { text: t('pitch.rider.rider') }), ...nodes(shared), ...nodes(board));
  return {
    ...sheet,
    update(state, errors) {
      for (const number of all) number.update(state, errors);
    },
    /** Whether this sheet has the input of a field. */
    has: (field) => keys.includes(field),
  };
}
