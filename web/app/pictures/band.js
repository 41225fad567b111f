/**
 * The grip margin along the turn with its band: how rough inputs spread it. Where the band is
 * below nothing the edge goes: hatched, and named.
 */

import { svg, setAttribute, setAttributes, setText } from '../dom.js';
import { at, line } from './geometry.js';

/** Margins outside this are drawn at its border. */
const LOW = -0.5;
const HIGH = 1;
/** From here on the edge holds with margin. */
const HOLDS = 0.15;

export function createBand() {
  const part = (name) => svg('path', { class: name });
  const hatch = svg('pattern', { id: 'band-hatch', width: 6, height: 6, patternUnits: 'userSpaceOnUse', patternTransform: 'rotate(45)' },
    svg('rect', { width: 2.5, height: 6, class: 'hatch' }));
  const clip = svg('rect', { x: 0, width: 1, y: 0, height: 1 });
  const parts = { band: part('spread'), lacks: part('lacks'), fall: part('fall'), holds: part('holds-at'), zero: part('zero'), line: part('stated') };
  setAttribute(parts.lacks, 'clip-path', 'url(#band-below)');
  const label = (name) => svg('text', { class: `label ${name}` });
  const labels = { holds: label('small'), zero: label('small'), goes: label(''), start: label('small'), fall: label('small'), end: label('small') };
  const node = svg('svg', { class: 'margin-band', role: 'img', focusable: 'false' },
    svg('defs', {}, hatch, svg('clipPath', { id: 'band-below' }, clip)), ...Object.values(parts), ...Object.values(labels));

  /**
   * @param {object} shown
   * @param {number[]} shown.phases degrees
   * @param {(number|null)[]} shown.low
   * @param {(number|null)[]} shown.high
   * @param {(number|null)[]} shown.margin as stated
   * @param {Record<string, string>} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ phases, low, high, margin, words }, { width, height, em }) {
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const box = { left: em * 3, right: width - 6, top: 6, bottom: height - em * 1.6 };
    const [first, last] = [phases[0], phases.at(-1)];
    const x = (phase) => box.left + ((phase - first) / (last - first)) * (box.right - box.left);
    const y = (value) => box.bottom - ((Math.max(LOW, Math.min(HIGH, value)) - LOW) / (HIGH - LOW)) * (box.bottom - box.top);
    let area = '';
    for (const run of stretches(low)) {
      const upper = run.map((i) => [x(phases[i]), y(high[i])]);
      const lower = run.map((i) => [x(phases[i]), y(low[i])]).reverse();
      area += `M${[...upper, ...lower].map(at).join('L')}Z`;
    }
    setAttribute(parts.band, 'd', area);
    setAttribute(parts.lacks, 'd', area);
    setAttributes(clip, { x: 0, width, y: y(0), height: Math.max(0, height - y(0)) });
    setAttribute(parts.line, 'd', stretches(margin).map((run) => `M${run.map((i) => at([x(phases[i]), y(margin[i])])).join('L')}`).join(''));
    setAttribute(parts.zero, 'd', line([box.left, y(0)], [box.right, y(0)]));
    setAttribute(parts.holds, 'd', line([box.left, y(HOLDS)], [box.right, y(HOLDS)]));
    setAttribute(parts.fall, 'd', line([x(90), box.top], [x(90), box.bottom]));
    const put = (one, text, px, py, anchor) => {
      setText(one, text);
      setAttributes(one, { x: px.toFixed(1), y: py.toFixed(1), 'text-anchor': anchor });
    };
    put(labels.holds, words.holds, box.left - em * 0.4, y(HOLDS) - em * 0.1, 'end');
    put(labels.zero, words.zero, box.left - em * 0.4, y(0) + em * 0.5, 'end');
    put(labels.goes, words.goes, box.left + em * 0.4, y(-0.42), 'start');
    put(labels.start, words.start, box.left, height - em * 0.3, 'start');
    put(labels.fall, words.fall, x(90), height - em * 0.3, 'middle');
    put(labels.end, words.end, box.right, height - em * 0.3, 'end');
  }

  return { node, update };
}

/** Indices of the stretches without a gap. */
function stretches(values) {
  const runs = [];
  values.forEach((value, i) => {
    if (value === null) return;
    if (runs.at(-1)?.at(-1) === i - 1) runs.at(-1).push(i);
    else runs.push([i]);
  });
  return runs;
}
