/**
 * Riders and boards that are kept: saved, edited, copied, deleted; every change can be undone.
 * Until something is changed there are the invented ones alone.
 */

/** @typedef {{id: string, name: string, invented?: boolean, values: any}} Entry */

/** Invented boards; measures as boards have them, stiffnesses about the typical ones. @type {Entry[]} */
export const DEMO_BOARDS = [
  { id: 'demo-1', name: 'All-round 155', invented: true, values: {
    nose_m: 0.297, waist_m: 0.253, tail_m: 0.295, effective_edge_m: 1.17, stiffness_nm2: 170, camber_m: 0.003, stance_width_m: 0.52 } },
  { id: 'demo-2', name: 'Piste 160', invented: true, values: {
    nose_m: 0.292, waist_m: 0.25, tail_m: 0.288, effective_edge_m: 1.22, stiffness_nm2: 200, camber_m: 0.003, stance_width_m: 0.53 } },
  { id: 'demo-3', name: 'Short 142', invented: true, values: {
    nose_m: 0.272, waist_m: 0.233, tail_m: 0.27, effective_edge_m: 1.04, stiffness_nm2: 90, camber_m: 0.003, stance_width_m: 0.48 } },
  { id: 'demo-4', name: 'Wide 158', invented: true, values: {
    nose_m: 0.312, waist_m: 0.268, tail_m: 0.31, effective_edge_m: 1.2, stiffness_nm2: 200, camber_m: 0.005, stance_width_m: 0.54 } },
];

const BOOT = {
  sole_length_m: 0.3, sole_width_m: 0.1, front_angle_deg: 15, rear_angle_deg: -6,
  front_toeward_m: 0, rear_toeward_m: 0, toe_height_m: 0.05, heel_height_m: 0.045,
};
const RIDING = { pitch_low_deg: 10, pitch_high_deg: 20, usual_level: 'snowboarders', usual_speed_mps: null, usual_line_radius_m: 12 };

/** Invented riders; speeds as published for their level, the line of a usual turn assumed. @type {Entry[]} */
export const DEMO_RIDERS = [
  { id: 'demo-a', name: 'Rider A', invented: true, values: {
    shared: { rider_mass_kg: 80, angulation_deg: 5, max_load_g: 2 }, boot: BOOT, riding: RIDING } },
  { id: 'demo-b', name: 'Rider B', invented: true, values: {
    shared: { rider_mass_kg: 58, angulation_deg: 5, max_load_g: 1.7 },
    boot: { ...BOOT, sole_length_m: 0.265, sole_width_m: 0.09, front_angle_deg: 18, rear_angle_deg: 3 },
    riding: { ...RIDING, pitch_low_deg: 8, pitch_high_deg: 15, usual_level: 'beginner', usual_line_radius_m: 10 } } },
  { id: 'demo-c', name: 'Rider C', invented: true, values: {
    shared: { rider_mass_kg: 95, angulation_deg: 8, max_load_g: 2.5 },
    boot: { ...BOOT, sole_length_m: 0.325, sole_width_m: 0.11, front_angle_deg: 24, rear_angle_deg: 9 },
    riding: { ...RIDING, pitch_low_deg: 12, pitch_high_deg: 25, usual_level: 'advanced', usual_line_radius_m: 16 } } },
];

const DEMO = { boards: DEMO_BOARDS, riders: DEMO_RIDERS };

/**
 * What is kept of a kind.
 * @param {import('./store.js').State} state
 * @param {'boards'|'riders'} kind
 * @returns {Entry[]}
 */
export const kept = (state, kind) => state.kit[kind] ?? DEMO[kind];

/** One of them, null where there is none of that id. */
export const find = (state, kind, id) => kept(state, kind).find((entry) => entry.id === id) ?? null;

/** The boards that are compared with the open one. */
export function chosenBoards(state) {
  const { compared = [DEMO_BOARDS[1].id, DEMO_BOARDS[2].id], board_id: open = DEMO_BOARDS[0].id } = state.board;
  return kept(state, 'boards').filter(({ id }) => compared.includes(id) && id !== open);
}

const patch = (kind, entries) => ({ kit: { [kind]: entries } });

let made = 0;
const freshId = () => `${Date.now().toString(36)}-${(made += 1)}`;

/** Patches of the state, for store.set. */
export const kit = {
  /** A new entry. @returns {{patch: object, id: string}} */
  add(state, kind, name, values) {
    const id = freshId();
    return { id, patch: patch(kind, [...kept(state, kind), { id, name, values }]) };
  },
  /** What an entry now holds; an invented one stays as it is. */
  change: (state, kind, id, name, values) =>
    patch(kind, kept(state, kind).map((entry) => (entry.id === id && !entry.invented ? { ...entry, name, values } : entry))),
  /** A copy beside it, under a name of its own. @returns {{patch: object, id: string}} */
  copy(state, kind, id, name) {
    const copied = freshId();
    return { id: copied, patch: patch(kind, kept(state, kind).flatMap((entry) =>
      (entry.id === id ? [entry, { id: copied, name, values: entry.values }] : [entry]))) };
  },
  remove: (state, kind, id) => patch(kind, kept(state, kind).filter((entry) => entry.id !== id)),
};
