/** What the Board view holds, and the questions that it asks. */

import { chosenBoards, DEMO_BOARDS, DEMO_RIDERS, find } from '../kit.js';

/** What a board is measured by: key of the question, kind of quantity. */
export const BOARD_KINDS = {
  nose_m: 'width', waist_m: 'width', tail_m: 'width', effective_edge_m: 'along',
  stated_radius_m: 'length', stiffness_nm2: 'stiffness', camber_m: 'small', stance_width_m: 'along',
  setback_m: 'small', front_insert_width_m: 'width', rear_insert_width_m: 'width',
};
/** The same of a boot in its binding. */
export const BOOT_KINDS = {
  sole_length_m: 'width', sole_width_m: 'width', front_angle_deg: 'angle', rear_angle_deg: 'angle',
  front_toeward_m: 'small', rear_toeward_m: 'small', toe_height_m: 'small', heel_height_m: 'small',
};
/** How the rider rides: read by every board alike. */
export const RIDING_KINDS = {
  pitch_low_deg: 'pitch', pitch_high_deg: 'pitch', usual_speed_mps: 'speed', usual_line_radius_m: 'length',
};
/** What of the rider the views share. */
export const SHARED_KEYS = ['rider_mass_kg', 'angulation_deg', 'max_load_g'];

/** Most widths along the edge that the page takes. */
export const MOST_WIDTHS = 7;
/** Most boards beside the one that is open. */
export const MOST_OTHERS = 3;
/** Edge angle at which the board is bent, degrees: the one at which the engine compares boards. */
export const BENT_AT_DEG = 45;

/**
 * A first visit: an invented board under an invented rider. `board` has the question's keys and
 * `widths`, a list or null; `boot` those of the boot, its sole's length null without boots.
 */
export const START = {
  board: DEMO_BOARDS[0].values,
  board_id: DEMO_BOARDS[0].id,
  name: '',
  boot: DEMO_RIDERS[0].values.boot,
  riding: DEMO_RIDERS[0].values.riding,
  rider_id: DEMO_RIDERS[0].id,
  rider_name: '',
  compared: [DEMO_BOARDS[1].id, DEMO_BOARDS[2].id],
  home: { supports_m: 1, load_kg: 20, sag_m: null },
};

/** The view's part of the state, whole. */
export function boardOf(state) {
  return { ...START, ...state.board };
}

/**
 * How a number is bound to a part of it, for controls/number.js.
 * @param {'board'|'boot'|'riding'|'home'} part
 * @param {string} key
 */
export function bound(part, key) {
  let whole = START;
  return {
    read: (state) => {
      whole = boardOf(state);
      return whole[part][key] ?? null;
    },
    write: (value) => ({ board: { [part]: { ...whole[part], [key]: value } } }),
    path: () => (part === 'boot' ? `boot.${key}` : key),
  };
}

/** The same for a number of the widths along the edge. */
export function boundWidth(index, key) {
  let board = START.board;
  return {
    read: (state) => {
      ({ board } = boardOf(state));
      return board.widths?.[index]?.[key] ?? null;
    },
    write: (value) => ({
      board: { board: { ...board, widths: board.widths.map((row, i) => (i === index ? { ...row, [key]: value } : row)) } },
    }),
    path: () => `widths[${index}].${key}`,
  };
}

/** The fields of a question that are set; the others are left to the engine. */
function given(part, keys) {
  return Object.fromEntries(keys.filter((key) => part[key] !== null && part[key] !== undefined).map((key) => [key, part[key]]));
}

/** A board as a question holds it. What must be there is there, if only as what is missing. */
export function boardFields(board) {
  const { nose_m = null, waist_m = null, tail_m = null, effective_edge_m = null } = board;
  return { ...given(board, [...Object.keys(BOARD_KINDS), 'widths']), nose_m, waist_m, tail_m, effective_edge_m };
}

function riderFields(state) {
  const { boot } = boardOf(state);
  const worn = boot.sole_length_m !== null && boot.sole_length_m !== undefined;
  return {
    ...Object.fromEntries([...SHARED_KEYS, 'snow'].map((key) => [key, state.inputs[key]])),
    boot: worn ? given(boot, Object.keys(BOOT_KINDS)) : null,
  };
}

/**
 * Boards side by side, the open one first. The engine compares two at least: where there is no
 * other, the open one stands beside itself.
 * @param {any} state
 * @param {boolean} all every board that is compared; else as few as there can be
 */
export function boardsQuestion(state, all) {
  const { board, riding } = boardOf(state);
  const others = chosenBoards(state).map(({ values }) => values);
  const boards = [board, ...(all && others.length ? others : [board])];
  return {
    ask: 'boards', boards: boards.map(boardFields), ...riderFields(state),
    ...given(riding, [...Object.keys(RIDING_KINDS), 'usual_level']),
  };
}

/**
 * One board in full, on the middle of the rider's pitches.
 * @param {any} state
 * @param {number|null} speedMps the rider's usual speed, from the engine
 * @param {any} [board] another one than the open one
 */
export function boardQuestion(state, speedMps, board = boardOf(state).board) {
  const { riding } = boardOf(state);
  const pitches = [riding.pitch_low_deg, riding.pitch_high_deg];
  return {
    ask: 'board', ...boardFields(board), ...riderFields(state), edge_angle_deg: BENT_AT_DEG,
    pitch_deg: pitches.every((pitch) => typeof pitch === 'number') ? (pitches[0] + pitches[1]) / 2 : pitches[0],
    speed_mps: speedMps, line_radius_m: riding.usual_line_radius_m ?? null,
  };
}

/** The saved board that is open, or null: it has been deleted. */
export const openBoard = (state) => find(state, 'boards', boardOf(state).board_id);
