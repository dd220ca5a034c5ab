// The principal value of a part, typed where it stands on the drawing.
import { send } from './queue.js';
import { boxOf, partGroup, select } from './selection.js';
import { sheet } from './grid.js';

const form = document.getElementById('inline');
const input = form.elements.value;
const trouble = form.querySelector('.trouble');
const paper = document.getElementById('paper');
let ref = '';

/** Opens the field at a part. */
export function editInline(part) {
  const group = partGroup(part);
  if (!group?.dataset.principal) return;
  ref = part;
  const box = boxOf(group);
  const scale = paper.clientWidth / sheet.viewBox.baseVal.width;
  form.style.left = box.right * scale + 8 + 'px';
  form.style.top = (box.top + box.bottom) / 2 * scale - 18 + 'px';
  input.value = group.dataset.value ?? '';
  input.setAttribute('aria-label', `${group.dataset.principal} of ${part}`);
  trouble.textContent = '';
  form.hidden = false;
  document.getElementById('callout').hidden = true;
  // The key that opened the field is still on its way, and not meant for it.
  requestAnimationFrame(() => { input.focus(); input.select(); });
}

function close() {
  if (form.hidden) return;
  form.hidden = true;
  partGroup(ref)?.focus({ preventScroll: true });
}

form.addEventListener('submit', async event => {
  event.preventDefault();
  const name = partGroup(ref)?.dataset.principal;
  const answer = await send([{ do: 'set', ref, values: { [name]: input.value.trim() || null } }]);
  if (!answer.ok) { trouble.textContent = answer.message; return; }
  close();
  select({ parts: [ref] });
});

input.addEventListener('keydown', event => {
  event.stopPropagation();
  if (event.key === 'Escape') close();
});
input.addEventListener('blur', () => { if (!trouble.textContent) form.hidden = true; });
