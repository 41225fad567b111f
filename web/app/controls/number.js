/**
 * A number to set: typed, nudged by two buttons, and moved by a slider where `span` gives one. It
 * shows what the state holds and the engine's complaint about it; it never corrects an entry.
 */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { parseNumber, t } from '../text.js';
import { showEntry, symbol, unitOf } from '../units.js';
import { complaint } from './complaint.js';

/**
 * @param {object} given
 * @param {string} given.key the question's key
 * @param {string} given.kind kind of quantity, for units.js
 * @param {[number, number]} [given.span] ends of the slider, in the engine's unit
 * @param {boolean} [given.optional] an empty entry is null
 * @param {boolean} [given.help] whether the text table explains it
 * @param {number} [given.start] where nudging starts from an empty entry, in the engine's unit
 * @param {Node} [given.aside] what else to say under its name
 * @param {string} [given.id] where another control of the page has this key, too
 * @param {{read: (state: any) => any, write: (value: any) => object, path: (state: any) => string}} [given.bind]
 *   where the value stands that is not one of the state's inputs: how it is read, the patch that
 *   writes it, the question's key in full
 * @param {ReturnType<import('../store.js').createStore>} given.store
 */
export function createNumber({
  key, kind, span, optional = false, help = false, start = 0, aside, store, id = `number-${key}`,
  bind = { read: (state) => state.inputs[key], write: (value) => ({ inputs: { [key]: value } }), path: () => key },
}) {
  const name = t(`input.${key}`);
  const unitNow = () => unitOf(kind, store.get().units);

  function put(value) {
    store.set(bind.write(value), { undo: key });
  }

  function typed() {
    const text = field.value.trim();
    const number = parseNumber(text);
    if (text === '' && optional) put(null);
    else put(number === null ? field.value : unitNow().read(number));
  }

  function nudged(direction) {
    const unit = unitNow();
    const value = bind.read(store.get());
    const shown = unit.show(typeof value === 'number' ? value : start);
    const steps = shown / unit.step;
    // To the next full step; a value already on one, up to rounding, moves a whole step.
    const next = direction > 0 ? Math.floor(steps + 1e-6) + 1 : Math.ceil(steps - 1e-6) - 1;
    let si = unit.read(next * unit.step);
    if (span && direction > 0 && shown <= unit.show(span[1])) si = Math.min(si, span[1]);
    if (span && direction < 0 && shown >= unit.show(span[0])) si = Math.max(si, span[0]);
    put(si);
    store.seal();
  }

  const nudge = (direction, sign, label) => el('button', {
    type: 'button', class: 'nudge', text: sign, 'aria-label': t(label, { name }),
    on: { click: () => nudged(direction) },
  });
  const field = el('input', {
    id, type: 'text', class: 'field', inputmode: 'decimal', autocomplete: 'off', spellcheck: 'false',
    enterkeyhint: 'done', 'data-question': key, 'aria-describedby': `${id}-note ${id}-error`,
    placeholder: optional ? t('input.optional') : null,
    on: {
      input: typed,
      change: () => store.seal(),
      focus: () => field.select(),
      blur: () => update(store.get(), null),
      keydown: (event) => { if (event.key === 'Enter') field.blur(); },
    },
  });
  const unitText = el('span', { class: 'unit', 'aria-hidden': 'true' });
  const note = el('p', { class: 'note', id: `${id}-note` }, aside ?? (help ? t(`help.${key}`) : ''));
  const error = el('p', { class: 'error', id: `${id}-error`, role: 'alert', hidden: true });
  const range = span && el('input', {
    type: 'range', class: 'range', 'data-question': key, 'aria-label': t('input.range', { name }),
    on: {
      input: () => put(unitNow().read(Number(range.value))),
      change: () => store.seal(),
    },
  });
  const band = el('span', { class: 'band', hidden: true });
  const scale = span && el('span', { class: 'scale', 'aria-hidden': 'true' }, band);
  const node = el('div', { class: 'number', role: 'group', 'aria-label': name },
    el('div', { class: 'head' }, el('label', { for: id, text: name }), note, error),
    el('div', { class: 'stepper' }, nudge(-1, '−', 'input.less'),
      el('span', { class: 'entry' }, field, unitText), nudge(1, '+', 'input.more')),
    span ? el('div', { class: 'slide' }, scale, range) : null);

  let unitShown = null;
  function rescale(unit) {
    unitShown = unit;
    setText(unitText, symbol(unit).trim());
    setAttribute(field, 'aria-label', t('input.typed', { name, unit: symbol(unit).trim() }));
    if (!span) return;
    const [low, high] = span.map((end) => Math.round(unit.show(end) / unit.step) * unit.step);
    Object.assign(range, { min: low, max: high, step: unit.step });
    scale.style.setProperty('--parts', String(Math.max(1, Math.round((high - low) / (unit.step * 10)))));
  }

  /**
   * @param {import('../store.js').State} state
   * @param {{field: string, problem: string, allowed: string}[]|null} errors the engine's; null:
   *   as before
   * @param {{min: number, max: number}|null} [marked] a stretch to mark on the slider
   */
  function update(state, errors, marked) {
    const unit = unitOf(kind, state.units);
    if (unit !== unitShown) rescale(unit);
    const value = bind.read(state);
    const path = bind.path(state);
    setAttribute(field, 'data-question', path);
    if (range) setAttribute(range, 'data-question', path);
    const number = typeof value === 'number' ? value : null;
    const text = number === null ? String(value ?? '') : showEntry(kind, number, state.units);
    // What is being typed stays as it is typed.
    const typing = document.activeElement === field;
    const entry = parseNumber(field.value);
    const same = number === null || (entry !== null && Math.abs(unit.read(entry) - number) < 1e-9);
    if (!(typing && same) && field.value !== text) field.value = text;
    if (range && number !== null) {
      range.value = String(unit.show(number));
      setAttribute(range, 'aria-valuetext', text + symbol(unit));
    }
    if (errors) {
      const found = errors.find((one) => one.field === path);
      setAttribute(field, 'aria-invalid', found ? 'true' : null);
      setShown(error, Boolean(found));
      setShown(note, !found);
      setText(error, found ? complaint(found, unit) : '');
    }
    if (range && marked !== undefined) mark(marked, unit);
  }

  function mark(marked, unit) {
    setShown(band, marked !== null);
    if (!marked) return;
    const share = (si) => (unit.show(si) - Number(range.min)) / (Number(range.max) - Number(range.min));
    const [from, to] = [marked.min, marked.max].map((si) => Math.max(0, Math.min(1, share(si))));
    band.style.left = `${(from * 100).toFixed(2)}%`;
    band.style.width = `${((to - from) * 100).toFixed(2)}%`;
  }

  return { node, update, key, name };
}
