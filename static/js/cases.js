// The case strip, and whether mesh currents are shown.
import { pull } from './live.js';

/** Shows the next case, or the one before. */
export function showCase(by) {
  const tabs = [...document.querySelectorAll('[data-case]')];
  const at = tabs.findIndex(tab => tab.getAttribute('aria-current') === 'true');
  const tab = tabs[(at + by + tabs.length) % tabs.length];
  if (tab) show(tab.dataset.case);
}

async function show(name) {
  await pull(name);
  const address = new URL(location.href);
  address.searchParams.set('case', name);
  window.history.replaceState(null, '', address);
}

/** Shows or hides the mesh currents; the choice stays with this browser. */
export function toggleMeshes() {
  const hidden = document.body.classList.toggle('no-meshes');
  document.getElementById('toggle-meshes').setAttribute('aria-pressed', String(!hidden));
  try { localStorage.setItem('loopwright-meshes', hidden ? 'hidden' : 'shown'); } catch { /* the choice is then for this page alone */ }
}

document.getElementById('toggle-meshes').addEventListener('click', toggleMeshes);
document.addEventListener('click', event => {
  const tab = event.target.closest('[data-case]');
  if (tab) show(tab.dataset.case);
});
try { if (localStorage.getItem('loopwright-meshes') === 'hidden') toggleMeshes(); } catch { /* shown, then */ }
