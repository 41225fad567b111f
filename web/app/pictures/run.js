/**
 * A run from above, down the page, and beside it what changes down the hill: speed, load, lean and
 * margin, all against the same height, so that the eye reads straight across.
 */

import { svg, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { at, line } from './geometry.js';
import { stretches } from './above.js';

const STROKES = { holds: 'holds', marginal: 'marginal', washes_out: 'gone', too_slow: 'gone', too_fast: 'gone' };
/** What stands beside the path: key of the path's list. */
export const STRIPS = [
  { name: 'speed', key: 'speed_mps', kind: 'speed' }, { name: 'load', key: 'load_g', kind: 'load' },
  { name: 'lean', key: 'lean_deg', kind: 'angle' }, { name: 'margin', key: 'grip_margin', kind: 'share' },
];
/** Margins above this are drawn at the border: there the strip says enough. */
const MARGIN_TO = 0.6;
const MARGIN_FROM = -0.4;

export function createRunPicture() {
  const part = (name) => svg('path', { class: name });
  const text = (name) => svg('text', { class: `label ${name}` });
  const parts = { fails: part('fails-at'), gone: part('gone'), marginal: part('marginal'), holds: part('holds') };
  const mark = { ring: svg('circle', { class: 'mark', r: 8 }), label: text('') };
  const strips = STRIPS.map(({ name }) => ({ name, frame: part('frame'), zero: part('zero'), curve: part('curve'), span: text('small'), unit: text('small'), title: text('') }));
  const pathTitle = text('');
  const node = svg('svg', { class: 'above run-picture', role: 'img', focusable: 'false' }, ...Object.values(parts), mark.ring, pathTitle,
    ...strips.flatMap(({ frame, zero, curve, span, unit, title }) => [frame, zero, curve, span, unit, title]), mark.label);

  /**
   * @param {object} shown
   * @param {any} shown.path the answer's
   * @param {{x_m: number, y_m: number}|null} shown.fails
   * @param {{path: string, fails: string, titles: Record<string, string>, spans: Record<string, string>, units: Record<string, string>}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ path, fails, words }, { width, height, em }) {
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const top = em * 4.1;
    const bottom = height - 10;
    const pathWide = width * 0.3;
    const [x0, x1] = [Math.min(...path.x_m), Math.max(...path.x_m)];
    const y0 = Math.min(...path.y_m);
    const y1 = Math.max(...path.y_m, y0 + 0.1);
    const scale = Math.min((pathWide - 24) / (x1 - x0 || 1), (bottom - top) / (y1 - y0));
    // One height for all: what is beside the path is as long as the path.
    const y = (m) => top + (m - y0) * scale;
    const x = (m) => pathWide / 2 + (m - (x0 + x1) / 2) * scale;
    const points = path.x_m.map((m, i) => [x(m), y(path.y_m[i])]);
    const strokes = path.state.map((state) => STROKES[state]);
    for (const name of ['holds', 'marginal', 'gone']) setAttribute(parts[name], 'd', stretches(points, strokes, name));
    const put = (one, words_, px, py, anchor) => {
      setText(one, words_);
      setAttributes(one, { x: px.toFixed(1), y: py.toFixed(1), 'text-anchor': anchor });
    };
    put(pathTitle, words.path, 2, em * 0.95, 'start');
    for (const one of [mark.ring, mark.label]) setShown(one, fails !== null);
    setAttribute(parts.fails, 'd', fails && line([0, y(fails.y_m)], [width, y(fails.y_m)]));
    if (fails) {
      setAttributes(mark.ring, { cx: x(fails.x_m).toFixed(1), cy: y(fails.y_m).toFixed(1) });
      const low = y(fails.y_m) + em * 1.6 < height;
      put(mark.label, words.fails, 4, y(fails.y_m) + (low ? em * 1.3 : -em * 0.8), 'start');
    }
    const gap = 8;
    const wide = (width - pathWide) / strips.length - gap;
    strips.forEach((strip, i) => {
      const { key, name } = STRIPS[i];
      const left = pathWide + i * (wide + gap) + gap;
      const values = path[key];
      const known = values.filter((value) => value !== null);
      const ends = name === 'margin' ? [MARGIN_FROM, MARGIN_TO] : [0, Math.max(...known, 0.01)];
      const across = (value) => left + ((Math.max(ends[0], Math.min(ends[1], value)) - ends[0]) / (ends[1] - ends[0])) * wide;
      setAttribute(strip.frame, 'd', line([left, top], [left, y(y1)]) + line([left + wide, top], [left + wide, y(y1)]));
      setAttribute(strip.zero, 'd', name === 'margin' ? line([across(0), top], [across(0), y(y1)]) : null);
      setAttribute(strip.curve, 'd', broken(values.map((value, j) => value === null ? null : [across(value), points[j][1]])));
      put(strip.title, words.titles[name], left, em * 0.95, 'start');
      put(strip.span, words.spans[name], left, em * 2.15, 'start');
      put(strip.unit, words.units[name], left, em * 3.35, 'start');
    });
  }

  return { node, update };
}

/** How high the picture is for a path at this width, px: as long as the path, within reason. */
export function runHeight(path, width) {
  const across = Math.max(...path.x_m) - Math.min(...path.x_m) || 1;
  const down = Math.max(...path.y_m) - Math.min(...path.y_m);
  return Math.max(140, Math.min(520, ((width * 0.3 - 24) / across) * down + 85));
}

/** A line with gaps where there is no point. */
function broken(points) {
  let d = '';
  points.forEach((point, i) => {
    if (point) d += `${points[i - 1] ? 'L' : 'M'}${at(point)}`;
  });
  return d;
}
