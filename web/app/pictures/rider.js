/**
 * The rider, seen along the board from behind, on the toe edge: a silhouette whose balance point
 * lies exactly on the balance axis and whose shins stand square to the board.
 */

import { disc, limb, moved, turned } from './geometry.js';

/**
 * Joints in units of the rider's height: `up` square to the board from its middle, `toe` along it
 * toward the edge in the snow.
 */
const POSE = {
  heel: { up: 0.055, toe: -0.075 },
  toe: { up: 0.05, toe: 0.075 },
  ankle: { up: 0.1, toe: -0.03 },
  knee: { up: 0.285, toe: 0.045 },
  hip: { up: 0.485, toe: 0.012 },
};
const TRUNK = {
  waist: { up: 0.575, toe: 0.012 },
  chest: { up: 0.74, toe: -0.012 },
  neck: { up: 0.835, toe: -0.008 },
  head: { up: 0.918, toe: 0.006 },
  brow: { up: 0.932, toe: 0.066 },
  cheek: { up: 0.902, toe: 0.066 },
  elbow: { up: 0.605, toe: 0.055 },
  hand: { up: 0.49, toe: 0.135 },
  farElbow: { up: 0.65, toe: 0.1 },
  farHand: { up: 0.57, toe: 0.2 },
};
const BALANCE = { up: 0.56, toe: 0 };
/** Width of the board; a little more than true, so that its tilt can be seen. */
const BOARD = 0.23;

/**
 * @param {object} given
 * @param {import('./geometry.js').Point} given.edge where the edge meets the snow
 * @param {import('./geometry.js').Point} given.along unit vector up the balance axis
 * @param {import('./geometry.js').Point} given.square unit vector square to the board, upward
 * @param {number} given.bendDeg turn of the trunk against the legs, clockwise
 * @param {number} given.height rider's height, px
 */
export function riderShape({ edge, along, square, bendDeg, height }) {
  /** From the lifted edge toward the edge in the snow. */
  const toeward = [-square[1], square[0]];
  const middle = moved(edge, [toeward, (-BOARD / 2) * height]);
  const place = ({ up, toe }) => moved(middle, [square, up * height], [toeward, toe * height]);

  const balance = moved(edge, [along, BALANCE.up * height]);
  const natural = place(BALANCE);
  const shift = [balance[0] - natural[0], balance[1] - natural[1]];
  const legs = ({ up, toe }, share) => moved(place({ up, toe }), [shift, share]);
  const trunk = (name) => turned(legs(TRUNK[name], 1), balance, bendDeg);

  const ankle = place(POSE.ankle);
  const heel = place(POSE.heel);
  const knee = legs(POSE.knee, 0.5);
  const hip = legs(POSE.hip, 0.9);
  const chest = trunk('chest');
  const farKnee = moved(knee, [toeward, 0.035 * height], [square, 0.012 * height]);
  const r = (share) => share * height;

  return {
    board: { from: moved(edge, [toeward, -BOARD * height]), to: edge },
    far: limb(chest, r(0.05), trunk('farElbow'), r(0.034)) +
      limb(trunk('farElbow'), r(0.034), trunk('farHand'), r(0.028)) +
      limb(hip, r(0.06), farKnee, r(0.05)) +
      limb(farKnee, r(0.05), moved(ankle, [toeward, r(0.02)]), r(0.04)),
    body: limb(heel, r(0.036), place(POSE.toe), r(0.028)) + limb(ankle, r(0.05), heel, r(0.036)) +
      limb(ankle, r(0.046), knee, r(0.056)) + limb(knee, r(0.056), hip, r(0.075)) +
      limb(hip, r(0.082), trunk('waist'), r(0.078)) +
      limb(trunk('waist'), r(0.078), chest, r(0.095)) +
      limb(chest, r(0.085), trunk('neck'), r(0.045)) + disc(trunk('head'), r(0.07)),
    arm: limb(chest, r(0.052), trunk('elbow'), r(0.038)) +
      limb(trunk('elbow'), r(0.038), trunk('hand'), r(0.03)),
    goggles: limb(trunk('brow'), r(0.018), trunk('cheek'), r(0.014)),
  };
}
