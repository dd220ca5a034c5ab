// The tray: parts are dragged from it onto the sheet, or put at the pencil point by a click or a key.
import { liesOn, nearest, overlay, placeOf, sheet, step, stretches, svg, userX, userY } from './grid.js';
import { cursor } from './cursor.js';
import { send } from './queue.js';
import { select, partGroup } from './selection.js';

const tray = document.getElementById('tray');
const find = document.getElementById('find');
const ghost = svg('g', { class: 'ghost' });

/** Puts a part at a place and selects it. */
export async function place(entry, at) {
  const part = { kind: entry.dataset.tray, at, turn: turnAt(entry, at), values: JSON.parse(entry.dataset.values || '{}') };
  const answer = await send([{ do: 'add', part }]);
  if (!answer.ok) return;
  select({ parts: answer.made.refs });
  partGroup(answer.made.refs[0])?.focus({ preventScroll: true });
}

// A part with two pins that is dropped on a level wire lies level, so that it goes in series.
function turnAt(entry, at) {
  if (entry.dataset.reach !== '0,-2 0,2') return 0;
  const onLevel = stretches().some(({ from, to }) => from[1] === to[1] && liesOn(at, { from, to }) &&
    Math.min(Math.abs(from[0] - at[0]), Math.abs(to[0] - at[0])) >= 2);
  return onLevel ? 270 : 0;
}

function pick(event) {
  const entry = event.target.closest('[data-tray]');
  if (!entry || event.button !== 0) return;
  const start = [event.clientX, event.clientY];
  let over = null, lifted = false;
  const move = event => {
    lifted ||= Math.hypot(event.clientX - start[0], event.clientY - start[1]) > 4;
    if (!lifted) return;
    over = overSheet(event) ? nearest(placeOf(event)) : null;
    showGhost(entry, over);
  };
  const stop = event => {
    for (const [name, listener] of listeners) window.removeEventListener(name, listener);
    ghost.remove();
    if (event.type === 'pointerup' && over) place(entry, over);
    if (lifted) entry.addEventListener('click', event => event.stopImmediatePropagation(), { once: true, capture: true });
    setTimeout(() => entry.dispatchEvent(new Event('loopwright:dropped')));
  };
  const listeners = [['pointermove', move], ['pointerup', stop], ['pointercancel', stop]];
  for (const [name, listener] of listeners) window.addEventListener(name, listener);
  entry.releasePointerCapture?.(event.pointerId);
  event.preventDefault();
}

function overSheet(event) {
  const box = document.getElementById('stage').getBoundingClientRect();
  return event.clientX > box.left && event.clientX < box.right && event.clientY > box.top && event.clientY < box.bottom;
}

function showGhost(entry, at) {
  if (!at) { ghost.remove(); return; }
  if (!ghost.isConnected) overlay.append(ghost);
  const symbol = entry.querySelector('svg').cloneNode(true);
  const { x, y, width, height } = symbol.viewBox.baseVal;
  for (const [name, value] of Object.entries({ x, y, width, height })) symbol.setAttribute(name, String(value));
  ghost.replaceChildren(symbol, ...entry.dataset.reach.split(' ').map(pair => {
    const [px, py] = pair.split(',').map(Number);
    return svg('circle', { cx: px * step, cy: py * step, r: 3 });
  }));
  ghost.setAttribute('transform', `translate(${userX(at[0])} ${userY(at[1])}) rotate(${turnAt(entry, at)})`);
}

function filter() {
  find.value = find.value.replace(/^\//, ''); // the key that led here
  const words = find.value.toLowerCase().split(/\s+/).filter(Boolean);
  let left = 0;
  for (const entry of tray.querySelectorAll('[data-tray]')) {
    const fits = words.every(word => entry.dataset.find.includes(word));
    entry.hidden = !fits;
    if (fits) left++;
  }
  for (const group of tray.querySelectorAll('.tray-group')) group.hidden = !group.querySelector('[data-tray]:not([hidden])');
  tray.querySelector('.tray-none').hidden = left > 0;
}

function findKeys(event) {
  if (event.key === 'Escape') { find.value = ''; filter(); sheet.focus(); }
  if (event.key !== 'Enter') return;
  event.preventDefault();
  const first = tray.querySelector('[data-tray]:not([hidden])');
  if (!first) return;
  find.value = '';
  filter();
  place(first, cursor());
}

if (tray) {
  tray.addEventListener('pointerdown', pick);
  tray.addEventListener('click', event => {
    const entry = event.target.closest('[data-tray]');
    if (entry) place(entry, cursor());
  });
  find.addEventListener('input', filter);
  find.addEventListener('keydown', findKeys);
}
