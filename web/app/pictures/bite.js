/**
 * How deep the edge sits in the snow along the board, tail on the left: the depth drawn larger than
 * it is, contact thick on the surface.
 */

import { setAttribute, setAttributes, setText, svg } from '../dom.js';
import { at } from './geometry.js';

export function createBite() {
  const part = (name) => svg('path', { class: name });
  const parts = { snow: part('snow'), push: part('cut'), surface: part('surface'), edge: part('edge-line'), contact: part('contact') };
  const label = svg('text', { class: 'label', 'text-anchor': 'middle' });
  const ends = [svg('text', { class: 'label small' }), svg('text', { class: 'label small', 'text-anchor': 'end' })];
  const node = svg('svg', { class: 'bite', role: 'img', focusable: 'false' }, ...Object.values(parts), label, ...ends);

  /**
   * @param {object} shown
   * @param {{at_m: number[], depth_m: number[]}} shown.picture the engine's
   * @param {{from_m: number, to_m: number}[]} shown.contact
   * @param {{label: string, tail: string, nose: string}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ picture, contact, words }, { width, height, em }) {
    const { at_m: xs, depth_m: depths } = picture;
    const surface = height * 0.36;
    const scale = (width - 24) / (xs.at(-1) - xs[0]);
    const deepest = Math.max(...depths, 1e-6);
    const highest = Math.max(0, -Math.min(...depths));
    const down = Math.min((height - surface - em * 1.9) / deepest, (surface - em * 1.4) / Math.max(highest, 1e-9));
    const x = (value) => 12 + (value - xs[0]) * scale;
    const points = xs.map((value, i) => [x(value), surface + depths[i] * down]);
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    setAttribute(parts.snow, 'd', `M0 ${surface.toFixed(1)}H${width}V${height}H0Z`);
    setAttribute(parts.surface, 'd', `M0 ${surface.toFixed(1)}H${width}`);
    const below = points.map(([px, py]) => [px, Math.max(surface, py)]);
    setAttribute(parts.push, 'd', `M${at([points[0][0], surface])}L${below.map(at).join('L')}L${at([points.at(-1)[0], surface])}Z`);
    setAttribute(parts.edge, 'd', `M${points.map(at).join('L')}`);
    setAttribute(parts.contact, 'd', contact.map(({ from_m, to_m }) => `M${at([x(from_m), surface])}H${x(to_m).toFixed(1)}`).join(''));
    setText(label, words.label);
    setAttributes(label, { x: (width / 2).toFixed(1), y: (surface - em * 0.7).toFixed(1) });
    [words.tail, words.nose].forEach((word, i) => {
      setText(ends[i], word);
      setAttributes(ends[i], { x: i ? width - 10 : 10, y: (height - em * 0.4).toFixed(1) });
    });
  }

  return { node, update };
}
