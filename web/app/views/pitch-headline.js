/** What happens after a fall, in words as large as the screen allows; read out once when settled. */

import { el, setAttribute, setText } from '../dom.js';
import { t } from '../text.js';
import { down, headline, reason, up } from './pitch-words.js';
import { emsWide } from './turn-verdict.js';

/** A headline that stands this long is read out, ms. */
const SETTLED_MS = 900;

export function createHeadline() {
  const parts = [el('span'), el('span'), el('span'), el('span'), el('span')];
  const word = el('h2', { class: 'verdict-word' }, el('span', {}, ...parts));
  const says = el('p', { class: 'says' });
  const live = el('p', { class: 'visually-hidden', 'aria-live': 'polite' });
  const node = el('div', { class: 'verdict' }, word, el('span', { class: 'verdict-stroke', 'aria-hidden': 'true' }), says, live);
  let timer = 0;

  /** Texts with, at odd places, the figures' keys in the answer. */
  function setWord(pieces) {
    parts.forEach((part, i) => {
      const { text = '', key = null } = pieces[i] ?? {};
      setText(part, text);
      setAttribute(part, 'data-answer', key);
    });
    word.style.setProperty('--ems', emsWide(word.textContent).toFixed(2));
  }

  function announceSoon() {
    const text = `${word.textContent}. ${says.textContent}`;
    clearTimeout(timer);
    if (live.textContent !== text) timer = setTimeout(() => setText(live, text), SETTLED_MS);
  }

  return {
    node,
    /** How things stand while there is no answer. */
    say(text) {
      setWord([{ text: t('pitch.headline.wait') }]);
      setText(says, text);
      setAttribute(node, 'data-slide', 'wait');
    },
    /** @param {boolean} old the answer is not to what is set now */
    update(answer, units, old) {
      const { text, slide } = headline(answer, units);
      setWord(headlinePieces(answer, units, text));
      setText(says, reason(answer, units));
      setAttribute(node, 'data-slide', slide);
      setAttribute(node, 'data-old', old);
      if (!old) announceSoon();
    },
  };
}

/** A headline's text in pieces, those that are figures with their key. */
export function headlinePieces(answer, units, text = headline(answer, units).text) {
  const { low, high } = answer.band.distance_m;
  return text.split(/(\{\w+\})/).map((piece) => {
    if (piece === '{low}') return { text: down('slope', low, units, true), key: 'band.distance_m.low' };
    if (piece === '{high}') return { text: up('slope', high, units), key: 'band.distance_m.high' };
    return { text: piece };
  });
}
