/**
 * The slope in section, along the fall line, drawn to scale; over the snow the speed of a body that
 * slides. The higher a line stands over the snow the faster the slide; where it meets the snow it
 * has stopped. Pale between the slowest and the fastest; full, dashed and dotted lines for slick,
 * middle and rough clothing, so that it reads in grey.
 */

import { setAttribute, setAttributes, setText, svg } from '../dom.js';
import { at, disc, line, polygon } from './geometry.js';

export const WAYS = ['slick', 'middle', 'rough'];
/** Share of the picture's height that the fastest speed takes. */
const SPEED_SHARE = 0.4;
/** Width of a letter in em. */
const LETTER = 0.5;

/** @param {boolean} presentational whether something around it says the same in words */
export function createProfile(presentational) {
  const part = (name) => svg('path', { class: name });
  const parts = Object.fromEntries(['snow', 'band', 'ticks', 'surface', 'asked', 'rough', 'middle', 'slick',
    'halts', 'fall-post', 'fall', 'rule'].map((name) => [name, part(name)]));
  const labels = svg('g');
  const pool = [];
  const node = svg('svg', {
    class: 'profile', focusable: 'false', role: presentational ? null : 'img', 'aria-hidden': presentational ? 'true' : null,
  }, ...Object.values(parts), labels);
  /** From a place on the screen to one along the slope. */
  let places = null;

  /** One text of the picture, kept inside it; made once and used again. */
  function write(count, text, x, y, { anchor = 'middle', kind = '', width, em, key = null }) {
    const one = pool[count] ?? (pool[count] = labels.appendChild(svg('text', {})));
    const half = text.length * em * LETTER * (anchor === 'middle' ? 0.5 : 1);
    const from = anchor === 'start' ? 2 : half + 2;
    const to = width - 2 - (anchor === 'end' ? 0 : half);
    setText(one, text);
    setAttributes(one, {
      hidden: false,
      class: `label ${kind}`, 'text-anchor': anchor, 'data-answer': key,
      x: Math.max(from, Math.min(to, x)).toFixed(1), y: y.toFixed(1),
    });
    return count + 1;
  }

  /**
   * @param {object} shown
   * @param {any} shown.profile the answer's lists for drawing
   * @param {{start_m: number, end_m: number, text: string, short: string}[]} shown.legs with their labels
   * @param {{at_m: number, text: string}} shown.fall
   * @param {number[]} shown.halts where a slide stops, m along the slope
   * @param {boolean} shown.asks whether the clothing asked for is none of the three
   * @param {(slow: number, fast: number, last: boolean) => string} shown.speedText
   * @param {{length_m: number, text: string}[]} shown.rules lengths to choose the scale's from
   * @param {{width: number, height: number, em: number}} size px
   */
  function update(shown, { width, height, em }) {
    const { profile, legs, fall, halts } = shown;
    const { distance_m: along, x_m: xs, height_m: hs, speed_mps: speeds } = profile;
    const fastest = speeds.fastest;
    const top = Math.max(0, ...fastest.map((v) => v ?? 0));
    const margin = { left: 14, right: 14, top: em * 2.4, bottom: em * 2 };
    let perSpeed = top > 0 ? (height * SPEED_SHARE - em) / top : 0;
    const room = height - margin.top - margin.bottom;
    const scale = Math.min((width - margin.left - margin.right) / xs.at(-1),
      ...hs.map((h, i) => (h > 1e-6 ? Math.max(room - (fastest[i] ?? 0) * perSpeed, room * 0.2) / h : Infinity)));
    const left = (width - xs.at(-1) * scale) / 2;
    /** Where the drawing stands when it is lower than the picture. */
    const tallest = () => Math.max(...hs.map((h, i) => h * scale + (fastest[i] ?? 0) * perSpeed));
    // On a flat slope there is room for the speeds.
    perSpeed *= Math.max(1, Math.min(1.6, room / (tallest() || room)));
    const highest = tallest();
    const floor = height - margin.bottom - Math.max(0, (room - highest) * 0.35);
    const ground = along.map((_, i) => [left + xs[i] * scale, floor - hs[i] * scale]);
    const over = (list, i) => [ground[i][0], ground[i][1] - (list[i] ?? 0) * perSpeed];
    const indexAt = (place) => nearest(along, place);
    places = { ground, along };

    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    setAttribute(parts.snow, 'd', polygon([...ground, [ground.at(-1)[0], height], [ground[0][0], height]]));
    setAttribute(parts.surface, 'd', open(ground));
    const slid = along.map((_, i) => i).filter((i) => fastest[i] !== null);
    setAttribute(parts.band, 'd', slid.length > 1
      ? polygon([...slid.map((i) => over(fastest, i)), ...[...slid].reverse().map((i) => over(speeds.slowest, i))]) : null);
    for (const way of WAYS) setAttribute(parts[way], 'd', lineOf(speeds[way]));
    setAttribute(parts.asked, 'd', shown.asks ? lineOf(speeds.asked) : null);

    let count = 0;
    const put = (text, [x, y], options) => { count = write(count, text, x, y, { width, em, ...options }); };
    for (const { start_m, end_m, text, short } of legs) {
      const [from, to] = [ground[indexAt(start_m)], ground[indexAt(end_m)]];
      const wide = to[0] - from[0];
      const fits = [text, short].find((one) => one.length * em * LETTER < wide + em * 0.3);
      // Below the lower of the line's ends under the label, so that it stays clear of the snow's line.
      const slope = Math.abs(to[1] - from[1]) / Math.max(wide, 1);
      if (fits) put(fits, [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2 + em * 1.15 + slope * fits.length * em * LETTER * 0.5], { kind: 'small on-snow' });
    }
    const breaks = legs.map(({ end_m }) => indexAt(end_m)).filter((i) => fastest[i] !== null);
    setAttribute(parts.ticks, 'd', breaks.map((i) => line(ground[i], over(fastest, i))).join('') || null);
    // The end first, then the breaks that have room.
    let taken = Infinity;
    [...breaks].reverse().forEach((i, order) => {
      const text = shown.speedText(speeds.slowest[i] ?? 0, fastest[i], order === 0 && i === along.length - 1);
      const wide = text.length * em * LETTER;
      const right = Math.min(width - 4, ground[i][0] + wide / 2);
      if (right > taken - em * 0.5) return;
      taken = right - wide;
      // Over every line that is under the label.
      const under = ground.map((_, j) => over(fastest, j)).filter(([x]) => x > taken - em && x < right + 4);
      const y = Math.min(over(fastest, i)[1], ...under.map((point) => point[1]));
      put(text, [right, Math.max(em * 2.2, y - em * 0.45)], { anchor: 'end', kind: 'speed', key: `profile.speed_mps.fastest.${i}` });
    });
    setAttribute(parts.halts, 'd', halts.map((place) => disc(ground[indexAt(place)], 5.5)).join('') || null);

    const [fx, fy] = ground[indexAt(fall.at_m)];
    const post = over(fastest, indexAt(fall.at_m));
    setAttribute(parts['fall-post'], 'd', line([fx, fy], post));
    setAttribute(parts.fall, 'd', disc([fx, fy], 9));
    // Its name where no speed stands, else to its left where that has room.
    const fallWide = fall.text.length * em * LETTER;
    if (fx + fallWide / 2 < taken) put(fall.text, [fx, Math.max(em, post[1] - em * 0.5)], { kind: 'accent' });
    else if (fx > fallWide + 16) put(fall.text, [fx - 14, fy - em * 0.4], { anchor: 'end', kind: 'accent' });
    drawRule(shown.rules, scale);
    pool.slice(count).forEach((one) => setAttribute(one, 'hidden', true));

    function drawRule(rules, perMetre) {
      const rule = rules.findLast(({ length_m }) => length_m * perMetre <= width * 0.25) ?? rules[0];
      const to = width - 8;
      const from = to - rule.length_m * perMetre;
      setAttribute(parts.rule, 'd', `M${at([from, em * 1.15])}v5H${to.toFixed(1)}v-5`);
      put(rule.text, [(from + to) / 2, em * 0.95], { kind: 'small' });
    }

    function lineOf(list) {
      const points = list.map((v, i) => (v === null ? null : over(list, i))).filter(Boolean);
      return points.length > 1 ? open(points) : null;
    }
  }

  return {
    node,
    update,
    /** The place along the slope under a point of the screen, m. */
    placeAt(x) {
      if (!places) return null;
      const { ground, along } = places;
      if (x <= ground[0][0]) return along[0];
      const next = ground.findIndex(([gx]) => gx >= x);
      if (next < 0) return along.at(-1);
      const share = (x - ground[next - 1][0]) / (ground[next][0] - ground[next - 1][0] || 1);
      return along[next - 1] + share * (along[next] - along[next - 1]);
    },
  };
}

const open = (points) => `M${points.map(at).join('L')}`;

function nearest(list, value) {
  let best = 0;
  list.forEach((one, i) => { if (Math.abs(one - value) < Math.abs(list[best] - value)) best = i; });
  return best;
}
