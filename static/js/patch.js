// Takes the server's patch of the drawing: the groups that changed, by id, and the ids that are gone. The outer <svg>
// lives as long as the page, so that zoom, focus and a running gesture stay.
import { page } from './page.js';

htmx.registerExtension('loopwright', {
  htmx_process_patch(template) {
    const svg = template.content.querySelector('svg');
    const kept = new Set();
    for (const group of [...(svg?.children ?? [])]) {
      kept.add(group.id);
      put(group);
    }
    for (const id of (template.getAttribute('gone') ?? '').split(' ')) {
      if (id) document.getElementById(id)?.remove();
    }
    if (template.hasAttribute('whole')) dropOthers(kept);
    page.revision = template.getAttribute('revision');
  },
});

function put(group) {
  const old = document.getElementById(group.id);
  if (!old) {
    document.getElementById('layer-' + group.dataset.layer)?.append(group);
    return;
  }
  const focused = document.activeElement === old;
  old.replaceWith(group);
  if (focused) group.focus({ preventScroll: true });
}

function dropOthers(kept) {
  for (const group of document.querySelectorAll('#sheet [data-layer]')) {
    if (!kept.has(group.id)) group.remove();
  }
}
