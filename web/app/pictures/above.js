/**
 * The turn from above, the fall line down the page: thick where the edge holds, thin and dashed
 * where it is close, broken where it is gone, so that it reads in grey.
 */

import { svg, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { at, line, moved, polygon } from './geometry.js';

/** Stroke of each state. */
const STROKES = { holds: 'holds', marginal: 'marginal', washes_out: 'gone', too_slow: 'gone', too_fast: 'gone' };
const RADIANS = Math.PI / 180;

/**
 * Path text of the stretches of a path in one stroke. Each point owns the path to the middle
 * between it and its neighbours.
 * @param {import('./geometry.js').Point[]} points
 * @param {string[]} strokes one a point
 * @param {string} wanted
 */
export function stretches(points, strokes, wanted) {
  const middle = (i, j) => [(points[i][0] + points[j][0]) / 2, (points[i][1] + points[j][1]) / 2];
  let d = '';
  let open = false;
  points.forEach((point, i) => {
    if (strokes[i] !== wanted) {
      if (open) d += `L${at(middle(i - 1, i))}`;
      open = false;
      return;
    }
    if (!open) d += `M${at(i ? middle(i - 1, i) : point)}`;
    open = true;
    d += `L${at(point)}`;
  });
  return d;
}

export function createAbove() {
  const part = (name) => svg('path', { class: name });
  const parts = {
    other: part('other'), gone: part('gone'), marginal: part('marginal'), holds: part('holds'),
    fallLine: part('fall-line'), fallHead: part('fall-head'), mark: part('mark'), cut: part('cut'),
  };
  const board = { rim: part('board rim'), deck: part('board') };
  const label = (name, ...lines) => svg('text', { class: `label ${name}` }, ...lines);
  const labels = { fallLine: label('small'), mark: label('', svg('tspan'), svg('tspan')), other: label('small'), line: label('') };
  const node = svg('svg', { class: 'above', focusable: 'false', 'aria-hidden': 'true' },
    ...Object.values(parts), ...Object.values(board), ...Object.values(labels));
  /** @type {import('./geometry.js').Point[]} the path that is drawn as the ride, on the screen */
  let ridden = [];

  /**
   * @param {object} shown
   * @param {{x_m: number[], y_m: number[]}} shown.path the ride
   * @param {string[]} shown.states state at each of its points
   * @param {number[]} shown.phases phase at each of its points, degrees
   * @param {{x_m: number[], y_m: number[]}|null} shown.other a second path, to compare
   * @param {string} shown.otherKind 'own' (the board's arc, gone) or 'wider' (a line that holds)
   * @param {number} shown.index which point the section shows
   * @param {number|null} shown.markIndex where it goes first
   * @param {{fallLine: string, mark: string, other: string, line: string}} shown.words
   * @param {{width: number, height: number, em: number}} size px
   */
  function update(shown, { width, height, em }) {
    const { path, other, states, phases, index, markIndex, words } = shown;
    setAttribute(node, 'viewBox', `0 0 ${width} ${height}`);
    const frame = { left: em * 1.9, top: 16, right: width - 18, bottom: height - 18 };
    const place = fitting([path, other].filter(Boolean), frame);
    ridden = place(path);
    const strokes = states.map((state) => STROKES[state]);
    for (const name of ['holds', 'marginal', 'gone']) {
      setAttribute(parts[name], 'd', stretches(ridden, strokes, name));
    }
    const otherPoints = other ? place(other) : null;
    setAttribute(parts.other, 'd', otherPoints && `M${otherPoints.map(at).join('L')}`);
    setAttribute(parts.other, 'data-kind', shown.otherKind);

    drawFallLine(em, (frame.top + frame.bottom) / 2, Math.min(44, height * 0.16), words.fallLine);

    const inward = (i) => [-Math.sin(phases[i] * RADIANS), Math.cos(phases[i] * RADIANS)];
    const here = ridden[index];
    const heading = [Math.cos(phases[index] * RADIANS), Math.sin(phases[index] * RADIANS)];
    setAttribute(parts.cut, 'd', line(moved(here, [inward(index), -15]), moved(here, [inward(index), 34])));
    const hull = line(moved(here, [heading, -11]), moved(here, [heading, 11]));
    for (const one of Object.values(board)) setAttribute(one, 'd', hull);

    /** Text at a point inside the turn, kept in the picture. */
    const put = (one, text, point) => {
      setShown(one, Boolean(text));
      if (!text) return;
      const wide = text.length * em * 0.5;
      setText(one, text);
      setAttributes(one, {
        x: Math.max(frame.left, Math.min(width - 4 - wide, point[0])).toFixed(1),
        y: Math.max(em, Math.min(height - 4, point[1] + em * 0.35)).toFixed(1),
      });
    };
    const inside = (points, i, text, off) => {
      const [x, y] = moved(points[i], [inward(i), off]);
      return [x - text.length * em * 0.5 * Math.min(1, 1.6 * Math.sin(phases[i] * RADIANS)), y];
    };
    const marked = markIndex === null ? null : ridden[markIndex];
    setAttribute(parts.mark, 'd', marked &&
      line(moved(marked, [inward(markIndex), -9]), moved(marked, [inward(markIndex), 9])));
    const glyph = [here, moved(here, [inward(index), 30]), moved(here, [heading, -12]), moved(here, [heading, 12])];
    const markAt = marked && putMark(words.mark);
    setShown(labels.mark, Boolean(marked));

    /** What goes at the mark, in two lines where the picture is narrow; gives the text's middle. */
    function putMark(text) {
      const lines = width < em * 13 ? text.split(' ') : [text];
      const longest = lines.reduce((long, one) => (one.length > long.length ? one : long));
      const wide = longest.length * em * 0.5;
      const last = ridden.length - 1;
      const near = [0, -3, -6, -9, -12, -16, 4].map((step) => Math.max(0, Math.min(last, markIndex + step)));
      const [x, y] = clear(near.map((i) => inside(ridden, i, longest, em * 1.5)), wide / 2,
        em * (0.8 + lines.length * 0.5), glyph);
      const left = Math.max(frame.left, Math.min(width - 4 - wide, x));
      const top = Math.max(em, y + em * 0.35 - (lines.length - 1) * em * 0.5);
      [...labels.mark.children].forEach((tspan, i) => {
        setText(tspan, lines[i] ?? '');
        setAttributes(tspan, { x: left.toFixed(1), y: (top + i * em * 1.05).toFixed(1) });
      });
      return [left + wide / 2, y];
    }

    // Names of the lines: where the board, the mark and the other line leave room.
    const taken = marked ? [...glyph, marked, markAt] : glyph;
    const named = (points, text, avoid) => {
      const spots = [0.8, 0.93, 0.66, 0.5, 0.28, 0.15].map((share) =>
        inside(points, Math.round((points.length - 1) * share), text, em * 1.1));
      return clear(spots, (text.length * em) / 4, em * 1.3, avoid);
    };
    // The board's own arc is the smaller one: named under its end.
    const own = otherPoints && shown.otherKind === 'own' ? moved(otherPoints.at(-1), [[0, 1], em * 0.9]) : null;
    put(labels.line, words.line, words.line && named(ridden, words.line, own
      ? [...taken, ...otherPoints, own, moved(own, [[1, 0], words.other.length * em * 0.5])] : taken));
    put(labels.other, otherPoints && words.other,
      own ?? (otherPoints && named(otherPoints, words.other, [...taken, ...ridden])));
  }

  function drawFallLine(em, middle, half, text) {
    for (const one of [parts.fallLine, parts.fallHead, labels.fallLine]) setShown(one, Boolean(text));
    if (!text) return;
    const x = em * 0.75;
    const tip = [x, middle + half + em * 1.6];
    setAttribute(parts.fallLine, 'd', line([x, middle + half + 4], [x, tip[1] - 8]) +
      line([x, middle - half - em * 1.6], [x, middle - half - 4]));
    setAttribute(parts.fallHead, 'd', polygon([tip, [x - 5, tip[1] - 10], [x + 5, tip[1] - 10]]));
    setText(labels.fallLine, text);
    setAttributes(labels.fallLine, {
      'text-anchor': 'middle', transform: `translate(${(x - em * 0.3).toFixed(1)} ${middle.toFixed(1)}) rotate(90)`,
    });
  }

  /** Index of the point of the ride that is nearest to a place on the picture. */
  function nearest(x, y) {
    let best = 0;
    let least = Infinity;
    ridden.forEach(([px, py], i) => {
      const distance = (px - x) ** 2 + (py - y) ** 2;
      if (distance < least) [least, best] = [distance, i];
    });
    return best;
  }

  return { node, update, nearest };
}

/**
 * The first spot whose text leaves `need` px to all that is to be avoided; else the one that leaves
 * most. `half`: half the text's width.
 */
function clear(spots, half, need, avoid) {
  const room = ([x, y]) => Math.min(...avoid.map(([ax, ay]) =>
    Math.hypot(Math.max(0, Math.abs(x + half - ax) - half), y - ay)));
  return spots.find((spot) => room(spot) >= need) ??
    spots.reduce((best, spot) => (room(spot) > room(best) ? spot : best));
}

/** How to place paths in metres into a frame: one scale for both ways, all of them inside. */
function fitting(paths, { left, top, right, bottom }) {
  const xs = paths.flatMap((path) => path.x_m);
  const ys = paths.flatMap((path) => path.y_m);
  const [x0, x1] = [Math.min(...xs), Math.max(...xs)];
  const [y0, y1] = [Math.min(...ys), Math.max(...ys)];
  const scale = Math.min((right - left) / (x1 - x0 || 1), (bottom - top) / (y1 - y0 || 1));
  const dx = left + (right - left - (x1 - x0) * scale) / 2 - x0 * scale;
  const dy = top + (bottom - top - (y1 - y0) * scale) / 2 - y0 * scale;
  return ({ x_m, y_m }) => x_m.map((x, i) => [dx + x * scale, dy + y_m[i] * scale]);
}
