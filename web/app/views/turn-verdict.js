/** The verdict: a word as large as the screen allows, its reason under it, said once when settled. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createFigure } from '../figure.js';
import { t } from '../text.js';
import { show } from '../units.js';
import { fix, why } from './turn-words.js';

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

export function createVerdict() {
  const word = el('p', { class: 'verdict-word' });
  const stroke = el('span', { class: 'verdict-stroke', 'aria-hidden': 'true' });
  const reason = el('span', { class: 'why' });
  const figures = { length: createFigure('length'), speedWindow: createFigure('speedWindow') };
  const [before, after] = [el('span'), el('span')];
  const remedy = el('strong', { class: 'fix' }, before, figures.length.node, figures.speedWindow.node, after);
  const live = el('p', { class: 'visually-hidden', 'aria-live': 'polite' });
  const node = el('div', { class: 'verdict' }, word, stroke, el('p', { class: 'says' }, reason, ' ', remedy), live);
  const echoes = [];
  let timer = 0;

  function setWord(text) {
    if (word.textContent === text) return;
    setText(word, text);
    word.style.setProperty('--ems', emsWide(text).toFixed(2));
  }

  function announce() {
    // What is seen: of the remedy, not the figures that are hidden.
    const text = `${word.textContent}. ${reason.textContent} ${remedy.innerText}`.trim();
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
      for (const figure of Object.values(figures)) setShown(figure.node, false);
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
      setText(reason, why(answer));
      const { text, kind, key } = fix(answer);
      const [start, end = ''] = text.split('{figure}');
      setText(before, start);
      setText(after, end);
      for (const [name, figure] of Object.entries(figures)) {
        setShown(figure.node, name === kind);
        if (name === kind) figure.update(answer, key, units);
        else setAttribute(figure.node, 'data-answer', null);
      }
      const margin = show('share', answer.worst.grip_margin, units, { signed: true });
      for (const echo of echoes) {
        setText(echo.seen, answer.worst.grip_margin === null ? word.textContent
          : t('verdict.echo', { verdict: word.textContent, margin }));
      }
      if (!old) announceSoon();
    },
    /** The verdict in short for a sheet that covers it; read out there when settled, too. */
    echo() {
      const echo = { seen: el('span', { 'aria-hidden': 'true' }), live: el('span', { class: 'visually-hidden', 'aria-live': 'polite' }) };
      echoes.push(echo);
      return el('p', { class: 'echo' }, echo.seen, echo.live);
    },
  };
}
