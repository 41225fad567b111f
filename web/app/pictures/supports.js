/** A board on two supports with a weight in the middle: what to measure for its stiffness. */

import { svg } from '../dom.js';

/** @param {{supports: string, weight: string, sag: string}} words */
export function drawSupports(words) {
  const label = (x, y, text, anchor = 'middle') => svg('text', { class: 'label', x, y, 'text-anchor': anchor, text });
  return svg('svg', { class: 'supports', viewBox: '0 0 320 150', 'aria-hidden': 'true', focusable: 'false' },
    svg('path', { class: 'ground', d: 'M50 74h20l6 50h-32ZM250 74h20l6 50h-32Z' }),
    svg('path', { class: 'straight', d: 'M8 64Q20 72 40 72H280Q300 72 312 64' }),
    svg('path', { class: 'bent', d: 'M8 54Q24 68 60 72Q160 108 260 72Q296 68 312 54' }),
    svg('path', { class: 'weight', d: 'M142 46h36v40q-18 4-36 0Z' }),
    svg('path', { class: 'measure', d: 'M60 136H260M60 130v12M260 130v12M196 72v18M190 72h12M190 90h12' }),
    label(160, 40, words.weight), label(160, 130, words.supports), label(208, 96, words.sag, 'start'));
}
