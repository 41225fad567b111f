/** Speed at the foot of one leg against its pitch, a line for each clothing. */

import { setAttribute, setAttributes, setText, svg } from '../dom.js';
import { at, line } from './geometry.js';
import { WAYS } from './profile.js';

const PITCH_TICKS = [0, 10, 20, 30, 40, 50];

export function createSweep() {
  const part = (name) => svg('path', { class: name });
  const parts = Object.fromEntries(['grid', 'now', 'rough', 'middle', 'slick', 'axis'].map((name) => [name, part(name)]));
  const labels = svg('g');
  const pool = [];
  const node = svg('svg', { class: 'sweep', role: 'img', focusable: 'false' }, ...Object.values(parts), labels);

  /**
   * @param {object} shown
   * @param {any} shown.sweep the answer's table
   * @param {number} shown.nowDeg the leg's pitch
   * @param {(deg: number) => string} shown.pitchText
   * @param {{speed_mps: number, text: string}[]} shown.ticks speeds to choose the axis's from
   * @param {{y: string, now: string, slick: string, middle: string, rough: string}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ sweep, nowDeg, pitchText, ticks, words }, { width, height, em }) {
    const box = { left: em * 3, right: width - em * 3.4, top: em * 1.8, bottom: height - em * 1.6 };
    const most = Math.max(1, ...sweep.levels.flatMap(({ foot_speed_mps }) => foot_speed_mps));
    const last = sweep.pitch_deg.at(-1);
    const x = (deg) => box.left + (deg / last) * (box.right - box.left);
    const y = (speed) => box.bottom - (speed / most) * (box.bottom - box.top);
    let count = 0;
    const write = (text, [tx, ty], anchor, kind = 'small') => {
      const one = pool[count] ?? (pool[count] = labels.appendChild(svg('text', {})));
      count += 1;
      setText(one, text);
      setAttributes(one, { hidden: false, class: `label ${kind}`, 'text-anchor': anchor, x: tx.toFixed(1), y: ty.toFixed(1) });
    };
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const inside = ticks.filter(({ speed_mps }) => speed_mps <= most);
    const step = Math.max(1, Math.ceil(inside.length / 5));
    const used = inside.filter((_, i) => i % step === 0);
    setAttribute(parts.grid, 'd', used.map(({ speed_mps }) => line([box.left, y(speed_mps)], [box.right, y(speed_mps)])).join('') || null);
    for (const { speed_mps, text } of used) write(text, [box.left - em * 0.4, y(speed_mps) + em * 0.35], 'end');
    for (const deg of PITCH_TICKS) write(pitchText(deg), [x(deg), box.bottom + em * 1.2], 'middle');
    setAttribute(parts.axis, 'd', `M${at([box.left, box.top])}V${box.bottom.toFixed(1)}H${box.right.toFixed(1)}`);
    WAYS.forEach((way, i) => {
      const speeds = sweep.levels[i].foot_speed_mps;
      setAttribute(parts[way], 'd', `M${speeds.map((speed, j) => at([x(sweep.pitch_deg[j]), y(speed)])).join('L')}`);
    });
    // Names at the lines' ends, kept apart.
    let above = -Infinity;
    WAYS.forEach((way, i) => {
      const place = Math.max(y(sweep.levels[i].foot_speed_mps.at(-1)) + em * 0.35, above + em * 1.05);
      above = place;
      write(words[way], [box.right + em * 0.35, Math.min(place, box.bottom - (2 - i) * em * 1.05 + em)], 'start', '');
    });
    const shows = nowDeg >= 0 && nowDeg <= last;
    setAttribute(parts.now, 'd', shows ? line([x(nowDeg), box.top], [x(nowDeg), box.bottom]) : null);
    if (shows) write(words.now, [x(nowDeg), box.top - em * 0.4], 'middle', 'accent');
    write(words.y, [2, em * 0.9], 'start');
    pool.slice(count).forEach((one) => setAttribute(one, 'hidden', true));
  }

  return { node, update };
}
