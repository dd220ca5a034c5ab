// What the page is about: its sheet, role, revision and shown case. The body's data attributes are the one place where
// these stand, so that styles, tests and every module see the same.

const data = document.body.dataset;

export const page = {
  get key() { return data.key; },
  get author() { return data.author; },
  get editable() { return data.role === 'edit'; },
  get revision() { return Number(data.revision); },
  set revision(value) { data.revision = String(value); },
  get shownCase() { return document.querySelector('[data-case][aria-current="true"]')?.dataset.case ?? ''; },
};

const words = data.role === 'edit'
  ? { saved: 'Saved', saving: 'Saving', offline: 'Offline, your edits wait', stale: 'Catching up' }
  : { saved: 'Live', saving: 'Live', offline: 'Offline', stale: 'Catching up' };

/** @param {'saved'|'saving'|'offline'|'stale'} state where the last edit stands */
export function setState(state) {
  data.state = state;
  const label = document.getElementById('saved');
  if (label && label.textContent !== words[state]) label.textContent = words[state];
}

let fading = 0;

/** Tells the user one sentence, for long enough to read it. @param {string} sentence */
export function notice(sentence) {
  const line = document.getElementById('notice');
  line.textContent = sentence;
  line.classList.toggle('shown', sentence !== '');
  clearTimeout(fading);
  if (sentence) fading = setTimeout(() => notice(''), 4000 + 60 * sentence.length);
}
