/** The pictures of a board: from above with boots, the boot that touches, where the edge bites. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createBite } from '../pictures/bite.js';
import { createBoardPlan } from '../pictures/board.js';
import { createBootSection } from '../pictures/boot.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { firstToDrag } from './board-words.js';

/** @param {{onBoots: () => void, onBend: () => void}} given what an empty picture opens */
export function createBoardPictures({ onBoots, onBend }) {
  const plan = createBoardPlan();
  const section = createBootSection();
  const bite = createBite();
  const empty = (key, onClick) => el('button', { type: 'button', class: 'picture-empty', hidden: true, text: t(key), on: { click: onClick } });
  const noBoots = empty('board.add.boots', onBoots);
  const noBend = empty('board.add.bend', onBend);
  const failed = el('p', { class: 'picture-empty', hidden: true, text: t('board.bend.failed') });
  const boxes = {
    plan: el('div', { class: 'plan-box' }, plan.node),
    section: el('div', { class: 'boot-box' }, section.node, noBoots),
    bite: el('div', { class: 'bite-box' }, bite.node, noBend, failed),
  };
  const caption = el('p', { class: 'caption' });
  const node = el('div', { class: 'board-pictures' }, ...Object.values(boxes), caption);
  let drawn = null;
  const sizes = {};
  const observer = new ResizeObserver(() => {
    for (const [name, box] of Object.entries(boxes)) {
      sizes[name] = { width: box.clientWidth, height: box.clientHeight, em: parseFloat(getComputedStyle(box.querySelector('.label')).fontSize) };
    }
    draw();
  });
  for (const box of Object.values(boxes)) observer.observe(box);

  function draw() {
    if (!drawn || !sizes.plan?.width) return;
    const { answer, question, units } = drawn;
    const worst = firstToDrag(answer.boot);
    plan.update({ picture: answer.picture, boot: answer.boot, effectiveEdgeM: question.effective_edge_m, worst,
      write: (overhang) => show('small', overhang, units, { signed: true }), noseWord: t('board.picture.nose') }, sizes.plan);
    setShown(section.node, Boolean(answer.boot));
    if (answer.boot) {
      const { foot, end } = worst ?? { foot: 'rear', end: 'toe' };
      const opposite = end === 'toe' ? 'heel' : 'toe';
      const asked = answer.needed?.edge_angle_deg ?? null;
      const drag = worst?.deg ?? null;
      section.update({ side: { ...answer.boot[foot][end], isToe: end === 'toe' }, other: answer.boot[foot][opposite],
        widthM: answer.boot[foot].insert_width_m, dragDeg: drag, askedDeg: asked,
        words: { angle: show('angle', drag ?? Math.min(85, asked ?? 60), units),
          asked: asked === null ? '' : t('board.picture.asked', { edge: show('angle', asked, units) }) } }, sizes.section);
      const values = { end: t(`board.end.${foot}.${end}`), edge: show('angle', drag, units), asked: show('angle', asked, units) };
      setAttribute(section.node, 'aria-label', t(drag === null ? 'board.picture.section.clear' : 'board.picture.section', values));
    }
    const bent = answer.bend?.converged === true;
    setShown(bite.node, bent);
    if (bent) {
      const words = { label: t('board.picture.bites', { length: show('along', answer.bend.contact_length_m, units) }),
        tail: t('board.picture.tail'), nose: t('board.picture.nose') };
      bite.update({ picture: answer.bend.picture, contact: answer.bend.contact, words }, sizes.bite);
      setAttribute(bite.node, 'aria-label', t('board.picture.bite', { length: show('along', answer.bend.contact_length_m, units), depth: show('depth', answer.bend.max_depth_m, units) }));
    }
  }

  return {
    node,
    /** @param {{answer: any, question: any, units: any, old: string}|null} next `old`: why it is not the answer to what is set */
    update(next, old) {
      drawn = next;
      setAttribute(node, 'data-old', Boolean(old) && Boolean(next));
      setShown(noBoots, Boolean(next) && !next.answer.boot);
      setShown(noBend, Boolean(next) && !next.answer.bend);
      setShown(failed, next?.answer.bend?.converged === false);
      for (const { node: picture } of [plan, section, bite]) if (!next) setShown(picture, false);
      if (!next) {
        setText(caption, old);
        return;
      }
      setShown(plan.node, true);
      const { answer, units } = next;
      const { rear, front } = answer.picture.bindings_m;
      setAttribute(plan.node, 'aria-label', t('board.picture.plan', { stance: show('along', front - rear, units) }));
      setText(caption, old || t(answer.bend?.oval ? 'board.caption.oval' : 'board.caption', {
        edge: show('angle', answer.bend?.edge_angle_deg ?? null, units) }));
      draw();
    },
  };
}
