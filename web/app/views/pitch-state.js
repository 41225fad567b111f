/** What the Pitch view holds, and the question that it asks. */

/** Ways to give how steep a leg is: the question's key, and the kind of quantity. */
export const GIVEN = { pitch_deg: 'pitch', percent: 'percent', drop_m: 'slope' };

/** Most legs of a profile. */
export const MOST_LEGS = 10;

/** Inputs of the slide and the stop that this view holds; null: the engine's usual value. */
export const OWN = ['speed_mps', 'fall_at_m', 'clothing_friction', 'drag_area_m2', 'altitude_m',
  'air_temperature_c', 'braking_friction', 'reaction_time_s', 'sight_distance_m', 'waist_m'];

/** Inputs that the views share. */
export const SHARED = ['snow', 'rider_mass_kg', 'angulation_deg', 'max_load_g', 'effective_edge_m', 'drag_angle_deg'];

/**
 * @typedef {object} PitchLeg
 * @property {keyof typeof GIVEN} by how its steepness is given
 * @property {number|string} value that figure; a text that is no number as it was typed
 * @property {number|string} length_m
 * @property {string|null} snow null: the snow of the whole profile
 */

/** A first visit: a slope that nobody has skied. */
export const START = {
  demo: true,
  name: '',
  legs: [
    { by: 'pitch_deg', value: 32, length_m: 60, snow: null },
    { by: 'pitch_deg', value: 20, length_m: 80, snow: null },
    { by: 'pitch_deg', value: 6, length_m: 100, snow: null },
  ],
  /** Index of the leg whose numbers are on the page. */
  selected: 0,
  speed_mps: 33 / 3.6,
  fall_at_m: 0,
  clothing_friction: null,
  drag_area_m2: 0.5,
  altitude_m: 1500,
  air_temperature_c: null,
  braking_friction: null,
  reaction_time_s: null,
  sight_distance_m: null,
  waist_m: 0.25,
  /** Key of a text to show once, null: none. */
  notice: null,
};

export const EMPTY_LEG = { by: 'pitch_deg', value: '', length_m: '', snow: null };

/** The view's part of the state, whole. */
export function pitchOf(state) {
  const pitch = { ...START, ...state.pitch };
  // What was kept long ago, or damaged, must not keep the view from opening.
  return Array.isArray(pitch.legs) && pitch.legs.length ? pitch : { ...START };
}

/** The leg whose numbers are on the page, and its index. */
export function selectedLeg(pitch) {
  const index = Math.min(pitch.selected, pitch.legs.length - 1);
  return { index, leg: pitch.legs[index] };
}

/** The patch that changes one leg; a change makes the demo the reader's own. */
export function legPatch(pitch, index, change) {
  return { pitch: { legs: pitch.legs.map((leg, i) => (i === index ? { ...leg, ...change } : leg)), demo: false, notice: null } };
}

/** Index of the first leg that lacks an entry, −1: none does. */
export function unfinishedLeg(pitch) {
  return pitch.legs.findIndex((leg) => leg.value === '' || leg.length_m === '');
}

/** The question for the engine. */
export function pitchQuestion(state) {
  const pitch = pitchOf(state);
  const own = Object.fromEntries(OWN.map((key) => [key, pitch[key]]));
  const shared = Object.fromEntries(SHARED.map((key) => [key, state.inputs[key]]));
  return {
    ask: 'pitch',
    legs: pitch.legs.map(({ by, value, length_m, snow }) => ({ [by]: value, length_m, snow })),
    ...shared,
    ...own,
  };
}
