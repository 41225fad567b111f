/**
 * The board from above, to scale, nose on the right, toe edge up: outline, effective edge, and the
 * soles on it; what of a sole stands out over the edge is solid.
 */

import { setAttribute, setAttributes, setShown, setText, svg } from '../dom.js';
import { at, line } from './geometry.js';

/** A closed line that touches the middle of every side: round where the points turn. */
function rounded(points) {
  const middle = (i) => points[i].map((value, k) => (value + points[(i + 1) % points.length][k]) / 2);
  return `M${at(middle(0))}${points.map((_, i) => `Q${at(points[(i + 1) % points.length])} ${at(middle((i + 1) % points.length))}`).join('')}Z`;
}

const ENDS = [['rear', 'toe'], ['rear', 'heel'], ['front', 'toe'], ['front', 'heel']];

export function createBoardPlan() {
  const part = (name) => svg('path', { class: name });
  const parts = { soles: part('sole out'), board: part('deck'), edge: part('edge'), within: part('sole in'), worst: part('worst') };
  const labels = Object.fromEntries(ENDS.map((pair) => [pair.join('.'), svg('text', { class: 'label' })]));
  const nose = svg('text', { class: 'label small' });
  const node = svg('svg', { class: 'plan', role: 'img', focusable: 'false' }, ...Object.values(parts), nose, ...Object.values(labels));

  /**
   * @param {object} shown
   * @param {{outline: {x_m: number[], y_m: number[]}}} shown.picture the engine's
   * @param {any} shown.boot the engine's, or null
   * @param {number} shown.effectiveEdgeM
   * @param {{foot: string, end: string}|null} shown.worst the end that drags first
   * @param {(overhangM: number) => string} shown.write an overhang in words
   * @param {string} shown.noseWord
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ picture, boot, effectiveEdgeM, worst, write, noseWord }, { width, height, em }) {
    const { x_m: xs, y_m: ys } = picture.outline;
    const soles = boot ? [boot.rear.outline, boot.front.outline] : [];
    const tall = Math.max(...ys, ...soles.flatMap(({ y_m }) => y_m.map(Math.abs)));
    const [from, to] = [xs[0], xs.at(-1)];
    const scale = Math.min((width - 16) / (to - from), (height / 2 - 5) / tall);
    const middle = (from + to) / 2;
    const place = (x, y) => [width / 2 + (x - middle) * scale, height / 2 - y * scale];
    const shape = ({ x_m, y_m }) => rounded(x_m.map((x, i) => place(x, y_m[i])));
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    setAttribute(node, 'data-scale', scale.toFixed(2));
    setAttribute(parts.board, 'd', rounded([...xs.map((x, i) => place(x, ys[i])), ...xs.slice(1, -1).map((x, i) => place(x, -ys[i + 1])).reverse()]));
    const end = (x) => {
      const nearest = xs.reduce((best, at, i) => (Math.abs(at - x) < Math.abs(xs[best] - x) ? i : best), 0);
      return [1, -1].map((side) => line(place(x, side * (ys[nearest] - 0.025)), place(x, side * (ys[nearest] + 0.012)))).join('');
    };
    setAttribute(parts.edge, 'd', end(-effectiveEdgeM / 2) + end(effectiveEdgeM / 2));
    const drawn = soles.map(shape).join('');
    setAttribute(parts.soles, 'd', drawn);
    setAttribute(parts.within, 'd', drawn);
    for (const [foot, which] of ENDS) {
      const label = labels[`${foot}.${which}`];
      setShown(label, Boolean(boot));
      setAttribute(label, 'data-answer', boot ? `boot.${foot}.${which}.overhang_m` : null);
      if (!boot) continue;
      const side = which === 'toe' ? 1 : -1;
      // Beside the sole, inside the edge.
      const { x_m, y_m } = boot[foot].outline;
      const near = x_m.filter((_, i) => side * y_m[i] > 0.03);
      const [x, y] = place(Math.max(...near), side * boot[foot].insert_width_m / 2);
      setText(label, write(boot[foot][which].overhang_m));
      setAttributes(label, { x: (x + 5).toFixed(1), y: (side > 0 ? y + em * 1.15 : y - em * 0.5).toFixed(1),
        'data-worst': worst?.foot === foot && worst.end === which });
    }
    setText(nose, noseWord);
    const [x, y] = place(to - 0.02, 0);
    setAttributes(nose, { x: x.toFixed(1), y: (y + em * 0.3).toFixed(1), 'text-anchor': 'end' });
  }

  return { node, update };
}
