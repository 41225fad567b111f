/**
 * The hill in section across the turn: seen along the board, from behind, the turn's centre on the
 * right. The rider leans exactly as the engine computed, the board is tilted by the edge angle,
 * the force runs down the balance axis into the snow. The pale sector is what the edge bears; the
 * gap between its border and the force is the grip margin.
 */

import { svg, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { arc, lengthToBorder, line, moved, polygon, sector, upward } from './geometry.js';
import { riderShape } from './rider.js';

export function createSection() {
  const part = (name) => svg('path', { class: name });
  const parts = {
    snow: part('snow'), bears: part('bears'), gap: part('gap'), surface: part('surface'),
    normal: part('normal'), leanArc: part('angle'), edgeArc: part('angle'),
    platform: part('platform'), axis: part('axis'), far: part('rider far'), board: part('board'),
    body: part('rider'), arm: part('rider arm'), goggles: part('goggles'),
    limit: part('limit'), force: part('force'), head: part('force-head'),
  };
  const label = (name) => svg('text', { class: `label ${name}` });
  const labels = {
    lean: label(''), edge: label(''), force: label('accent'), limit: label(''), none: label(''),
  };
  const hatch = svg('pattern', { id: 'hatch', width: 6, height: 6, patternUnits: 'userSpaceOnUse',
    patternTransform: 'rotate(45)' }, svg('rect', { width: 2.5, height: 6, class: 'hatch' }));
  const node = svg('svg', { class: 'section', role: 'img', focusable: 'false' },
    svg('defs', {}, hatch), parts.snow, parts.bears, parts.gap, parts.surface, parts.normal, parts.leanArc,
    parts.edgeArc, parts.platform, parts.axis,
    svg('g', { class: 'figure' }, parts.far, parts.board, parts.body, parts.arm, parts.goggles),
    parts.limit, parts.force, parts.head, ...Object.values(labels));

  /**
   * @param {object} shown angles in degrees; `leanDeg` null where there is no balance
   * @param {number} shown.tiltDeg how the snow rises to the right: gravity is straight down
   * @param {number|null} shown.leanDeg
   * @param {number|null} shown.edgeDeg
   * @param {number|null} shown.limitDeg lean at which the edge would give
   * @param {number|null} shown.margin
   * @param {{lean: string, edge: string, force: string, limit: string, none: string}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ tiltDeg, leanDeg, edgeDeg, limitDeg, margin, words }, { width, height, em }) {
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const box = { left: 4, top: 4, right: width - 4, bottom: height - 4 };
    const foot = [width * 0.45, height * 0.55];
    const tall = Math.min(height * 0.51, width * 0.52);
    /** An angle from the snow's perpendicular toward the centre as one from straight up. */
    const onPage = (deg) => deg - tiltDeg;
    const balanced = leanDeg !== null;
    // Without balance a pale rider stands upright on a flat board.
    const lean = leanDeg ?? tiltDeg;
    const edge = edgeDeg ?? 0;

    /**
     * Writes `text` so that it ends (`side` -1) or starts (1) at a point, kept inside the picture.
     * Gives where it ends.
     */
    const put = (one, text, [x, y], side, notBefore = -Infinity) => {
      const wide = text.length * em * 0.52;
      const from = Math.max(side < 0 ? x - wide : x, notBefore);
      const inside = Math.max(box.left, Math.min(box.right - wide, from));
      setText(one, text);
      setAttributes(one, { x: inside.toFixed(1),
        y: Math.max(box.top + em * 0.8, Math.min(box.bottom - 2, y + em * 0.35)).toFixed(1) });
      return inside + wide;
    };
    drawSnow(foot, upward(90 - tiltDeg), width + height);
    const axis = upward(onPage(lean));
    const square = upward(onPage(edge));
    drawRider(riderShape({ edge: foot, along: axis, square, bendDeg: lean - edge, height: tall }));
    setAttribute(node, 'data-balanced', String(balanced));
    for (const name of ['normal', 'axis', 'platform', 'leanArc', 'edgeArc', 'bears', 'gap', 'limit',
      'force', 'head']) if (!balanced) setAttribute(parts[name], 'd', null);
    for (const [name, one] of Object.entries(labels)) setShown(one, balanced === (name !== 'none'));
    if (!balanced) {
      put(labels.none, words.none, moved(foot, [[0, -1], tall * 0.6], [[-1, 0], tall * 0.2]), -1);
      return;
    }

    const ray = (unit, long) => line(foot, moved(foot, [unit, Math.min(long, lengthToBorder(foot, unit, box))]));
    const perpendicular = upward(onPage(0));
    const boardward = upward(onPage(edge - 90));
    const leanRadius = tall * 0.84;
    const edgeRadius = tall * 0.4;
    setAttribute(parts.normal, 'd', ray(perpendicular, tall * 1.02));
    setAttribute(parts.axis, 'd', ray(axis, tall * 1.12));
    setAttribute(parts.platform, 'd', ray(boardward, tall * 0.6));
    setAttribute(parts.leanArc, 'd', arc(foot, leanRadius, onPage(0), onPage(lean)));
    setAttribute(parts.edgeArc, 'd', arc(foot, edgeRadius, onPage(-90), onPage(edge - 90)));

    const force = upward(onPage(lean) + 180);
    const limit = upward(onPage(limitDeg) + 180);
    const reach = Math.min(tall, lengthToBorder(foot, force, box), lengthToBorder(foot, limit, box) - 6);
    const tip = moved(foot, [force, reach]);
    const neck = moved(foot, [force, reach - 12]);
    const aside = [force[1], -force[0]];
    setAttribute(parts.bears, 'd', sector(foot, reach, 180 + onPage(0), 180 + onPage(limitDeg)));
    setAttribute(parts.gap, 'd', sector(foot, reach, 180 + onPage(limitDeg), 180 + onPage(lean)));
    setAttribute(parts.gap, 'data-lacks', String(margin < 0));
    setAttribute(parts.limit, 'd', line(foot, moved(foot, [limit, reach + 6])));
    setAttribute(parts.force, 'd', line(foot, neck));
    setAttribute(parts.head, 'd', polygon([tip, moved(neck, [aside, 5.5]), moved(neck, [aside, -5.5])]));

    put(labels.lean, words.lean, moved(foot, [perpendicular, leanRadius], [[-1, 0], em * 0.5]), -1);
    put(labels.edge, words.edge, moved(foot, [upward(onPage(edge / 2 - 90)), edgeRadius + em * 0.4]), -1);
    // The line that lies further out is named on its outer side, the other one inside.
    const names = [[labels.limit, words.limit, limit], [labels.force, words.force, force]];
    if (margin < 0) names.reverse();
    const [[outer, outerText, outerRay], [inner, innerText, innerRay]] = names;
    const end = put(outer, outerText, moved(foot, [outerRay, reach * 0.8], [[-1, 0], em * 0.7]), -1);
    put(inner, innerText, moved(foot, [innerRay, reach * 0.8], [[1, 0], em * 0.8]), 1, end + em * 0.4);
  }

  function drawSnow(foot, toward, wide) {
    const left = moved(foot, [toward, -wide]);
    const right = moved(foot, [toward, wide]);
    setAttribute(parts.surface, 'd', line(left, right));
    setAttribute(parts.snow, 'd',
      polygon([left, right, moved(right, [[0, 1], wide]), moved(left, [[0, 1], wide])]));
  }

  function drawRider(shape) {
    for (const name of ['far', 'body', 'arm', 'goggles']) setAttribute(parts[name], 'd', shape[name]);
    setAttribute(parts.board, 'd', line(shape.board.from, shape.board.to));
  }

  return { node, update };
}
