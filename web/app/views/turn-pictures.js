/** The two pictures of a turn, and the scrubber that looks at any place in it. */

import { el, keepPointer, setAttribute, setAttributes, setShown, setText } from '../dom.js';
import { createAbove } from '../pictures/above.js';
import { createSection } from '../pictures/section.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { caption, placeText, sectionLabel } from './turn-words.js';

/** @param {{onPick: (index: number|null) => void}} given `onPick` null: back to the tightest point */
export function createTurnPictures({ onPick }) {
  const section = createSection();
  const above = createAbove();
  const scrub = el('div', {
    class: 'scrub', role: 'slider', tabindex: '0', 'aria-label': t('picture.above.label'), 'aria-orientation': 'vertical',
    on: { pointerdown: grabbed, pointermove: dragged, keydown: keyed },
  }, above.node);
  const back = el('button', { type: 'button', class: 'back', hidden: true, text: t('picture.back'), 'aria-label': t('picture.backLabel'), on: { click: () => onPick(null) } });
  const sectionBox = el('div', { class: 'section-box' }, section.node, back);
  const captionText = el('p', { class: 'caption' });
  const node = el('div', { class: 'pictures' }, sectionBox, scrub, captionText);

  let drawn = null;
  let bare = null;
  /** Sizes of the boxes and of the labels' type, px; measured only when they change. */
  const size = {};
  const measure = (box) => ({
    width: box.clientWidth, height: box.clientHeight,
    em: parseFloat(getComputedStyle(box.querySelector('.label')).fontSize),
  });
  const observer = new ResizeObserver(() => {
    size.section = measure(sectionBox);
    size.above = measure(scrub);
    draw();
  });
  observer.observe(sectionBox);
  observer.observe(scrub);

  function place(event) {
    const box = above.node.getBoundingClientRect();
    onPick(above.nearest(event.clientX - box.left, event.clientY - box.top));
  }
  function grabbed(event) {
    if (!drawn || event.button !== 0) return;
    keepPointer(scrub, event);
    place(event);
  }
  function dragged(event) {
    if (drawn && scrub.hasPointerCapture(event.pointerId)) place(event);
  }
  function keyed(event) {
    if (!drawn) return;
    const last = drawn.shown.phases.length - 1;
    const { index } = drawn.shown;
    const target = {
      ArrowRight: index + 1, ArrowDown: index + 1, ArrowLeft: index - 1, ArrowUp: index - 1,
      PageDown: index + 3, PageUp: index - 3, Home: 0, End: last, Escape: null,
    }[event.key];
    if (target === undefined) return;
    event.preventDefault();
    onPick(target === null ? null : Math.max(0, Math.min(last, target)));
  }

  function draw() {
    if (!size.section?.width) return;
    if (!drawn && bare) section.update(bare, size.section);
    if (!drawn) return;
    const { shown, answer, question, units } = drawn;
    section.update({
      tiltDeg: shown.tiltDeg, limitDeg: shown.limitDeg, leanDeg: shown.leanDeg,
      edgeDeg: shown.edgeDeg, margin: shown.margin,
      words: { lean: t('picture.lean'), edge: t('picture.edge'), force: t('picture.force'),
        limit: shown.limit ? t(`limit.${shown.limit}`) : '', none: t('picture.noBalance') },
    }, size.section);
    const radius = answer.drift && show('tightest', answer.drift.line_radius_m, units);
    above.update({
      path: shown.path, states: shown.states, phases: shown.phases, index: shown.index,
      other: shown.other, otherKind: shown.drifts ? 'own' : 'wider', markIndex: shown.failIndex,
      words: {
        fallLine: question.pitch_deg > 0 ? t('picture.fallLine') : '',
        mark: shown.failIndex === null ? '' : t(`state.${shown.states[shown.failIndex]}`),
        other: shown.drifts ? t('picture.ownArc') : t('picture.wider', { radius }),
        line: shown.drifts ? radius : '',
      },
    }, size.above);
  }

  return {
    node,
    /** The hill alone, while there is no answer. */
    preview(pitchDeg) {
      if (drawn) return;
      bare = { tiltDeg: pitchDeg, limitDeg: null, leanDeg: null, edgeDeg: null, margin: null, words: { none: '' } };
      draw();
    },
    /** @param {{shown: any, answer: any, question: any, units: any, old: string}} next `old`: why this
     *   is not the answer to what is set; empty: it is */
    update(next) {
      drawn = next;
      const { shown, answer, units, old } = next;
      draw();
      setAttribute(node, 'data-old', Boolean(old));
      setShown(back, shown.picked);
      setText(captionText, old || caption(shown, answer, units));
      setAttribute(section.node, 'aria-label', sectionLabel(shown, answer, units));
      setAttributes(scrub, {
        'aria-valuemin': shown.phases[0], 'aria-valuemax': shown.phases.at(-1),
        'aria-valuenow': shown.phases[shown.index], 'aria-valuetext': placeText(shown, units),
      });
    },
  };
}
