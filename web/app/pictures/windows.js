/**
 * Speed windows of boards against the rider's usual speeds: a lane a board, in it the speeds that
 * carve from the flattest pitch (top) to the steepest (bottom); usual speeds as a band through all.
 */

import { el, setAttribute, setAttributes, svg } from '../dom.js';
import { at } from './geometry.js';

export function createWindows() {
  const picture = svg('svg', { class: 'windows', role: 'img', focusable: 'false' });
  const node = el('div', { class: 'windows-box' }, picture);

  /**
   * @param {object} shown
   * @param {{low: number, mean: number, high: number}} shown.usual m/s
   * @param {{name: string, verdict: string, windows: {min_mps: number|null, max_mps: number|null}[]}[]} shown.boards
   * @param {(mps: number) => number} shown.unit speed in the reader's unit
   * @param {(value: number) => string} shown.write
   * @param {{none: string, usual: string, label: string}} shown.words
   */
  function update({ usual, boards, unit, write, words }) {
    const width = node.clientWidth;
    if (!width) return;
    const em = parseFloat(getComputedStyle(node).fontSize);
    const lane = em * 3.6;
    const top = em * 1.5;
    const height = top + lane * boards.length + em * 1.6;
    const fastest = Math.max(usual.high, ...boards.flatMap(({ windows }) => windows.map(({ max_mps }) => max_mps ?? 0))) * 1.08;
    const x = (mps) => 2 + (mps / fastest) * (width - 4);
    const nodes = [];
    const add = (tag, attributes, text) => nodes.push(svg(tag, text === undefined ? attributes : { ...attributes, text }));
    setAttributes(picture, { viewBox: `0 0 ${width} ${height.toFixed(0)}`, width, height: height.toFixed(0), 'aria-label': words.label });
    add('rect', { class: 'usual', x: x(usual.low).toFixed(1), y: top, width: (x(usual.high) - x(usual.low)).toFixed(1), height: lane * boards.length });
    add('path', { class: 'mean', d: `M${x(usual.mean).toFixed(1)} ${top}v${lane * boards.length}` });
    add('text', { class: 'label small', x: x(usual.mean).toFixed(1), y: em, 'text-anchor': 'middle' }, words.usual);
    boards.forEach(({ name, windows }, i) => {
      const y = top + lane * i;
      const from = y + em * 1.5;
      const step = (lane - em * 1.75) / Math.max(1, windows.length - 1);
      const open = windows.map((one, k) => ({ ...one, y: from + step * k })).filter(({ min_mps }) => min_mps !== null);
      add('path', { class: 'lane', d: `M0 ${y.toFixed(1)}H${width}` });
      add('text', { class: 'label', x: 4, y: (y + em * 1.15).toFixed(1) }, name);
      if (open.length) {
        const last = windows.length > 1 ? [] : open.map((one) => ({ ...one, y: from + lane - em * 1.75 }));
        const rows = [...open, ...last];
        const outline = [...rows.map((one) => [x(one.min_mps), one.y]), ...rows.map((one) => [x(one.max_mps), one.y]).reverse()];
        add('path', { class: 'carves', d: `M${outline.map(at).join('L')}Z` });
      } else add('text', { class: 'label small', x: 4, y: (y + em * 2.6).toFixed(1) }, words.none);
    });
    const bottom = top + lane * boards.length;
    add('path', { class: 'lane', d: `M0 ${bottom.toFixed(1)}H${width}` });
    const most = unit(fastest);
    const tick = [2, 5, 10, 20].find((one) => most / one <= width / (em * 3)) ?? 50;
    for (let value = tick; value < most; value += tick) {
      const px = x(fastest * value / most);
      add('path', { class: 'tick', d: `M${px.toFixed(1)} ${bottom.toFixed(1)}v6` });
      add('text', { class: 'label small', x: px.toFixed(1), y: (bottom + em * 1.3).toFixed(1), 'text-anchor': 'middle' }, write(value));
    }
    picture.replaceChildren(...nodes);
    setAttribute(picture, 'data-boards', boards.length);
  }

  return { node, update };
}
