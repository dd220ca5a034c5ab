// Everything from the keyboard. The list that `?` shows is made by the server from the same table of words; a test
// holds the two together.
import { nearest, pinPlace } from './grid.js';
import { page } from './page.js';
import { cursor, putCursor, hideCursor } from './cursor.js';
import { enterCard } from './card.js';
import { editInline } from './inline.js';
import { giveUp } from './gestures.js';
import { moveBy } from './move.js';
import { operate } from './operate.js';
import { send } from './queue.js';
import { nothingSelected, partGroup, select, selectedParts, selectedWires } from './selection.js';
import { showCase, toggleMeshes } from './cases.js';
import * as stage from './stage.js';
import * as wire from './wire.js';

const arrows = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] };
const dialog = document.getElementById('keys');

const plain = {
  '?': () => dialog.showModal(),
  '/': () => document.getElementById('find')?.focus(),
  '+': () => stage.zoomBy(1.25),
  '=': () => stage.zoomBy(1.25),
  '-': () => stage.zoomBy(0.8),
  0: () => stage.fit(),
  m: toggleMeshes,
  c: () => showCase(1),
  C: () => showCase(-1),
  Escape: escape,
};

const editing = {
  r: () => turn('turn'),
  f: () => turn('flip'),
  w: wireKey,
  b: () => wire.drawing() && wire.bend(),
  j: () => send([{ do: 'joint', at: cursor() }]),
  Delete: remove,
  Backspace: remove,
  Enter: enter,
  ' ': () => selectedParts().forEach(ref => operate(ref)),
};

const withControl = {
  z: event => history(event.shiftKey ? 'redo' : 'undo'),
  y: () => history('redo'),
  a: () => select({
    parts: [...document.querySelectorAll('#sheet [data-part]')].map(group => group.dataset.part),
    wires: [...document.querySelectorAll('#sheet [data-wire]')].map(group => group.dataset.wire),
  }),
};

/** Takes back or does again the last edit of this page. */
export const history = act => page.editable && send([{ do: act }]);

function turn(act) {
  const refs = selectedParts();
  if (refs.length > 0) send([{ do: act, refs }]);
}

function remove() {
  const refs = selectedParts(), wires = selectedWires();
  if (refs.length + wires.length > 0) send([{ do: 'remove', refs, wires }]);
}

function enter(event) {
  if (wire.drawing()) { if (event.shiftKey) wire.end(); else wire.click(cursor()); return; }
  const [ref] = selectedParts();
  if (!ref) return;
  if (event.shiftKey) enterCard(); else editInline(ref);
}

// A wire begins at the pencil point or, with a part selected, at a pin of it: W again takes the next pin. Once the
// pencil point has moved on, W does what a click does.
let turnOf = null;
function wireKey() {
  const [ref] = selectedParts();
  if (wire.drawing() && !(turnOf && String(turnOf.at) === String(cursor()))) {
    turnOf = null;
    wire.click(cursor());
    return;
  }
  if (!ref) {
    wire.begin(cursor());
    putCursor(cursor());
    return;
  }
  const pins = [...partGroup(ref).querySelectorAll('[data-pin]')];
  const index = turnOf?.ref === ref && wire.drawing() ? (turnOf.index + 1) % pins.length : 0;
  turnOf = { ref, index, at: pinPlace(pins[index]) };
  wire.begin(turnOf.at);
  putCursor(turnOf.at);
}

function escape() {
  if (giveUp()) return;
  if (!nothingSelected()) { select({}); document.getElementById('sheet').focus({ preventScroll: true }); return; }
  hideCursor();
}

function arrow(event) {
  const reach = event.shiftKey ? 5 : 1;
  const by = arrows[event.key].map(part => part * reach);
  if (!nothingSelected() && !wire.drawing()) {
    if (page.editable) moveBy(by);
    return;
  }
  const at = cursor();
  putCursor(nearest([at[0] + by[0], at[1] + by[1]]));
  if (wire.drawing()) wire.follow(cursor());
}

document.addEventListener('keydown', event => {
  if (event.target.closest('dialog') || (event.target.closest('input, select, textarea, .margin') && event.key !== 'Escape')) return;
  const onButton = event.target.closest('button, summary, a');
  if (event.ctrlKey || event.metaKey) {
    run(withControl[event.key.toLowerCase()], event);
    return;
  }
  if (event.altKey) return;
  if (arrows[event.key] && !onButton) { event.preventDefault(); arrow(event); return; }
  if (onButton && (event.key === 'Enter' || event.key === ' ')) return;
  run(plain[event.key] ?? (page.editable ? editing[event.key] ?? editing[event.key.toLowerCase()] : undefined), event);
});

function run(act, event) {
  if (!act) return;
  event.preventDefault();
  act(event);
}

document.getElementById('open-keys').addEventListener('click', () => dialog.showModal());
