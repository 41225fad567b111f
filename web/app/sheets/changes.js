/** What would make the turn hold, one thing at a time: a tap sets it. */

import { el, setAttribute, setShown, setText } from '../dom.js';
import { t } from '../text.js';
import { applyChange, changeWords } from '../views/change-words.js';
import { createSheet } from './sheet.js';

/** @param {{store: any, echo: () => Node}} given */
export function createChangesSheet({ store, echo }) {
  const intro = el('p');
  const list = el('ul', { class: 'changes' });
  const lacking = el('h3', { text: t('changes.notEnough') });
  const others = el('ul', { class: 'changes-none' });
  const sheet = createSheet('changes', echo(), intro, list, lacking, others);
  let drawn = '';

  return {
    ...sheet,
    update({ state: { units }, kept, full }) {
      const changes = full.answer?.changes ?? null;
      setAttribute(list, 'data-old', full.old);
      for (const button of list.querySelectorAll('button')) setAttribute(button, 'aria-disabled', full.old ? 'true' : null);
      if (full.old && changes && kept?.answer.verdict !== 'holds') return;
      const holds = changes?.length === 0 || kept?.answer.verdict === 'holds';
      const key = JSON.stringify([changes, units, holds]);
      if (key === drawn) return;
      drawn = key;
      const enough = holds ? [] : changes?.filter((change) => change.enough) ?? [];
      const none = holds ? [] : changes?.filter((change) => !change.enough) ?? [];
      setText(intro, t(holds ? 'changes.holds' : !changes ? 'changes.waiting' : enough.length ? 'changes.intro' : 'changes.nothing'));
      list.replaceChildren(...enough.map((change) => item(change, changes.indexOf(change), units)));
      setShown(list, enough.length > 0);
      setShown(lacking, none.length > 0);
      others.replaceChildren(...none.map(({ input }) => el('li', { text: t(`change.${input}.none`) })));
    },
  };

  /** Back on the page the verdict and Undo are in sight. */
  function set(change) {
    sheet.dialog.close();
    applyChange(store, change);
  }

  function item(change, index, units) {
    const { way, values } = changeWords(change, units);
    const [before, after] = t(`change.${change.input}.to`).split(/\{(?:to|title)\}/);
    const to = el('span', { 'data-answer': `changes.${index}.to`, text: values.to });
    return el('li', {}, el('button', {
      type: 'button', class: 'change', 'data-change': change.input,
      on: { click: (event) => { if (!event.currentTarget.getAttribute('aria-disabled')) set(change); } },
    }, el('span', { class: 'change-words' }, el('span', { class: 'change-what', text: t(`change.${way}`, values) }),
      el('span', { class: 'change-to' }, before, to, after)),
    el('span', { class: 'change-set', text: t('changes.set') })));
  }
}
