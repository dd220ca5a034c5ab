// Keeps the page at the newest revision: the server tells that there is one, and the page asks for what changed.
import { page, setState } from './page.js';
import { busy } from './queue.js';

const form = document.getElementById('pull');
let newest = 0;
let pulling = false;

/** Asks for everything that differs from what is shown. @param {string} toCase the case to show from then on */
export async function pull(toCase = page.shownCase) {
  if (pulling) return;
  pulling = true;
  await new Promise(resolve => {
    form.addEventListener('htmx:finally:request', resolve, { once: true });
    const values = { since: String(page.revision), was: page.shownCase, case: toCase };
    htmx.ajax('GET', form.getAttribute('hx-get'), { source: form, target: '#paper', swap: 'none', values });
  });
  pulling = false;
  document.dispatchEvent(new CustomEvent('loopwright:settled'));
}

async function catchUp() {
  if (busy() || pulling || newest <= page.revision) return;
  const before = page.revision;
  setState('stale');
  await pull();
  if (!busy()) setState('saved');
  if (page.revision > before) catchUp();
}

/** Listens for new revisions for as long as the page is open. */
export function listen() {
  const events = new EventSource(`/api/v1/sheets/${page.key}/events`);
  events.addEventListener('revision', event => {
    newest = Math.max(newest, JSON.parse(event.data).revision);
    if (document.body.dataset.state === 'offline' && !busy()) setState('saved');
    catchUp();
  });
  events.addEventListener('error', () => {
    if (!busy()) setState('offline');
    if (events.readyState === EventSource.CLOSED) setTimeout(listen, 5000);
  });
  document.addEventListener('loopwright:settled', catchUp);
}
