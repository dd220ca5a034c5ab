// Edits go to the server one batch at a time, in order, each with an id of its own: when an answer is lost, the same
// batch is sent again and the server applies it once.
import { page, setState, notice } from './page.js';

const form = document.getElementById('edit');
const waiting = [];
let running = false;
let retry = null;

const tally = () => { document.body.dataset.pending = String(waiting.length); };
tally();

/**
 * Sends edits as one batch, all or none.
 * @param {object[]} edits as in the sheet API
 * @returns {Promise<{ok: boolean, message: string, place: string, made: {refs: string[], wires: string[], joined: string[]}}>}
 */
export function send(edits) {
  return new Promise(resolve => {
    waiting.push({ id: crypto.randomUUID?.() ?? randomId(), edits, resolve });
    tally();
    setState('saving');
    pump();
  });
}

/** Whether edits are still on their way. */
export const busy = () => waiting.length > 0;

async function pump() {
  if (running) return;
  running = true;
  for (let pause = 500; waiting.length > 0;) {
    const { status, answer } = await post(waiting[0]);
    if (status === 0 || status >= 500) {
      setState('offline');
      await pauseOrOnline(pause);
      pause = Math.min(2 * pause, 15000);
      continue;
    }
    pause = 500;
    const done = waiting.shift();
    tally();
    if (status >= 400) notice(answer.message);
    else if (answer.made.joined?.length > 0) notice(answer.made.joined.join('. ') + '. Undo takes it back.');
    done.resolve({ ok: status < 400, made: { refs: [], wires: [], joined: [] }, place: '', ...answer });
  }
  running = false;
  setState('saved');
  document.dispatchEvent(new CustomEvent('loopwright:settled'));
}

function post(batch) {
  return new Promise(resolve => {
    const finished = event => {
      form.removeEventListener('htmx:finally:request', finished);
      const { response, text } = event.detail.ctx;
      resolve({ status: response?.status ?? 0, answer: read(response, text) });
    };
    form.addEventListener('htmx:finally:request', finished);
    const values = {
      id: batch.id, base: String(page.revision), author: page.author, case: page.shownCase,
      edits: JSON.stringify(batch.edits),
    };
    htmx.ajax('POST', form.getAttribute('hx-post'), { source: form, target: '#paper', swap: 'none', values });
  });
}

// A refusal is one sentence of JSON; an accepted batch says in a header what it made.
function read(response, text) {
  if (!response) return {};
  if (response.status >= 400) {
    try { return JSON.parse(text).error; } catch { return { message: 'The server did not take the edit; try again.' }; }
  }
  const made = JSON.parse(decodeURIComponent(response.headers.get('Loopwright-Made') ?? '%7B%7D'));
  return { message: '', made };
}

function pauseOrOnline(pause) {
  return new Promise(resolve => {
    const go = () => { clearTimeout(retry); window.removeEventListener('online', go); resolve(); };
    retry = setTimeout(go, pause);
    window.addEventListener('online', go);
  });
}

// Pages on plain http with a host name have no crypto.randomUUID.
function randomId() {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  bytes[6] = (bytes[6] & 0x0f) | 0x40;
  bytes[8] = (bytes[8] & 0x3f) | 0x80;
  const hex = [...bytes].map(byte => byte.toString(16).padStart(2, '0')).join('');
  return hex.replace(/^(.{8})(.{4})(.{4})(.{4})/, '$1-$2-$3-$4-');
}

window.addEventListener('beforeunload', event => { if (busy()) event.preventDefault(); });
