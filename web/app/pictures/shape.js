/** The shape of a turn from above, small: how far across the hill it starts and ends. */

import { svg, setAttribute } from '../dom.js';
import { at, line, polygon } from './geometry.js';

export function createShape() {
  const part = (name) => svg('path', { class: name });
  const parts = { across: part('across'), fall: part('fall-line'), head: part('fall-head'), path: part('turn-path') };
  const node = svg('svg', { class: 'shape', role: 'img', focusable: 'false', viewBox: '0 0 120 120' }, ...Object.values(parts));
  return {
    node,
    /** @param {{x_m: number[], y_m: number[]}} path the turn, y down the fall line */
    update({ x_m: xs, y_m: ys }) {
      const [x0, x1, y0, y1] = [Math.min(...xs), Math.max(...xs), Math.min(...ys), Math.max(...ys)];
      const scale = Math.min(76 / (x1 - x0 || 1), 96 / (y1 - y0 || 1));
      const place = (i) => [66 + (xs[i] - (x0 + x1) / 2) * scale, 60 + (ys[i] - (y0 + y1) / 2) * scale];
      const points = xs.map((_, i) => place(i));
      setAttribute(parts.path, 'd', `M${points.map(at).join('L')}`);
      const [first, last] = [points[0], points.at(-1)];
      setAttribute(parts.across, 'd', line([14, first[1]], [116, first[1]]) + line([14, last[1]], [116, last[1]]));
      setAttribute(parts.fall, 'd', line([12, 22], [12, 90]));
      setAttribute(parts.head, 'd', polygon([[12, 100], [7, 89], [17, 89]]));
    },
  };
}
