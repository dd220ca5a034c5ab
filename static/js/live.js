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

let events = null;

// A hidden page does not listen: browsers allow few connections to one server, and whoever comes back catches up.
function listen() {
  events?.close();
  events = null;
  if (document.hidden) return;
  events = new EventSource(`/api/v1/sheets/${page.key}/events`);
  events.addEventListener('open', () => { if (!busy()) setState('saved'); });
  events.addEventListener('revision', event => {
    newest = Math.max(newest, JSON.parse(event.data).revision);
    catchUp();
  });
  events.addEventListener('error', () => {
    if (!busy()) setState('offline');
    if (events?.readyState === EventSource.CLOSED) setTimeout(listen, 5000);
  });
}

/** Keeps up with the sheet for as long as the page is open. */
export function keepUp() {
  document.addEventListener('visibilitychange', listen);
  document.addEventListener('loopwright:settled', catchUp);
  listen();
}
