/**
 * Board and boot in section, to scale, seen along the board: tilted until the boot's end touches
 * the snow, or, where it never does, to the edge angle that the turn asks for.
 */

import { setAttribute, setAttributes, setShown, setText, svg } from '../dom.js';
import { arc, at, line, moved, polygon, upward } from './geometry.js';

/** Thickness of the board as it is drawn, m: base to top sheet, common practice. */
const THICK_M = 0.011;
/** Height of a boot's shaft as it is drawn, m. */
const SHAFT_M = 0.26;

export function createBootSection() {
  const part = (name) => svg('path', { class: name });
  const parts = { snow: part('snow'), boot: part('boot'), binding: part('binding'), deck: part('deck'), surface: part('surface'),
    rim: part('asked-rim'), asked: part('asked'), angle: part('angle'), touch: part('touch') };
  const labels = { angle: svg('text', { class: 'label', 'text-anchor': 'middle' }), asked: svg('text', { class: 'label small' }) };
  const node = svg('svg', { class: 'boot-section', role: 'img', focusable: 'false' }, ...Object.values(parts), ...Object.values(labels));

  /**
   * @param {object} shown
   * @param {any} shown.side the boot over the edge that is in the snow: its `overhang_m`, `height_m`
   * @param {any} shown.other the same of its other end
   * @param {number} shown.widthM of the board there
   * @param {number|null} shown.dragDeg edge angle at which it touches, null: never
   * @param {number|null} shown.askedDeg edge angle that the turn asks for
   * @param {{angle: string, asked: string}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ side, other, widthM, dragDeg, askedDeg, words }, { width, height, em }) {
    const tilt = dragDeg ?? Math.min(85, askedDeg ?? 60);
    const scale = Math.min(width / 0.5, (height - em * 2) / 0.3);
    const foot = [width * 0.54, height - em * 1.7];
    // From the edge: along the base away from the snow, and square to it.
    const along = upward(tilt - 90);
    const square = upward(tilt);
    const place = (across, up) => moved(foot, [along, across * scale], [square, up * scale]);
    const toe = place(-side.overhang_m, side.height_m);
    const level = dragDeg === null ? foot[1] : toe[1];
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    setAttribute(parts.snow, 'd', `M0 ${level.toFixed(1)}H${width}V${height}H0Z`);
    setAttribute(parts.surface, 'd', `M0 ${level.toFixed(1)}H${width}`);
    setAttribute(parts.deck, 'd', polygon([place(0, 0), place(widthM, 0), place(widthM, THICK_M), place(0, THICK_M)]));
    // The boot from its end in the snow, `s` along the sole and `up` square to the base.
    const near = -side.overhang_m;
    const long = widthM + other.overhang_m - near;
    const toeward = (s) => (side.isToe ? s : 1 - s);
    const on = (s, up) => at(place(near + long * toeward(s), up));
    const heights = side.isToe ? [side.height_m, other.height_m] : [other.height_m, side.height_m];
    const flat = Math.min(...heights) - 0.006;
    setAttribute(parts.binding, 'd', `M${on(0.24, THICK_M)}L${on(0.24, flat)}L${on(0.86, flat)}L${on(0.86, THICK_M)}Z`);
    setAttribute(parts.boot, 'd', `M${on(0, heights[0])}L${on(0.16, flat)}L${on(0.86, flat)}L${on(1, heights[1])}`
      + `C${on(1.04, 0.1)} ${on(0.92, 0.14)} ${on(0.94, 0.19)}L${on(0.98, SHAFT_M)}L${on(0.52, SHAFT_M)}L${on(0.5, 0.19)}`
      + `C${on(0.47, 0.14)} ${on(0.3, 0.125)} ${on(0.14, 0.115)}C${on(0, 0.105)} ${on(-0.03, 0.08)} ${on(0, heights[0])}Z`);
    const radius = Math.min(widthM * scale * 0.8, width * 0.4);
    setAttribute(parts.angle, 'd', arc(foot, radius, -90, tilt - 90));
    const asked = askedDeg !== null && dragDeg !== null;
    // What the turn asks for, as a ray and, in the snow, its name.
    const key = [6, height - em * 0.75];
    const ray = asked ? line(foot, moved(foot, [upward(Math.min(90, askedDeg) - 90), widthM * scale * 1.12])) : '';
    setAttribute(parts.rim, 'd', ray);
    setAttribute(parts.asked, 'd', asked ? ray + line(key, moved(key, [[1, 0], em * 1.5])) : '');
    setAttribute(parts.touch, 'd', dragDeg === null ? null
      : `M${(toe[0] - em * 0.42).toFixed(1)} ${(toe[1] + em * 0.95).toFixed(1)}h${(em * 0.84).toFixed(1)}L${toe[0].toFixed(1)} ${(toe[1] + em * 0.2).toFixed(1)}Z`);
    const named = moved(foot, [upward(tilt / 2 - 90), radius * 0.62]);
    setText(labels.angle, words.angle);
    setAttributes(labels.angle, { x: named[0].toFixed(1), y: (named[1] + em * 0.35).toFixed(1) });
    setShown(labels.asked, asked);
    if (!asked) return;
    setText(labels.asked, words.asked);
    setAttributes(labels.asked, { x: (key[0] + em * 1.9).toFixed(1), y: (key[1] + em * 0.35).toFixed(1) });
  }

  return { node, update };
}
