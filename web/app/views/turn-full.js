/**
 * The slow part of a turn's answer: how sure, and what to change. Asked in a pause, on a channel
 * of its own, so that it never holds up the verdict of a slider that moves.
 */

/** A question that stands this long is a pause, ms. */
const PAUSE_MS = 150;

/**
 * @param {object} given
 * @param {any} given.engine
 * @param {string} given.channel
 * @param {() => void} given.onAnswer
 */
export function createFullAnswer({ engine, channel, onAnswer }) {
  let wanted = '';
  let timer = 0;
  /** Answer to `at`; what it says is old while `at` is not what is wanted. */
  let kept = { at: '', answer: null, lineM: null };
  let errors = [];

  async function ask(question) {
    const at = wanted;
    try {
      const answer = await engine.ask(channel, question);
      if (answer === null || at !== wanted) return;
      errors = answer.error ?? [];
      if (!answer.error) kept = { at, answer, lineM: question.line_radius_m };
      onAnswer();
    } catch {
      // The engine has failed; the view says so.
    }
  }

  return {
    /** @param {object} question the turn's, in full; asked once it stands for a moment */
    want(question) {
      // With numpy the same question has more to say.
      const next = `${engine.arrays} ${JSON.stringify(question)}`;
      if (next === wanted) return;
      wanted = next;
      clearTimeout(timer);
      timer = setTimeout(ask, PAUSE_MS, question);
    },
    /** The last full answer, or null. */
    get answer() { return kept.answer; },
    /** What was wrong with the last question, the engine's complaints. */
    get errors() { return errors; },
    /** The line that it is for, m, or null. */
    get lineM() { return kept.lineM; },
    /** Whether it is not the answer to what is set now. */
    get old() { return kept.at !== wanted; },
  };
}
