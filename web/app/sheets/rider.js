/** Rider and board: what changes less often than pitch, speed and snow. */

import { createNumber } from '../controls/number.js';
import { createSheet } from './sheet.js';

/** Kind of quantity of each input, and where nudging starts where it may be empty. */
const INPUTS = [
  { key: 'rider_mass_kg', kind: 'mass' },
  { key: 'angulation_deg', kind: 'angle' },
  { key: 'max_load_g', kind: 'load' },
  { key: 'effective_edge_m', kind: 'edge' },
  { key: 'drag_angle_deg', kind: 'angle', optional: true, start: 60 },
];

/**
 * @param {ReturnType<import('../store.js').createStore>} store
 * @param {Node} echo the verdict, beside the sheet's name
 */
export function createRiderSheet(store, echo) {
  const numbers = INPUTS.map((input) => createNumber({ ...input, help: true, store }));
  const sheet = createSheet('rider', echo, ...numbers.map((number) => number.node));
  return {
    ...sheet,
    update(state, errors) {
      for (const number of numbers) number.update(state, errors);
    },
    /** Whether this sheet has the input of a field. */
    has: (field) => INPUTS.some(({ key }) => key === field),
  };
}
