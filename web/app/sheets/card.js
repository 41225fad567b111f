/**
 * The card: one page about one slope, black on white whatever the look, to be held up, handed on
 * and printed.
 */

import { el, setAttribute, setShown, setText, svg } from '../dom.js';
import { createProfile } from '../pictures/profile.js';
import { t } from '../text.js';
import { cardContent } from '../views/pitch-card.js';
import { headlinePieces } from '../views/pitch-headline.js';
import { LONGEST_NAME, pitchLink } from '../views/pitch-link.js';
import { createWayKey } from '../views/pitch-picture.js';
import { profileLabel, shownProfile } from '../views/pitch-shown.js';
import { pitchOf } from '../views/pitch-state.js';
import { emsWide } from '../views/turn-verdict.js';
import { cardImage } from './card-image.js';

/** @param {ReturnType<import('../store.js').createStore>} store */
export function createCardSheet(store) {
  const name = el('h2', { class: 'card-name', id: 'card-title', tabindex: '-1', autofocus: true });
  const demo = el('p', { class: 'card-demo', text: t('pitch.demo.card') });
  const old = el('p', { class: 'card-demo' });
  const word = el('p', { class: 'card-word' });
  const says = el('p', { class: 'card-says' });
  const profile = createProfile(false);
  const drawing = el('div', { class: 'card-drawing' }, profile.node);
  const key = createWayKey();
  const cautions = el('div', { class: 'card-cautions' });
  const sentences = el('ol', { class: 'card-sentences' });
  const numbers = el('dl', { class: 'card-numbers' });
  const inputs = el('p');
  const sources = el('ul');
  const date = el('p', { class: 'card-date' });
  const part = (key, ...content) => el('section', { class: `card-part card-${key}` }, el('h3', { text: t(`card.${key}`) }), ...content);
  const page = el('article', { class: 'card-page' }, name, demo, old, word, says, drawing, key.node, cautions,
    part('words', sentences), part('numbers', numbers), part('inputs', inputs), part('sources', sources), date);
  const field = el('input', {
    type: 'text', class: 'card-field', id: 'card-name-field', maxlength: LONGEST_NAME, autocomplete: 'off',
    placeholder: t('card.name.placeholder'),
    on: { input: () => store.set({ pitch: { name: field.value } }, { undo: 'card' }), change: () => store.seal() },
  });
  const said = el('p', { class: 'card-said', role: 'status' });
  const address = el('input', { type: 'text', class: 'card-field', readonly: true, hidden: true, 'aria-label': t('card.share.link'), on: { focus: () => address.select() } });
  const button = (key, act) => el('button', { type: 'button', class: 'card-button', text: t(key), on: { click: act } });
  const tools = el('div', { class: 'card-tools' },
    el('label', { for: 'card-name-field', text: t('card.name') }), field, said, address,
    el('div', { class: 'card-buttons', role: 'group', 'aria-label': t('card.actions') },
      button('card.share.image', shareImage), button('card.share.link', shareLink), button('card.print', () => print()),
      button('sheet.close', () => dialog.close())));
  const dialog = el('dialog', { class: 'card', id: 'sheet-card', 'aria-labelledby': 'card-title' },
    el('div', { class: 'card-scroll', tabindex: '0', role: 'region', 'aria-labelledby': 'card-title' }, page), tools);
  document.body.append(dialog);

  let drawn = null;
  let content = null;
  function draw() {
    if (!drawn || !drawing.clientWidth) return;
    const em = parseFloat(getComputedStyle(drawing).fontSize);
    profile.update(shownProfile(drawn.answer, drawn.units), { width: drawing.clientWidth, height: drawing.clientHeight, em });
  }
  new ResizeObserver(draw).observe(drawing);

  async function shareImage() {
    try {
      const titles = Object.fromEntries(['words', 'numbers', 'inputs', 'sources'].map((key) => [key, t(`card.${key}`)]));
      const blob = await cardImage(content, { ...titles, demo: t('pitch.demo.card') }, profile.node);
      const file = new File([blob], `${t('card.file')}.png`, { type: 'image/png' });
      if (navigator.canShare?.({ files: [file] })) {
        await navigator.share({ files: [file], title: content.name });
        return;
      }
      const url = URL.createObjectURL(blob);
      el('a', { href: url, download: file.name }).click();
      setTimeout(() => URL.revokeObjectURL(url), 60_000);
      setText(said, t('card.imageSaved'));
    } catch (problem) {
      if (problem.name !== 'AbortError') setText(said, t('card.failed'));
    }
  }

  async function shareLink() {
    const url = pitchLink(store.get());
    try {
      if (navigator.canShare?.({ url })) {
        await navigator.share({ url, title: content.name });
        return;
      }
      await navigator.clipboard.writeText(url);
      setText(said, t('card.linkCopied'));
    } catch (problem) {
      if (problem.name === 'AbortError') return;
      setText(said, t('card.linkShown'));
    }
    address.value = url;
    setShown(address, true);
  }

  return {
    dialog,
    open() {
      if (!store.get().answers.pitch) return;
      setText(said, '');
      setShown(address, false);
      dialog.showModal();
    },
    /** @param {string} stale why the answer is not to what is set; empty: it is */
    update(state, stale) {
      if (!dialog.open) return;
      const { answer } = state.answers.pitch;
      content = cardContent(state);
      setText(name, content.name);
      if (field.value !== pitchOf(state).name) field.value = pitchOf(state).name;
      setShown(demo, content.demo);
      setShown(old, Boolean(stale));
      setText(old, stale ? t('card.old') : '');
      word.replaceChildren(...headlinePieces(answer, state.units).map(({ text, key }) => el('span', { text, 'data-answer': key ?? null })));
      word.style.setProperty('--ems', emsWide(content.headline).toFixed(2));
      setText(says, content.reason);
      key.update(answer, state.units);
      sentences.replaceChildren(...content.sentences.map((text) => el('li', { text })));
      numbers.replaceChildren(...content.numbers.map(([label, value]) => el('div', {}, el('dt', { text: label }), el('dd', { text: value }))));
      cautions.replaceChildren(...content.cautions.map((text, i) => el('p', {}, i === 1 ? sign() : null, el('span', { text }))));
      setText(inputs, content.inputs);
      sources.replaceChildren(...content.sources.map((text) => el('li', { text })));
      setText(date, content.date);
      setAttribute(profile.node, 'aria-label', profileLabel(answer, state.units));
      if (drawn?.answer !== answer || drawn.units !== state.units) {
        drawn = { answer, units: state.units };
        draw();
      }
    },
  };
}

/** General warning sign of ISO 7010, W001. */
function sign() {
  return svg('svg', { class: 'warning-sign', viewBox: '0 0 100 90', role: 'img', 'aria-label': t('caution.sign') },
    svg('path', { class: 'border', d: 'M50 4 97 86H3Z' }), svg('path', { class: 'field', d: 'M50 19 84 78H16Z' }),
    svg('path', { class: 'mark', d: 'M45 36h10l-2 24h-6Z' }), svg('circle', { class: 'mark', cx: 50, cy: 69, r: 5 }));
}
