/** The speed window over pitch: seen, tapped and dragged; beside it the speeds that people ride. */

import { el, keepPointer, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { createMeasured } from '../pictures/measured.js';
import { createWindowPicture } from '../pictures/window.js';
import { formatNumber, t } from '../text.js';
import { show, unitOf } from '../units.js';
import { createPresets } from './presets.js';
import { createSheet } from './sheet.js';

/** What the picture reaches to. */
const PITCH_TO_DEG = 50;
const STEEPEST = ['holds', 'marginal', 'carves'];

/** @param {{store: any, engine: any, echo: () => Node, onChange: () => void, reference: {answer: any}}} given */
export function createWindowSheet({ store, engine, echo, onChange, reference }) {
  const picture = createWindowPicture();
  const handles = { pitch: handle('pitch', 'pitch_deg', 'horizontal'), speed: handle('speed', 'speed_mps', 'vertical') };
  const box = createMeasured('window-box', picture.node, draw);
  box.node.append(handles.pitch, handles.speed);
  for (const [type, listener] of Object.entries({ pointerdown: grabbed, pointermove: dragged, pointerup: dropped, pointercancel: dropped })) {
    box.node.addEventListener(type, listener);
  }
  const waiting = el('p', { text: t('window.waiting') });
  const from = createFigure('speedWindow');
  const to = createFigure('speedWindow');
  const here = el('p', { class: 'window' }, from.node, ` ${t('figure.window.to')} `, to.node);
  const hereTitle = el('h3', { text: t('window.onPitch') });
  const hereNone = el('p', { text: t('window.onPitch.none') });
  const steepest = STEEPEST.map((name) => ({ name, figure: createFigure('pitch') }));
  const rows = el('dl', { class: 'rows', 'data-ask': 'window' }, ...steepest.map(({ name, figure }) =>
    el('div', { class: 'row' }, el('dt', { text: t(`window.steepest.${name}`) }), el('dd', {}, figure.node))));
  const presets = createPresets(store);
  const sheet = createSheet('window', echo(), waiting, box.node, el('p', { class: 'aside', text: t('window.help') }),
    hereTitle, here, hereNone, presets.node, rows);

  let asked = '';
  let contours = null;
  let drawn = null;
  /** Highest speed of the picture; it stands while a finger is on it. */
  let topMps = 0;

  async function ask(inputs) {
    const { pitch_deg: _pitch, speed_mps: _speed, ...others } = inputs;
    const wanted = JSON.stringify(others);
    if (wanted === asked) return;
    asked = wanted;
    try {
      // The picture is the same for every point in it.
      const answer = await engine.ask('turn-window', { ask: 'window', ...others, pitch_deg: 0, speed_mps: 0, highest_pitch_deg: PITCH_TO_DEG });
      if (answer === null || answer.error) return;
      contours = answer;
      onChange();
    } catch {
      // The engine has failed; the view says so.
    }
  }

  function put(pitchDeg, speedMps) {
    const { units } = store.get();
    const stepped = (kind, value) => {
      const unit = unitOf(kind, units);
      return unit.read(Math.round(unit.show(value) / unit.step) * unit.step);
    };
    store.set({ inputs: {
      pitch_deg: Math.max(0, Math.min(PITCH_TO_DEG, stepped('pitch', pitchDeg))),
      speed_mps: Math.max(0, stepped('speed', speedMps)),
    } }, { undo: 'window' });
  }
  function place(event) {
    const rect = picture.node.getBoundingClientRect();
    const value = picture.valueAt(event.clientX - rect.left, event.clientY - rect.top);
    if (value) put(value.pitchDeg, value.speedMps);
  }
  function grabbed(event) {
    if (event.button !== 0 || !contours) return;
    keepPointer(box.node, event);
    store.seal();
    place(event);
  }
  function dragged(event) {
    if (box.node.hasPointerCapture(event.pointerId)) place(event);
  }
  function dropped() {
    store.seal();
  }

  /** A line of the cross as a slider, for keys and screen readers; both arrows work on either. */
  function handle(name, key, orientation) {
    return el('div', { class: `handle ${name}`, role: 'slider', tabindex: '0', 'data-question': key, 'aria-orientation': orientation,
      'aria-label': t(name === 'pitch' ? 'window.setPitch' : 'window.setSpeed'), on: { keydown: keyed } });
  }
  function keyed(event) {
    const move = { ArrowRight: [1, 0], ArrowLeft: [-1, 0], ArrowUp: [0, 1], ArrowDown: [0, -1] }[event.key];
    const { inputs: { pitch_deg: pitch, speed_mps: speed }, units } = store.get();
    if (!move || typeof pitch !== 'number' || typeof speed !== 'number') return;
    event.preventDefault();
    const moved = (kind, value, by) => {
      const unit = unitOf(kind, units);
      return unit.read(unit.show(value) + by * unit.step);
    };
    put(moved('pitch', pitch, move[0]), moved('speed', speed, move[1]));
  }

  function draw(size) {
    if (!drawn) return;
    const { inputs, units } = drawn;
    const mine = typeof inputs.pitch_deg === 'number' && typeof inputs.speed_mps === 'number'
      ? { pitchDeg: inputs.pitch_deg, speedMps: inputs.speed_mps } : null;
    const dragging = box.node.matches(':active') && topMps > 0;
    const unit = unitOf('speed', units);
    if (!dragging) {
      const most = Math.max(contours.slowest_mps.at(-1), ...contours.marginal_mps, ...contours.carves_mps.map((value) => value ?? 0)) * 1.3;
      topMps = unit.read(Math.ceil(unit.show(Math.min(40, Math.max(most, (mine?.speedMps ?? 0) * 1.08))) / 5) * 5);
    }
    const step = [1, 2, 5, 10, 20, 50].find((one) => unit.show(topMps) / one <= 7);
    const speeds = Array.from({ length: Math.floor(unit.show(topMps) / step + 1e-6) }, (_, i) => (i + 1) * step)
      .map((shown) => ({ value: unit.read(shown), text: formatNumber(shown) }));
    const pitches = [0, 10, 20, 30, 40].map((value) => ({ value, text: show('pitch', value, units) }));
    picture.update({ contours, point: mine, topMps, pitches, speeds, words: {
      holds: t('window.holds'), washes: t('window.washes'), slow: t('window.slow'), fast: t('window.fast'),
      pitch: t('window.pitch'), speed: t(unit.label),
    } }, size);
  }

  return {
    ...sheet,
    update({ state: { inputs, units }, kept }) {
      ask(inputs);
      setShown(waiting, contours === null);
      setShown(box.node, contours !== null);
      presets.update(reference.answer, units);
      if (!contours || !kept) return;
      drawn = { inputs, units };
      box.redraw();
      const { hold_speed_mps: hold, verdict } = kept.answer;
      from.update(kept.answer, 'hold_speed_mps.min', units);
      to.update(kept.answer, 'hold_speed_mps.max', units);
      setShown(here, hold !== null);
      setShown(hereTitle, hold !== null);
      setShown(hereNone, hold === null);
      for (const { name, figure } of steepest) figure.update(contours, `steepest_deg.${name}`, units);
      const pitch = typeof inputs.pitch_deg === 'number' ? show('pitch', inputs.pitch_deg, units) : '–';
      const speed = typeof inputs.speed_mps === 'number' ? show('speed', inputs.speed_mps, units) : '–';
      const steep = (name) => (contours.steepest_deg[name] === null ? t('window.nowhere') : show('pitch', contours.steepest_deg[name], units));
      setAttribute(picture.node, 'aria-label', t('window.picture.label', {
        pitch, speed, state: t(`state.${verdict}`), holds: steep('holds'), carves: steep('carves'),
        here: hold ? t('window.here', { from: show('speedWindow', hold.min, units), to: show('speedWindow', hold.max, units) }) : t('window.hereNone'),
      }));
      setAttributes(handles.pitch, { 'aria-valuemin': 0, 'aria-valuemax': PITCH_TO_DEG, 'aria-valuenow': Number(inputs.pitch_deg) || 0, 'aria-valuetext': `${pitch}, ${t(`state.${verdict}`)}` });
      setAttributes(handles.speed, { 'aria-valuemin': 0, 'aria-valuemax': 40, 'aria-valuenow': Number(inputs.speed_mps) || 0, 'aria-valuetext': `${speed}, ${t(`state.${verdict}`)}` });
      setText(hereTitle, t('window.onPitch'));
    },
  };
}
