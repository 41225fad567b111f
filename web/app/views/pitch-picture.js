/** The drawn slope, on which the place of the fall is chosen by sliding along the snow. */

import { el, keepPointer, setAttribute, setAttributes, setText, svg } from '../dom.js';
import { createProfile, WAYS } from '../pictures/profile.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { profileLabel, shownProfile } from './pitch-shown.js';
import { pitchText, wayText } from './pitch-words.js';

/** @param {{onPick: (place: number) => void, onSettled: () => void}} given `onPick`: m along the slope */
export function createPitchPicture({ onPick, onSettled }) {
  const profile = createProfile(true);
  const scrub = el('div', {
    class: 'slope', role: 'slider', tabindex: '0', 'aria-label': t('pitch.picture.place'), 'data-question': 'fall_at_m',
    on: { pointerdown: grabbed, pointermove: dragged, pointerup: onSettled, keydown: keyed, keyup: onSettled },
  }, profile.node);
  const words = el('p', { class: 'visually-hidden' });
  const captionText = el('p', { class: 'caption' });
  const key = createWayKey();
  const node = el('div', { class: 'pictures one' }, scrub, words, key.node, captionText);

  let drawn = null;
  let size = null;
  new ResizeObserver(() => {
    size = { width: scrub.clientWidth, height: scrub.clientHeight,
      em: parseFloat(getComputedStyle(scrub).getPropertyValue('font-size')) };
    draw();
  }).observe(scrub);

  const length = () => drawn.answer.legs.at(-1).end_m;
  /** Whole metres, or hundredths of a short slope; always before its end. */
  const step = () => Math.min(1, length() / 100);

  function pick(place) {
    const last = Math.ceil(length() / step() - 1) * step();
    onPick(Math.max(0, Math.min(last, Math.round(place / step()) * step())));
  }
  function grabbed(event) {
    if (!drawn || event.button !== 0) return;
    keepPointer(scrub, event);
    place(event);
  }
  function dragged(event) {
    if (drawn && scrub.hasPointerCapture(event.pointerId)) place(event);
  }
  function place(event) {
    pick(profile.placeAt(event.clientX - scrub.getBoundingClientRect().left));
  }
  function keyed(event) {
    if (!drawn) return;
    const at = drawn.answer.fall.at_m;
    const far = length() / 20;
    const target = {
      ArrowRight: at + step(), ArrowDown: at + step(), ArrowLeft: at - step(), ArrowUp: at - step(),
      PageDown: at + far, PageUp: at - far, Home: 0, End: length(),
    }[event.key];
    if (target === undefined) return;
    event.preventDefault();
    pick(target);
  }

  function draw() {
    if (drawn && size?.width) profile.update(shownProfile(drawn.answer, drawn.units), size);
  }

  return {
    node,
    /** @param {{answer: any, units: any, old: string, note: string}|null} next null: no answer yet */
    update(next) {
      setText(captionText, next ? next.old || next.note || t('pitch.caption') : '');
      setAttribute(captionText, 'data-demo', Boolean(next && !next.old && next.note));
      setAttribute(node, 'data-old', Boolean(next?.old));
      setAttribute(node, 'data-empty', !next);
      const known = drawn && next && drawn.answer === next.answer && drawn.units === next.units;
      drawn = next;
      if (!next || known) return;
      draw();
      const { answer, units } = next;
      const { at_m: place, leg } = answer.fall;
      key.update(answer, units);
      setText(words, profileLabel(answer, units));
      setAttributes(scrub, {
        'aria-valuemin': 0, 'aria-valuemax': Math.floor(length()), 'aria-valuenow': Math.round(place),
        'aria-valuetext': t('pitch.picture.placeValue', {
          place: show('slope', place, units), leg: leg + 1, pitch: pitchText(answer.legs[leg].pitch_deg, units),
        }),
      });
    },
  };
}

/** Which line is which, and where each slide ends. */
export function createWayKey() {
  const figures = WAYS.map(() => el('span'));
  const node = el('ul', { class: 'way-key', 'aria-label': t('pitch.key') }, ...WAYS.map((way, i) => el('li', {},
    svg('svg', { class: 'profile way-sample', viewBox: '0 0 34 10', 'aria-hidden': 'true', focusable: 'false' },
      svg('path', { class: way, d: 'M0 5H34' })), ' ', figures[i])));
  return {
    node,
    update(answer, units) {
      answer.levels.forEach((level, i) => {
        setText(figures[i], wayText(level, units));
        setAttribute(figures[i], 'data-answer', `levels.${i}.${level.stops ? 'distance_m' : 'end_speed_mps'}`);
      });
    },
  };
}
