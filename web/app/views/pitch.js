/**
 * The Pitch view: what a slope asks before anyone turns. Where a fall ends, how fast it gets, what
 * standing and stopping take, over one to ten legs. The contract of a view: views/turn.js.
 */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { createCardSheet } from '../sheets/card.js';
import { createPitchFiguresSheet } from '../sheets/pitch-figures.js';
import { createPitchLegSheet } from '../sheets/pitch-leg.js';
import { createPitchRiderSheet } from '../sheets/pitch-rider.js';
import { createSnowSheet } from '../sheets/snow.js';
import { hasText, t } from '../text.js';
import { show } from '../units.js';
import { createPitchFigures } from './pitch-figures.js';
import { createHeadline } from './pitch-headline.js';
import { createLegs } from './pitch-legs.js';
import { ownNumber } from './pitch-own.js';
import { createPitchPicture } from './pitch-picture.js';
import { pitchOf, pitchQuestion, unfinishedLeg } from './pitch-state.js';
import { sentenceText } from './pitch-words.js';

/**
 * @param {HTMLElement} host
 * @param {{store: ReturnType<import('../store.js').createStore>, engine: any}} context
 */
export function createPitchView(host, { store, engine }) {
  const headline = createHeadline();
  const figures = createPitchFigures();
  const picture = createPitchPicture({
    onPick: (place) => store.set({ pitch: { fall_at_m: place, notice: null } }, { undo: 'fall_at_m' }),
    onSettled: store.seal,
  });
  const notice = el('p', { class: 'notice', role: 'alert', hidden: true });
  const legSheet = createPitchLegSheet(store);
  const legs = createLegs(store, { onMore: () => { legSheet.open(); render(); } });
  const speed = ownNumber(store, { key: 'speed_mps', text: 'fall_speed', kind: 'speed', span: [0, 25],
    aside: el('span', { text: t('pitch.speed.note') }) });
  const snowSheet = createSnowSheet(store, null, 'pitch-snow');
  const riderSheet = createPitchRiderSheet(store);
  const figuresSheet = createPitchFiguresSheet();
  const card = createCardSheet(store);
  const snow = dockButton('sheet.snow', snowSheet.open);
  const rider = dockButton('dock.rider', () => { riderSheet.open(); render(); });
  const more = dockButton('dock.more', () => { figuresSheet.open(); render(); });
  const shown = dockButton('pitch.dock.show', () => { card.open(); render(); });
  const undo = dockButton('undo', () => store.undo());
  setText(more.value, t('dock.figures'));
  setText(shown.value, t('pitch.dock.card'));
  const sentences = [el('li'), el('li'), el('li')];
  const words = el('section', { class: 'words', 'aria-labelledby': 'pitch-words' },
    el('h2', { id: 'pitch-words', text: t('pitch.words') }), el('ol', {}, ...sentences),
    el('p', { class: 'aside', text: t('caution.1') }), el('p', { class: 'avalanche', text: t('caution.2') }));

  host.append(
    el('div', { class: 'look' }, notice, headline.node, figures.node, picture.node),
    el('div', { class: 'set' }, legs.node, speed.node,
      el('div', { class: 'dock five' }, snow.node, rider.node, more.node, shown.node, undo.node), words));

  let asked = '';
  let errors = [];

  async function ask(question) {
    try {
      const answer = await engine.ask('pitch', question);
      if (answer === null) return;
      errors = answer.error ?? [];
      if (answer.error) render();
      else store.set({ answers: { pitch: { question, answer } } });
    } catch {
      // The engine has failed; main.js hears of it and has the view updated.
    }
  }

  function update(state) {
    const question = pitchQuestion(state);
    const wanted = JSON.stringify(question);
    if (wanted !== asked) {
      asked = wanted;
      if (unfinishedLeg(pitchOf(state)) < 0) ask(question);
      else errors = [];
    }
    render();
  }

  function render() {
    const state = store.get();
    const { units, inputs } = state;
    const pitch = pitchOf(state);
    const complaints = errors.map((error) => readable(error, units));
    const kept = state.answers.pitch;
    const unfinished = unfinishedLeg(pitch);
    legs.update(state, complaints);
    speed.update(state, complaints);
    legSheet.update(state, kept?.answer);
    snowSheet.update(state);
    riderSheet.update(state, complaints);
    setText(snow.label, t('dock.snow', { snow: t(`snow.${inputs.snow}.short`) }));
    setText(snow.value, t(`snow.${inputs.snow}`));
    setText(rider.value, typeof inputs.rider_mass_kg === 'number' ? show('mass', inputs.rider_mass_kg, units) : '!');
    setAttribute(rider.node, 'data-wrong', errors.some(({ field }) => riderSheet.has(field)));
    const what = store.undoable();
    setText(undo.value, what ? undoName(what) : '–');
    setAttribute(undo.node, 'aria-disabled', what ? null : 'true');
    setAttribute(undo.node, 'aria-label', what ? t('undo.what', { name: undoName(what) }) : t('undo.none'));
    setShown(notice, Boolean(pitch.notice));
    setText(notice, pitch.notice && hasText(pitch.notice) ? t(pitch.notice) : '');

    const stale = unfinished >= 0 ? 'unfinished' : errors.length ? 'stale' : '';
    const old = engine.state !== 'ready' ? t(`engine.${engine.state}.last`)
      : stale === 'unfinished' ? t('pitch.unfinished.last', { leg: unfinished + 1 })
        : stale ? t('engine.stale.last') : '';
    const none = !kept;
    setAttribute(shown.node, 'aria-disabled', none ? 'true' : null);
    setShown(words, !none);
    figures.update(kept?.answer ?? null, units);
    if (none) {
      headline.say(waits(unfinished, pitch));
      picture.update(null);
      return;
    }
    const { answer } = kept;
    headline.update(answer, units, Boolean(old));
    const demo = pitch.demo ? t('pitch.demo.note') : '';
    picture.update({ answer, units, old, note: demo });
    answer.sentences.forEach((sentence, i) => setText(sentences[i], sentenceText(sentence, units)));
    setAttribute(words, 'data-old', Boolean(old));
    setShown(words.querySelector('.avalanche'), answer.cautions.includes('avalanche'));
    figuresSheet.update(answer, units);
    card.update(state, old);
  }

  /** Why there is no answer. */
  function waits(unfinished, { legs: { length } }) {
    if (unfinished >= 0) return length > 1 ? t('pitch.unfinished', { leg: unfinished + 1 }) : t('pitch.unfinished.one');
    if (engine.state !== 'ready') return t(`engine.${engine.state}`);
    return t(errors.length ? 'engine.stale' : 'engine.starting');
  }

  return {
    show: () => setShown(host, true),
    hide: () => setShown(host, false),
    update,
  };
}

