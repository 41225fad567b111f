/** Words and numbers in the reader's language: one table a language, numbers by locale. */

import { en } from './text/en.js';
import { enBoard } from './text/en-board.js';
import { enPitch } from './text/en-pitch.js';
import { enTurnMore } from './text/en-turn-more.js';

const TABLES = { en: { ...en, ...enPitch, ...enTurnMore, ...enBoard } };

/** Language of the text: the first of the browser's that has a table, else English. */
export const language =
  navigator.languages.map((tag) => tag.split('-')[0]).find((tag) => tag in TABLES) ?? 'en';

/** Locale of the numbers: the browser's own variant of that language, so that both agree. */
export const locale =
  navigator.languages.find((tag) => tag.split('-')[0] === language) ?? language;

/**
 * The text of a key, `{name}` replaced by values. A key that the table lacks is returned itself:
 * visible, and a test finds it.
 * @param {string} key
 * @param {Record<string, string|number>} [values]
 */
export function t(key, values) {
  const text = TABLES[language][key] ?? key;
  return values ? text.replace(/\{(\w+)\}/g, (whole, name) => String(values[name] ?? whole)) : text;
}

/** Whether the table has a text for this key. */
export function hasText(key) {
  return key in TABLES[language];
}

const formats = new Map();

/**
 * A number with this many decimals, a true minus sign and no grouping.
 * @param {number} value
 * @param {{decimals?: number, least?: number, signed?: boolean}} [options] `least`: decimals that
 *   are always shown.
 */
export function formatNumber(value, { decimals = 0, least = decimals, signed = false } = {}) {
  const key = `${decimals} ${least} ${signed}`;
  let format = formats.get(key);
  if (!format) {
    format = new Intl.NumberFormat(locale, {
      minimumFractionDigits: least,
      maximumFractionDigits: decimals,
      signDisplay: signed ? 'exceptZero' : 'negative',
      useGrouping: false,
    });
    formats.set(key, format);
  }
  return format.format(value).replace('-', '−');
}

/**
 * The number in a typed text, with a comma or a point; null where the text is no number.
 * @param {string} text
 */
export function parseNumber(text) {
  const plain = text.trim().replace('−', '-').replace(',', '.');
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : null;
}
