/** The verdict: a word as large as the screen allows, its reason under it, said once when settled. */

import { el, setAttribute, setText } from '../dom.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { why } from './turn-words.js';

/** A verdict that stands this long is read out, ms. */
const SETTLED_MS = 900;
/** The verdict's type, to measure its words in. */
const TYPE = '600 100px "Barlow Condensed", "Arial Narrow", sans-serif';

/** Width of a text in the verdict's type, in em. */
export const emsWide = (() => {
  const pen = document.createElement('canvas').getContext('2d');
  return (text) => {
    pen.font = TYPE;
    return pen.measureText(text).width / 100;
  };
})();

/** @param {{node: Node, text: () => string}} remedy what would make it hold, and its words */
export function createVerdict(remedy) {
  const word = el('p', { class: 'verdict-word' });
  const stroke = el('span', { class: 'verdict-stroke', 'aria-hidden': 'true' });
  const reason = el('p', { class: 'why' });
  const live = el('p', { class: 'visually-hidden', 'aria-live': 'polite' });
  const node = el('div', { class: 'verdict' }, word, stroke, el('div', { class: 'says' }, reason, remedy.node), live);
  const echoes = [];
  let inShort = '';
  let timer = 0;

  function setWord(text) {
    if (word.textContent === text) return;
    setText(word, text);
    word.style.setProperty('--ems', emsWide(text).toFixed(2));
  }

  function announce() {
    const text = `${word.textContent}. ${reason.textContent} ${remedy.text()}`.trim();
    for (const one of [live, ...echoes.map((echo) => echo.live)]) setText(one, text);
  }

  function announceSoon() {
    clearTimeout(timer);
    timer = setTimeout(announce, SETTLED_MS);
  }

  return {
    node,
    /** Says how things stand while there is no answer at all; empty: there is one. */
    say(text) {
      if (!text) return;
      setWord(t('verdict.none'));
      setText(reason, text);
      setAttribute(node, 'data-verdict', 'none');
    },
    /**
     * @param {any} answer
     * @param {import('../units.js').Units} units
     * @param {boolean} old the answer is not to what is set now
     */
    update(answer, units, old) {
      setWord(t(`verdict.${answer.verdict}`));
      setAttribute(word, 'data-answer', 'verdict');
      setAttribute(node, 'data-verdict', answer.verdict);
      setAttribute(node, 'data-old', old);
      setText(reason, answer.pivoted.some(Boolean) ? `${why(answer)} ${t('why.pivoted')}` : why(answer));
      const margin = show('share', answer.worst.grip_margin, units, { signed: true });
      inShort = answer.worst.grip_margin === null ? word.textContent
        : t('verdict.echo', { verdict: word.textContent, margin });
      for (const echo of echoes) setText(echo.seen, inShort);
      if (!old) announceSoon();
    },
    /** The verdict in short for a sheet that covers it; read out there when settled, too. */
    echo() {
      const echo = { seen: el('span', { 'aria-hidden': 'true', text: inShort }), live: el('span', { class: 'visually-hidden', 'aria-live': 'polite' }) };
      echoes.push(echo);
      return el('p', { class: 'echo' }, echo.seen, echo.live);
    },
  };
}
