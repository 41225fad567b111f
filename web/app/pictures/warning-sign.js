/** General warning sign of ISO 3864 / ISO 7010 W001: black on yellow, in every look. */

import { svg } from '../dom.js';
import { t } from '../text.js';

export function drawWarningSign() {
  return svg('svg', { class: 'warning-sign', viewBox: '0 0 100 90', role: 'img', 'aria-label': t('caution.sign') },
    svg('path', { class: 'border', d: 'M50 4 97 86H3Z' }), svg('path', { class: 'field', d: 'M50 19 84 78H16Z' }),
    svg('path', { class: 'mark', d: 'M45 36h10l-2 24h-6Z' }), svg('circle', { class: 'mark', cx: 50, cy: 69, r: 5 }));
}
