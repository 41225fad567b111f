/** What of a turn's answer is on the page: one ride, one place in it, and where its figures come from. */

import { valueAt } from '../figure.js';

/**
 * Stretches of the turn in one state, in order of travel.
 * @param {{phase_deg: number[], state: string[]}} answer
 */
export function statesAlong({ phase_deg, state }) {
  const runs = [];
  phase_deg.forEach((phase, i) => {
    if (runs.at(-1)?.state === state[i]) runs.at(-1).toDeg = phase;
    else runs.push({ fromDeg: phase, toDeg: phase, state: state[i] });
  });
  return runs;
}

/** Whether the drifted line, not the board's own arc, is what the page is about. */
export function driftLeads(answer) {
  return answer.verdict === 'too_fast' && answer.drift !== null;
}

/**
 * @param {any} answer the turn's answer
 * @param {any} wider where the drifted line leads: the answer for the turn on that line, if any
 * @param {number|null} picked index of a phase to look at; null: the tightest point
 */
export function shownTurn(answer, wider, picked) {
  const drifts = driftLeads(answer) && wider !== null;
  const ride = drifts ? wider : answer;
  const tightest = drifts ? 'drift' : 'worst';
  const source = picked === null ? answer : ride;
  const key = (name) => (picked === null ? `${tightest}.${name}` : `${name}.${picked}`);
  const phaseDeg = valueAt(source, key('phase_deg'));
  const index = picked ?? nearestIndex(ride.phase_deg, phaseDeg);
  const failDeg = ride.first_fail_phase_deg;
  return {
    drifts, source, key, index, picked: picked !== null, phaseDeg,
    placeZone: ride.zone[index],
    zone: picked === null && !drifts ? answer.reason.zone : ride.zone[index],
    leanDeg: valueAt(source, key('lean_deg')),
    edgeDeg: valueAt(source, key('edge_angle_deg')),
    margin: valueAt(source, key('grip_margin')),
    limitDeg: valueAt(source, key('limit_lean_deg')),
    tiltDeg: ride.section_tilt_deg[index],
    limit: valueAt(source, key('limit')),
    state: ride.state[index],
    phases: ride.phase_deg,
    states: ride.state,
    path: ride.picture.path_m,
    /** The other line that is worth seeing beside it. */
    other: drifts ? answer.picture.path_m
      : answer.verdict === 'washes_out' ? answer.picture.drift_path_m : null,
    failIndex: failDeg === null ? null : nearestIndex(ride.phase_deg, failDeg),
  };
}

function nearestIndex(phases, phaseDeg) {
  let best = 0;
  phases.forEach((phase, i) => {
    if (Math.abs(phase - phaseDeg) < Math.abs(phases[best] - phaseDeg)) best = i;
  });
  return best;
}