/** The engine's complaints that name no plain range, as the number's control can show them. */
function readable(error, units) {
  const { field, allowed } = error;
  const length = /below its length, ([\d.e+]+) m/.exec(allowed);
  if (field === 'fall_at_m' && length) return { ...error, allowed: t('pitch.error.place', { length: length[1] }) };
  const ends = /a pitch from (\S+) to (\S+) degrees/.exec(allowed);
  if (ends) {
    const [low, high] = [ends[1], ends[2]].map((deg) => show('pitch', Number(deg), units));
    return { ...error, allowed: t('pitch.error.dropPitch', { low, high }) };
  }
  if (/up to length_m/.test(allowed)) return { ...error, allowed: t('pitch.error.drop') };
  return error;
}

/** What an undo takes back, by name. */
function undoName(what) {
  return t(hasText(`input.${what}`) ? `input.${what}` : `sheet.${what}`);
}

/** A button under the controls: what it is about, and what is set. */
function dockButton(label, onClick) {
  const name = el('span', { class: 'dock-label', text: t(label) });
  const value = el('span', { class: 'dock-value' });
  const node = el('button', {
    type: 'button', class: 'dock-button',
    on: { click: () => { if (node.getAttribute('aria-disabled') !== 'true') onClick(); } },
  }, name, ' ', value);
  return { node, label: name, value };
}
