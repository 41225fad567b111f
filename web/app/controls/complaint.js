/** The engine's complaint about an entry, in the reader's units. */

import { formatNumber, t } from '../text.js';
import { symbol } from '../units.js';

/**
 * @param {{problem: string, allowed: string, text?: string}} error `text`: said already
 * @param {import('../units.js').Unit} unit
 */
export function complaint({ problem, allowed, text: said }, unit) {
  if (said) return said;
  const range = /(from|above) ([\d.e+-]+) (?:up )?to ([\d.e+-]+)/.exec(allowed);
  if (!range) return t('error.allowed', { allowed });
  const [low, high] = [range[2], range[3]].map((end) =>
    formatNumber(unit.show(Number(end)), { decimals: unit.decimals + 1, least: 0 }));
  const span = t(range[1] === 'above' ? 'error.above' : 'error.range', { low, high }) + symbol(unit);
  const text = t('error.allowed', { allowed: span });
  return /not a( finite)? number/.test(problem) ? `${t('error.number')} ${text}` : text;
}
