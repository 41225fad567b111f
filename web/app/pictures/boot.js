/**
 * Board and boot in section, to scale, seen along the board: tilted until the boot's end touches
 * the snow, or, where it never does, to the edge angle that the turn asks for.
 */

import { setAttribute, setAttributes, setShown, setText, svg } from '../dom.js';
import { arc, line, moved, polygon, upward } from './geometry.js';

/** Thickness of the board as it is drawn, m: base to top sheet, common practice. */
const THICK_M = 0.011;
/** Height of a boot's shaft as it is drawn, m. */
const SHAFT_M = 0.2;

export function createBootSection() {
  const part = (name) => svg('path', { class: name });
  const parts = { snow: part('snow'), boot: part('boot'), sole: part('sole'), deck: part('deck'), surface: part('surface'),
    asked: part('asked'), angle: part('angle'), touch: part('touch') };
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
    const scale = Math.min(width / 0.46, (height - em) / 0.36);
    const foot = [width * 0.56, height - em * 1.7];
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
    const heel = [widthM + other.overhang_m, other.height_m];
    const low = Math.min(side.height_m, heel[1]) - 0.016;
    const near = -side.overhang_m;
    setAttribute(parts.sole, 'd', polygon([place(near + 0.03, THICK_M), place(near + 0.03, low), toe, place(near + 0.012, side.height_m + 0.03),
      place(heel[0] - 0.012, heel[1] + 0.03), place(...heel), place(heel[0] - 0.03, low), place(heel[0] - 0.03, THICK_M)]));
    const [shaftFrom, shaftTo] = side.isToe ? [0.55, 0.95] : [0.05, 0.45];
    const on = (share) => near + (heel[0] - near) * share;
    setAttribute(parts.boot, 'd', polygon([place(on(0.04), side.height_m + 0.028), place(on(side.isToe ? 0.3 : 0.02), side.height_m + 0.085), place(on(shaftFrom), SHAFT_M),
      place(on(shaftTo), SHAFT_M), place(on(side.isToe ? 0.98 : 0.7), heel[1] + 0.085), place(on(0.96), heel[1] + 0.028)]));
    const radius = Math.min(widthM * scale * 0.8, width * 0.4);
    setAttribute(parts.angle, 'd', arc(foot, radius, -90, tilt - 90));
    const asked = askedDeg !== null && dragDeg !== null;
    setAttribute(parts.asked, 'd', asked ? line(foot, moved(foot, [upward(Math.min(90, askedDeg) - 90), widthM * scale * 1.12])) : null);
    setAttribute(parts.touch, 'd', dragDeg === null ? null
      : `M${(toe[0] - em * 0.42).toFixed(1)} ${(toe[1] + em * 0.95).toFixed(1)}h${(em * 0.84).toFixed(1)}L${toe[0].toFixed(1)} ${(toe[1] + em * 0.2).toFixed(1)}Z`);
    const at = moved(foot, [upward(tilt / 2 - 90), radius * 0.62]);
    setText(labels.angle, words.angle);
    setAttributes(labels.angle, { x: at[0].toFixed(1), y: (at[1] + em * 0.35).toFixed(1) });
    setShown(labels.asked, asked);
    if (!asked) return;
    setText(labels.asked, words.asked);
    const end = moved(foot, [upward(Math.min(90, askedDeg) - 90), widthM * scale * 1.16]);
    const wide = words.asked.length * em * 0.5;
    setAttributes(labels.asked, { x: Math.max(4, Math.min(width - wide - 4, end[0] - wide / 2)).toFixed(1), y: Math.max(em, end[1] - em * 0.2).toFixed(1) });
  }

  return { node, update };
}
