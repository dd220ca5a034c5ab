// One pointer, one gesture: what lies under the pointer when it goes down decides whether it draws a wire, moves the
// selection or pans the paper. A gesture lives from the press to the release; Escape gives it up.
import { nearest, placeOf, pinPlace, pinAt, joinsAt } from './grid.js';
import { page } from './page.js';
import { openCard } from './card.js';
import { drag } from './move.js';
import { hideCursor, putCursor } from './cursor.js';
import { isSelected, select, toggle } from './selection.js';
import { operate } from './operate.js';
import { editInline } from './inline.js';
import * as stage from './stage.js';
import * as wire from './wire.js';

const paper = document.getElementById('paper');
let gesture = null;

function start(event) {
  if (event.button === 1) return stage.pan(event);
  if (event.button !== 0) return null;
  const pin = event.target.closest('[data-pin]');
  if (page.editable && (pin || wire.drawing())) return drawWire(pin, event);
  const thing = thingAt(event);
  if (!thing) {
    return withClick(stage.pan(event), () => select({}));
  }
  if (event.shiftKey) return withClick({ move() {}, end() {}, cancel() {} }, () => toggle(thing));
  const fresh = !isSelected(thing);
  if (fresh) select(thing.part ? { parts: [thing.part] } : { wires: [thing.wire] });
  if (!page.editable) return withClick({ move() {}, end() {}, cancel() {} }, openCard);
  return withClick(drag(event), () => {
    openCard();
    if (thing.part && event.target.closest('[data-operates]')) operate(thing.part);
  });
}

/** The part or wire under an event, if any. */
export function thingAt(event) {
  const group = event.target.closest?.('[data-part], [data-wire]');
  if (!group) return null;
  return group.dataset.part ? { part: group.dataset.part } : { wire: group.dataset.wire };
}

// A press and release without a move between them is a click.
function withClick(gesture, clicked) {
  return {
    move: event => gesture.move(event),
    end: event => gesture.moved ? gesture.end(event) : clicked(),
    cancel: () => gesture.cancel(),
  };
}

// Pressed on a pin and dragged, a wire ends at the release; clicked, it follows the pointer until the next click.
function drawWire(pin, event) {
  const place = pin ? pinPlace(pin) : snapped(event);
  if (wire.drawing()) {
    wire.click(place);
    return { move: follow, end() {}, cancel: wire.cancel };
  }
  wire.begin(place);
  select({});
  let moved = false;
  return {
    move(event) {
      const to = snapped(event);
      moved ||= to[0] !== place[0] || to[1] !== place[1];
      wire.follow(to);
    },
    end(event) {
      if (moved) wire.end();
    },
    cancel: wire.cancel,
  };
}

const follow = event => wire.follow(snapped(event));

// A pin that is near draws the pointer to it.
function snapped(event) {
  const place = placeOf(event), at = nearest(place);
  if (joinsAt(at)) return at;
  for (const [dx, dy] of [[1, 0], [-1, 0], [0, 1], [0, -1]]) {
    const near = [at[0] + dx, at[1] + dy];
    if (Math.hypot(near[0] - place[0], near[1] - place[1]) < 0.75 && pinAt(near)) return near;
  }
  return at;
}

paper.addEventListener('pointerdown', event => {
  if (event.target.closest('#callout, #inline') || gesture) return;
  gesture = start(event);
  if (!gesture) return;
  hideCursor();
  if (event.target.closest('[data-part]') === null) event.preventDefault();
  paper.setPointerCapture(event.pointerId);
});

paper.addEventListener('pointermove', event => {
  if (gesture) gesture.move(event);
  else if (wire.drawing()) follow(event);
});

paper.addEventListener('pointerup', event => {
  const ended = gesture;
  gesture = null;
  ended?.end(event);
  if (!wire.drawing()) putCursor(nearest(placeOf(event)), false);
});

paper.addEventListener('pointercancel', () => giveUp());

paper.addEventListener('dblclick', event => {
  if (wire.drawing()) { wire.end(); return; }
  const thing = thingAt(event);
  if (thing?.part && page.editable && !event.target.closest('[data-operates]')) editInline(thing.part);
});

/** Gives up what the pointer is doing. @returns {boolean} whether there was anything */
export function giveUp() {
  const had = gesture !== null || wire.drawing();
  gesture?.cancel();
  gesture = null;
  if (wire.drawing()) wire.cancel();
  return had;
}
