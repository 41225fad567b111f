/** The verdict on a board: a word as large as the screen allows, its reason under it. */

import { el, setAttribute, setText } from '../dom.js';
import { t } from '../text.js';
import { emsWide } from './turn-verdict.js';

/** A verdict that stands this long is read out, ms. */
const SETTLED_MS = 900;

export function createBoardVerdict() {
  const word = el('p', { class: 'verdict-word' });
  const reason = el('span', { class: 'why' });
  const remedy = el('strong', { class: 'fix' });
  const live = el('p', { class: 'visually-hidden', 'aria-live': 'polite' });
  const node = el('div', { class: 'verdict', 'data-verdict': 'none' }, word,
    el('span', { class: 'verdict-stroke', 'aria-hidden': 'true' }), el('p', { class: 'says' }, reason, ' ', remedy), live);
  const echoes = [];
  let timer = 0;

  return {
    node,
    /**
     * @param {string|null} verdict the engine's; null: none yet
     * @param {string} why
     * @param {string} fix
     * @param {boolean} old not to what is set now
     */
    update(verdict, why, fix, old) {
      const text = t(verdict ? `board.verdict.${verdict}` : 'board.verdict.none');
      if (word.textContent !== text) {
        setText(word, text);
        word.style.setProperty('--ems', emsWide(text).toFixed(2));
      }
      setAttribute(word, 'data-answer', verdict ? 'boards.0.verdict' : null);
      setAttribute(node, 'data-verdict', verdict ?? 'none');
      setAttribute(node, 'data-old', Boolean(verdict) && old);
      setText(reason, why);
      setText(remedy, fix);
      for (const echo of echoes) setText(echo, verdict ? text : '');
      const said = `${text}. ${why} ${fix}`.trim();
      if (old || said === live.textContent) return;
      clearTimeout(timer);
      timer = setTimeout(() => setText(live, said), SETTLED_MS);
    },
    /** The verdict in short for a sheet that covers it. */
    echo() {
      const echo = el('span');
      echoes.push(echo);
      return el('p', { class: 'echo' }, echo);
    },
  };
}
