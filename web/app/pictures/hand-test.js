/** The hand hardness test, drawn: what is pressed into the snow, in section. */

import { svg } from '../dom.js';

const SURFACE = 27;
const bar = (x, wide, to) => {
  const r = wide / 2;
  return `M${x + r} 4V${to - r}a${r} ${r} 0 0 1 ${-wide} 0V4Z`;
};
const KNIFE = (to) => `M23.5 0h9v${to - 20}h-9ZM25 ${to - 20}h6v12q0 4-6 8Z`;

/** What goes in, by the code of the snow; `seams` are drawn light over it. */
const PRESSED = {
  F: { shape: 'M13 0h30v14q4 3 4 9v6q0 9-7 9h-24q-7 0-7-9v-6q0-6 4-9Z', seams: 'M20 22v11M28 22v12M36 22v11' },
  '4F': { shape: `M12.5 0h31v14h-31Z${bar(16.2, 7, 37)}${bar(24, 7, 38.5)}${bar(32, 7, 38)}${bar(39.8, 7, 36)}` },
  '1F': { shape: `M13 0h30v13q0 5-5 5h-20q-5 0-5-5Z${bar(28, 8, 39)}` },
  P: { shape: 'M25.4 0h5.2v38h-5.2Z', seams: 'M25.4 31h5.2M25.4 33.5h5.2' },
  K: { shape: KNIFE(40) },
  I: { shape: KNIFE(SURFACE) },
};

/** @param {string} code */
export function drawHandTest(code) {
  const { shape, seams } = PRESSED[code];
  return svg('svg', { class: 'hand-test', viewBox: '0 0 56 48', 'aria-hidden': 'true', focusable: 'false', 'data-snow': code },
    svg('path', { class: 'ground', d: `M0 ${SURFACE}H56V48H0Z` }),
    svg('path', { class: 'pressed', d: shape }),
    seams ? svg('path', { class: 'seams', d: seams }) : null,
    svg('path', { class: 'ground-line', d: `M0 ${SURFACE}H56` }));
}
