/**
 * Pitch against speed: where the whole turn holds, is close, washes out, and where no carve
 * balances. The states differ by pattern and by name, the point is the user's.
 */

import { svg, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { at, line } from './geometry.js';

/** @typedef {{pitch_deg: number[], slowest_mps: number[], holds_mps: number[], marginal_mps: number[], carves_mps: (number|null)[]}} Contours */

export function createWindowPicture() {
  const part = (name) => svg('path', { class: name });
  const pattern = (id, turn, ...content) => svg('pattern', { id, width: 8, height: 8, patternUnits: 'userSpaceOnUse',
    patternTransform: turn ? 'rotate(45)' : null }, ...content);
  const parts = {
    grid: part('grid'), holds: part('holds'), marginal: part('marginal'), washes: part('washes'),
    edgeSlow: part('edge-slow'), edgeHolds: part('edge-holds'), edgeFast: part('edge-fast'),
    cross: part('cross'), axes: part('axes'),
  };
  const rim = svg('circle', { class: 'point rim', r: 11 });
  const point = svg('circle', { class: 'point', r: 7 });
  const label = (name) => svg('text', { class: `label ${name}` });
  const labels = { holds: label(''), washes: label('small'), slow: label('small'), fast: label('small'), pitch: label('small'), speed: label('small') };
  const ticks = svg('g', { class: 'ticks' });
  const node = svg('svg', { class: 'window-picture', role: 'img', focusable: 'false' },
    svg('defs', {}, pattern('window-marginal', true, svg('rect', { width: 3, height: 8, class: 'ink' })),
      pattern('window-washes', false, svg('circle', { cx: 2, cy: 2, r: 1.1, class: 'ink' }), svg('circle', { cx: 6, cy: 6, r: 1.1, class: 'ink' }))),
    ...Object.values(parts), ticks, rim, point, ...Object.values(labels));
  let scale = null;

  /**
   * @param {object} shown
   * @param {Contours} shown.contours
   * @param {{pitchDeg: number, speedMps: number}|null} shown.point
   * @param {number} shown.topMps highest speed of the picture
   * @param {{value: number, text: string}[]} shown.pitches ticks
   * @param {{value: number, text: string}[]} shown.speeds ticks
   * @param {Record<string, string>} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update({ contours, point: mine, topMps, pitches, speeds, words }, { width, height, em }) {
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const box = { left: em * 2.4, right: width - 10, top: em * 1.5, bottom: height - em * 1.7 };
    const { pitch_deg: pitch, slowest_mps: slowest, holds_mps: holds, marginal_mps: marginal, carves_mps: carves } = contours;
    const x = (deg) => box.left + (deg / pitch.at(-1)) * (box.right - box.left);
    const y = (mps) => box.bottom - (Math.min(mps, topMps) / topMps) * (box.bottom - box.top);
    scale = { box, pitchOf: (px) => ((px - box.left) / (box.right - box.left)) * pitch.at(-1),
      speedOf: (py) => ((box.bottom - py) / (box.bottom - box.top)) * topMps };

    const between = (low, high) => area(pitch.map((deg, i) => [x(deg), low[i], high[i]]), y);
    const floor = (values) => values.map((value, i) => Math.max(value, slowest[i]));
    const top = carves.map((value) => value ?? topMps);
    setAttribute(parts.holds, 'd', between(slowest, floor(holds)));
    setAttribute(parts.marginal, 'd', between(floor(holds), floor(marginal)));
    setAttribute(parts.washes, 'd', between(floor(marginal), floor(top)));
    // A bound ends where it meets the slowest speed: beyond that its state is not to be had.
    const curve = (values, open = () => true) => {
      const points = pitch.map((deg, i) => [x(deg), y(values[i]), i]).filter(([, , i]) => open(i));
      return points.length ? `M${points.map(at).join('L')}` : null;
    };
    setAttribute(parts.edgeSlow, 'd', curve(slowest));
    setAttribute(parts.edgeHolds, 'd', curve(holds, (i) => holds[i] > slowest[i]));
    setAttribute(parts.edgeFast, 'd', carves[0] === null ? null : curve(top, (i) => top[i] > slowest[i]));
    setAttribute(parts.axes, 'd', line([box.left, box.top], [box.left, box.bottom]) + line([box.left, box.bottom], [box.right, box.bottom]));
    setAttribute(parts.grid, 'd', pitches.map(({ value }) => line([x(value), box.top], [x(value), box.bottom])).join('') +
      speeds.map(({ value }) => line([box.left, y(value)], [box.right, y(value)])).join(''));
    ticks.replaceChildren(
      ...pitches.map(({ value, text }) => svg('text', { class: 'label small', x: x(value).toFixed(1), y: (box.bottom + em * 1.2).toFixed(1), 'text-anchor': 'middle', text })),
      ...speeds.map(({ value, text }) => svg('text', { class: 'label small', x: (box.left - em * 0.4).toFixed(1), y: (y(value) + em * 0.35).toFixed(1), 'text-anchor': 'end', text })));

    for (const one of [point, rim]) setShown(one, mine !== null);
    setAttribute(parts.cross, 'd', mine && line([x(mine.pitchDeg), box.top], [x(mine.pitchDeg), box.bottom]) +
      line([box.left, y(mine.speedMps)], [box.right, y(mine.speedMps)]));
    if (mine) for (const one of [point, rim]) setAttributes(one, { cx: x(mine.pitchDeg).toFixed(1), cy: y(mine.speedMps).toFixed(1) });

    const put = (one, text, px, py, anchor = 'middle') => {
      setText(one, text);
      setAttributes(one, { x: px.toFixed(1), y: py.toFixed(1), 'text-anchor': anchor });
    };
    // Each name stands where its region is.
    const early = pitch.findIndex((deg) => deg >= 6);
    const high = holds[early] > slowest[early];
    put(labels.holds, high ? words.holds : '', x(6.5), (y(holds[early]) + y(slowest[early])) / 2 + em * 0.35);
    const steep = pitch.findIndex((deg) => deg >= 36);
    put(labels.slow, words.slow, box.right - em * 0.5, y(slowest[steep] * 0.45) + em * 0.35, 'end');
    const widest = widestGap(pitch, floor(marginal), floor(top), y);
    put(labels.washes, widest.gap > em * 1.3 ? words.washes : '', Math.max(box.left + em * 3, Math.min(box.right - em * 3, x(widest.deg))), widest.middle + em * 0.35);
    put(labels.fast, carves[0] === null ? '' : words.fast, x(pitch.at(-1) * 0.5), Math.min(y(top[0]) - em * 0.9, (box.top + y(top[0])) / 2 + em * 0.35));
    put(labels.pitch, words.pitch, box.right, height - em * 0.25, 'end');
    put(labels.speed, words.speed, 2, em * 0.95, 'start');
  }

  return {
    node,
    update,
    /** Pitch and speed at a place on the picture, kept inside it. */
    valueAt(px, py) {
      if (!scale) return null;
      const { box, pitchOf, speedOf } = scale;
      return {
        pitchDeg: pitchOf(Math.max(box.left, Math.min(box.right, px))),
        speedMps: speedOf(Math.max(box.top, Math.min(box.bottom, py))),
      };
    },
  };
}

/** The area between two curves, where the second is above the first. */
function area(columns, y) {
  const open = columns.filter(([, low, high]) => high > low);
  if (open.length < 2) return null;
  const upper = open.map(([x, , high]) => [x, y(high)]);
  const lower = open.map(([x, low]) => [x, y(low)]).reverse();
  return `M${[...upper, ...lower].map(at).join('L')}Z`;
}

/** Where two curves are furthest apart on the screen. */
function widestGap(pitch, low, high, y) {
  return pitch.reduce((best, deg, i) => {
    const gap = y(low[i]) - y(high[i]);
    return gap > best.gap ? { gap, deg, middle: (y(low[i]) + y(high[i])) / 2 } : best;
  }, { gap: 0, deg: 0, middle: 0 });
}
