/**
 * Progress with elapsed seconds. On a terminal one line shows all that is going on and is rewritten each second;
 * elsewhere (a pipe, a CI log) a line is written when a step begins, every 15 s, and when it ends.
 */
const TICK_MS = 1000;
const REMINDER_MS = 15_000;
/** Steps shorter than this only show their end, so that a warm start stays quiet. */
const SHORT_MS = 400;

const seconds = (ms) => `${(ms / 1000).toFixed(1)} s`;

/** @param stream where to write; `null` for silence */
export function createProgress(stream = process.stdout) {
  const running = new Map();
  const terminal = Boolean(stream?.isTTY);
  let timer = null;

  let quiet = false;

  const write = (text) => !quiet && stream?.write(text);
  const clear = () => terminal && write('\r\u001b[K');

  function draw() {
    const now = Date.now();
    if (terminal) {
      const shown = [...running.values()].map(
        (step) => `${step.label} ${Math.floor((now - step.from) / 1000)} s`,
      );
      clear();
      write(`  ${shown.join(' · ')}`.slice(0, (stream.columns || 80) - 1));
      return;
    }
    for (const step of running.values()) {
      if (!step.shown && now - step.from >= SHORT_MS) {
        step.shown = now;
        write(`  ${step.label} …\n`);
      } else if (step.shown && now - step.shown >= REMINDER_MS) {
        step.shown = now;
        write(`  ${step.label} … ${Math.round((now - step.from) / 1000)} s so far\n`);
      }
    }
  }

  function settle(step) {
    running.delete(step);
    clear();
    if (running.size === 0) {
      clearInterval(timer);
      timer = null;
    }
  }

  return {
    /** One line, above whatever is being rewritten. */
    say(text) {
      clear();
      write(`${text}\n`);
    },
    /** Says a last word; steps cut short after it are nobody's news. */
    close(text) {
      clear();
      write(`${text}\n`);
      quiet = true;
    },
    /** Shows `label` while `work` runs; returns what it returns. */
    async step(label, work) {
      const step = { label, from: Date.now(), shown: 0 };
      running.set(step, step);
      timer ??= setInterval(draw, terminal ? TICK_MS : SHORT_MS);
      timer.unref();
      if (terminal) draw();
      try {
        const result = await work((text) => (step.label = text));
        settle(step);
        write(`  ${step.label}: ${seconds(Date.now() - step.from)}\n`);
        return result;
      } catch (error) {
        settle(step);
        write(`  ${step.label}: failed after ${seconds(Date.now() - step.from)}\n`);
        throw error;
      }
    },
  };
}
