/** Points, angles and paths on the screen: x to the right, y down, angles in degrees. */

const RADIANS = Math.PI / 180;

/** @typedef {[number, number]} Point */

/** Unit vector at this angle from straight up, positive to the right. @returns {Point} */
export function upward(angleDeg) {
  return [Math.sin(angleDeg * RADIANS), -Math.cos(angleDeg * RADIANS)];
}

/** `from` moved by each `[vector, length]` in turn. @returns {Point} */
export function moved(from, ...steps) {
  return steps.reduce(([x, y], [[dx, dy], length]) => [x + dx * length, y + dy * length], from);
}

/** `point` turned about `pivot`, clockwise on the screen. @returns {Point} */
export function turned([x, y], [px, py], angleDeg) {
  const c = Math.cos(angleDeg * RADIANS);
  const s = Math.sin(angleDeg * RADIANS);
  return [px + (x - px) * c - (y - py) * s, py + (x - px) * s + (y - py) * c];
}

/** Coordinates as path text, to a tenth of a pixel. */
export const at = ([x, y]) => `${x.toFixed(1)} ${y.toFixed(1)}`;

export const line = (from, to) => `M${at(from)}L${at(to)}`;

export const polygon = (points) => `M${points.map(at).join('L')}Z`;

/** Arc about `centre` between two angles from straight up. */
export function arc(centre, radius, fromDeg, toDeg) {
  return `M${at(moved(centre, [upward(fromDeg), radius]))}${arcTo(centre, radius, fromDeg, toDeg)}`;
}

function arcTo(centre, radius, fromDeg, toDeg) {
  const large = Math.abs(toDeg - fromDeg) > 180 ? 1 : 0;
  const clockwise = toDeg > fromDeg ? 1 : 0;
  const end = at(moved(centre, [upward(toDeg), radius]));
  return `A${radius.toFixed(1)} ${radius.toFixed(1)} 0 ${large} ${clockwise} ${end}`;
}

/** Sector about `centre` between two angles from straight up. */
export function sector(centre, radius, fromDeg, toDeg) {
  const start = at(moved(centre, [upward(fromDeg), radius]));
  return `M${at(centre)}L${start}${arcTo(centre, radius, fromDeg, toDeg)}Z`;
}

/** A limb: the hull of two circles. */
export function limb(a, radiusA, b, radiusB) {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const long = Math.hypot(dx, dy);
  if (long <= Math.abs(radiusA - radiusB)) return disc(radiusA > radiusB ? a : b, Math.max(radiusA, radiusB));
  const along = Math.atan2(dy, dx);
  const open = Math.acos((radiusA - radiusB) / long);
  const edge = (centre, radius, angle) =>
    at([centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)]);
  const round = (radius, large, to) => `A${radius.toFixed(1)} ${radius.toFixed(1)} 0 ${large} 1 ${to}`;
  return `M${edge(a, radiusA, along + open)}` +
    round(radiusA, radiusA > radiusB ? 1 : 0, edge(a, radiusA, along - open)) +
    `L${edge(b, radiusB, along - open)}` +
    round(radiusB, radiusB > radiusA ? 1 : 0, edge(b, radiusB, along + open)) + 'Z';
}

export function disc([x, y], radius) {
  const r = radius.toFixed(1);
  return `M${at([x - radius, y])}a${r} ${r} 0 1 1 ${(2 * radius).toFixed(1)} 0` +
    `a${r} ${r} 0 1 1 ${(-2 * radius).toFixed(1)} 0Z`;
}

/** Where a ray from `from` meets the border of a box, as a length along it. */
export function lengthToBorder([x, y], [dx, dy], { left, top, right, bottom }) {
  const lengths = [];
  if (dx > 0) lengths.push((right - x) / dx);
  if (dx < 0) lengths.push((left - x) / dx);
  if (dy > 0) lengths.push((bottom - y) / dy);
  if (dy < 0) lengths.push((top - y) / dy);
  return Math.min(...lengths);
}
