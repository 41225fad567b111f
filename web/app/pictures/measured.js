/** A box whose picture is drawn to its size; it is measured only when that changes. */

import { el } from '../dom.js';

/**
 * @param {string} name class of the box
 * @param {any} svgNode
 * @param {(size: {width: number, height: number, em: number}) => void} draw
 */
export function createMeasured(name, svgNode, draw) {
  const node = el('div', { class: `sized ${name}` }, svgNode);
  let size = null;
  new ResizeObserver(() => {
    if (!node.clientWidth) return;
    const label = svgNode.querySelector('.label');
    size = { width: node.clientWidth, height: node.clientHeight, em: label ? parseFloat(getComputedStyle(label).fontSize) : 14 };
    draw(size);
  }).observe(node);
  return { node, redraw: () => { if (size) draw(size); } };
}
