// Moving what is selected: a ghost follows the pointer on the overlay, and one edit is made at the drop.
import { overlay, placeOf, step, svg } from './grid.js';
import { send } from './queue.js';
import { partGroup, wireGroup, selectedParts, selectedWires } from './selection.js';

const ghost = svg('g', { class: 'ghost' });
overlay.append(ghost);

/** Moves the selection by whole grid steps. */
export function moveBy(by) {
  const refs = selectedParts(), wires = selectedWires();
  if ((by[0] === 0 && by[1] === 0) || refs.length + wires.length === 0) return Promise.resolve();
  return send([{ do: 'move', refs, wires, by }]);
}

/** A drag of the selection. @returns {{move(event: PointerEvent): void, end(): void, cancel(): void, moved: boolean}} */
export function drag(event) {
  const start = placeOf(event);
  const groups = [...selectedParts().map(partGroup), ...selectedWires().map(wireGroup)];
  const gesture = { moved: false, move, end, cancel };
  let by = [0, 0];
  return gesture;

  function move(event) {
    const place = placeOf(event);
    const next = [Math.round(place[0] - start[0]), Math.round(place[1] - start[1])];
    if (!gesture.moved && next[0] === 0 && next[1] === 0) return;
    if (!gesture.moved) lift();
    by = next;
    ghost.setAttribute('transform', `translate(${by[0] * step} ${by[1] * step})`);
  }

  function lift() {
    gesture.moved = true;
    ghost.replaceChildren(...groups.map(group => bare(group)));
    groups.forEach(group => group.classList.add('lifted'));
  }

  async function end() {
    if (!gesture.moved) return;
    await moveBy(by);
    cancel();
  }

  function cancel() {
    ghost.replaceChildren();
    groups.forEach(group => group.classList.remove('lifted'));
  }
}

function bare(group) {
  const copy = group.cloneNode(true);
  for (const element of [copy, ...copy.querySelectorAll('*')]) {
    for (const { name } of [...element.attributes]) {
      if (name === 'id' || name === 'tabindex' || name === 'role' || name.startsWith('data-') || name.startsWith('aria-')) element.removeAttribute(name);
    }
  }
  return copy;
}
