// The part card: a callout beside the selected part or wire, with its values to edit and its numbers to read.
import { boxOf, partGroup, select, selectedParts, selectedWires, wireGroup } from './selection.js';
import { overlay, sheet, svg } from './grid.js';
import { page } from './page.js';
import { send } from './queue.js';
import { operate } from './operate.js';

const callout = document.getElementById('callout');
const paper = document.getElementById('paper');
const leader = svg('line', { class: 'leader', hidden: '' });
overlay.append(leader);
let shown = '';
let asked = 0;
let wanted = false;

/** Shows the card of the one thing that is selected. It stays until something else is selected. */
export function openCard() {
  wanted = true;
  return refresh();
}

/** Puts the card away. */
export function closeCard() {
  wanted = false;
  hide();
}

/** Renews the card, if one is wanted. */
export async function refresh() {
  if (!wanted) return;
  const parts = selectedParts(), wires = selectedWires();
  if (parts.length + wires.length !== 1) { hide(); return; }
  const name = parts[0] ?? wires[0];
  const turn = ++asked;
  const address = `/s/${page.key}/card?` + new URLSearchParams({ [parts[0] ? 'ref' : 'wire']: name, case: page.shownCase });
  const response = await fetch(address).catch(() => null);
  if (turn !== asked || !response?.ok) return;
  const text = await response.text();
  if (turn !== asked) return;
  if (shown === name && callout.contains(document.activeElement)) keepField(text);
  else callout.innerHTML = text;
  shown = name;
  callout.hidden = false;
  put();
}

const shownGroup = () => selectedParts().includes(shown) ? partGroup(shown) : wireGroup(shown);

// While somebody types in the card, only its numbers are renewed.
function keepField(text) {
  const fresh = new DOMParser().parseFromString(text, 'text/html');
  for (const part of ['.computed', '.card-state']) {
    const old = callout.querySelector(part), now = fresh.querySelector(part);
    if (old && now) old.replaceWith(now);
  }
}

function hide() {
  asked++;
  shown = '';
  callout.hidden = true;
  leader.setAttribute('hidden', '');
}

// Where it covers least of the drawing, and not far from the part; it may lie on the desk beside the paper.
function put() {
  const group = shownGroup();
  if (!group) { hide(); return; }
  const scale = paper.clientWidth / sheet.viewBox.baseVal.width;
  const box = boxOf(group), width = callout.offsetWidth / scale, height = callout.offsetHeight / scale;
  const boxes = [...sheet.querySelectorAll('[data-part], [data-mesh], #title-block')].map(other => ({ own: other === group, box: other.getBBox() }));
  let best = null;
  for (const { left, top } of places(box, width, height, scale)) {
    const area = { left, top, right: left + width, bottom: top + height };
    const away = Math.hypot((left + width / 2) - (box.left + box.right) / 2, (top + height / 2) - (box.top + box.bottom) / 2);
    const cost = away + covered(area, boxes);
    if (!best || cost < best.cost) best = { cost, area };
  }
  callout.style.left = best.area.left * scale + 'px';
  callout.style.top = best.area.top * scale + 'px';
  if (group.dataset.part) lead(box, best.area, group.getBBox());
  else leader.setAttribute('hidden', '');
}

// Candidate places: columns to both sides of the part and at the edges, rows from top to bottom.
function places(box, width, height, scale) {
  const view = sheet.viewBox.baseVal, stage = paper.parentElement;
  const most = Math.max(view.width - width - 10, (stage.clientWidth - paper.offsetLeft) / scale - width - 12);
  const list = [];
  for (const x of [box.right + 120, box.left - 120 - width, box.right + 200, box.left - 200 - width, view.width - width - 10, most, 10]) {
    for (const y of [(box.top + box.bottom) / 2 - height / 3, 30, 120, view.height - height - 20]) {
      list.push({ left: Math.max(10, Math.min(most, x)), top: Math.max(10, Math.min(view.height - height - 10, y)) });
    }
  }
  return list;
}

function covered(area, boxes) {
  let cost = 0;
  for (const { own, box } of boxes) {
    const wide = Math.min(area.right, box.x + box.width) - Math.max(area.left, box.x);
    const high = Math.min(area.bottom, box.y + box.height) - Math.max(area.top, box.y);
    if (wide > 0 && high > 0) cost += (own ? 20 : 1) * (200 + wide * high / 10);
  }
  return cost;
}

function lead(box, card, all) {
  const right = card.left > box.right;
  const y = Math.max(card.top + 12, Math.min(card.bottom - 12, (box.top + box.bottom) / 2));
  for (const [name, value] of Object.entries({
    x1: right ? all.x + all.width + 6 : all.x - 6, y1: (box.top + box.bottom) / 2, x2: right ? card.left : card.right, y2: y,
  })) leader.setAttribute(name, String(value));
  leader.toggleAttribute('hidden', card.left <= box.right && card.right >= box.left);
}

async function change(field) {
  const ref = shown;
  const trouble = callout.querySelector('.trouble');
  trouble.textContent = '';
  const edit = 'rename' in field.dataset
    ? { do: 'rename', ref, to: field.value.trim() }
    : { do: 'set', ref, values: { [field.name]: valueOf(field) } };
  const answer = await send([edit]);
  if (answer.ok) {
    field.removeAttribute('aria-invalid');
    field.defaultValue = field.value;
    if (edit.do === 'rename') { select({ parts: [edit.to] }); openCard(); }
    return;
  }
  trouble.textContent = answer.message;
  field.setAttribute('aria-invalid', 'true');
  if (field.defaultValue !== undefined && field.type !== 'checkbox') field.value = field.defaultValue;
  field.focus();
}

function valueOf(field) {
  if (field.type === 'checkbox') return field.checked;
  const text = field.value.trim();
  return text === '' ? null : text;
}

callout.addEventListener('change', event => {
  if (event.target.matches('[data-value], [data-rename]')) change(event.target);
});
callout.addEventListener('click', event => {
  const button = event.target.closest('button');
  if (!button) return;
  if (button.dataset.operate) operate(button.dataset.operate, button.dataset.position);
  if (button.dataset.act === 'remove') send([{ do: 'remove', refs: selectedParts(), wires: selectedWires() }]);
  else if (button.dataset.act) send([{ do: button.dataset.act, refs: [shown] }]);
});
callout.addEventListener('keydown', event => {
  event.stopPropagation();
  if (event.key === 'Escape') shownGroup()?.focus({ preventScroll: true });
});
document.addEventListener('loopwright:zoom', () => { if (shown) put(); });

/** Leads the keyboard into the card. */
export async function enterCard() {
  await openCard();
  callout.querySelector('[data-value], [data-rename]')?.focus();
}
