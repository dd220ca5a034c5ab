// The pencil point: a place on the grid that the arrow keys lead about, where wires begin and parts are put when there
// is no pointer. It shows only once a key has moved it.
import { overlay, svg, userX, userY, pinAt } from './grid.js';
import { reveal } from './stage.js';

const mark = svg('path', { class: 'cursor', d: 'M-9 0H9M0-9V9', hidden: '' });
const spoken = document.getElementById('notice');
overlay.append(mark);

let place = [12, 10];

export const cursor = () => place;

/** Leads the pencil point to a place. */
export function putCursor(to, shown = true) {
  place = to;
  mark.setAttribute('transform', `translate(${userX(to[0])} ${userY(to[1])})`);
  mark.toggleAttribute('hidden', !shown);
  if (!shown) return;
  reveal(mark);
  const pin = pinAt(to);
  spoken.textContent = pin ? `on pin ${pin.name}` : `${to[0]}, ${to[1]}`;
}

export const hideCursor = () => mark.setAttribute('hidden', '');
