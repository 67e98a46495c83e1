import { stripVTControlCharacters } from 'node:util';

/** Prints the steps of a set-up script: what is going on, a sign of life in long ones, and how long each took. */

const SIGN_OF_LIFE_MS = 10_000;
// A step that is over at once needs no announcement.
const ANNOUNCE_AFTER_MS = 300;

function seconds(sinceMs) {
  const s = (performance.now() - sinceMs) / 1000;
  return s < 60 ? `${s.toFixed(1)} s` : `${Math.floor(s / 60)} min ${Math.round(s % 60)} s`;
}

/** A reporter for `total` numbered steps. `write` takes whole lines. */
export function createProgress(total, write = (line) => process.stdout.write(`${line}\n`)) {
  let count = 0;
  return {
    /**
     * Runs one step. `work` gets a function for notes; whatever it returns as a string is shown as the outcome.
     * A step that had nothing to do returns `null` and is shown as such, so the second start reads calmly.
     */
    async step(title, work) {
      count += 1;
      const label = `[${count}/${total}] ${title}`;
      const begun = performance.now();
      let note = '';
      const announcement = setTimeout(() => write(`${label} …`), ANNOUNCE_AFTER_MS);
      const alive = setInterval(
        () => write(`${label} … ${seconds(begun)}${note ? `, ${note}` : ''}`),
        SIGN_OF_LIFE_MS,
      );
      try {
        const outcome = await work((text) => {
          // One line at most: build tools and npm print whole screens.
          note = stripVTControlCharacters(text).trim().split('\n').pop().slice(0, 100);
        });
        write(`${label}: ${outcome === null ? 'nothing to do' : outcome || 'done'} (${seconds(begun)})`);
      } finally {
        clearTimeout(announcement);
        clearInterval(alive);
      }
    },
    write,
  };
}
