// What is selected: parts by reference and wires by id. The marks are drawn on the overlay, since the server's groups
// are replaced while the selection stays.
import { overlay, sheet, svg } from './grid.js';

const parts = new Set();
const wires = new Set();
const layer = svg('g', { class: 'selection' });
overlay.append(layer);

const announce = () => document.dispatchEvent(new CustomEvent('loopwright:selection'));

/** The selected references, in the order in which they were selected. */
export const selectedParts = () => [...parts];
export const selectedWires = () => [...wires];
export const nothingSelected = () => parts.size === 0 && wires.size === 0;

export const partGroup = ref => sheet.querySelector(`[data-part="${CSS.escape(ref)}"]`);
export const wireGroup = id => sheet.querySelector(`[data-wire="${CSS.escape(id)}"]`);

/** Selects just these. @param {{parts?: string[], wires?: string[]}} what */
export function select({ parts: refs = [], wires: ids = [] }) {
  if (same(parts, refs) && same(wires, ids)) return;
  parts.clear();
  wires.clear();
  refs.forEach(ref => parts.add(ref));
  ids.forEach(id => wires.add(id));
  mark();
  announce();
}

/** Adds one thing to the selection, or takes it away again. */
export function toggle({ part, wire }) {
  const [set, name] = part ? [parts, part] : [wires, wire];
  if (!set.delete(name)) set.add(name);
  mark();
  announce();
}

export const isSelected = ({ part, wire }) => part ? parts.has(part) : wires.has(wire);

const same = (set, list) => set.size === list.length && list.every(name => set.has(name));

/** Draws the marks again, and drops what is no longer on the sheet. */
export function mark() {
  const before = parts.size + wires.size;
  for (const ref of parts) if (!partGroup(ref)) parts.delete(ref);
  for (const id of wires) if (!wireGroup(id)) wires.delete(id);
  layer.replaceChildren(
    ...[...parts].map(ref => ticks(boxOf(partGroup(ref)))),
    ...[...wires].map(id => trace(wireGroup(id))),
  );
  if (parts.size + wires.size !== before) announce();
}

/** The box of a part's symbol, in user units. */
export function boxOf(group) {
  const shape = group.querySelector('.hit') ?? group;
  const box = shape.getBoundingClientRect();
  const back = sheet.getScreenCTM().inverse();
  const a = new DOMPoint(box.left, box.top).matrixTransform(back);
  const b = new DOMPoint(box.right, box.bottom).matrixTransform(back);
  return { left: a.x, top: a.y, right: b.x, bottom: b.y };
}

// Four corner ticks, as a draughtsman marks a detail.
function ticks({ left, top, right, bottom }) {
  const l = left - 4, t = top - 4, r = right + 4, b = bottom + 4, s = 9;
  return svg('path', {
    class: 'ticks',
    d: `M${l} ${t + s}V${t}H${l + s}M${r - s} ${t}H${r}V${t + s}M${r} ${b - s}V${b}H${r - s}M${l + s} ${b}H${l}V${b - s}`,
  });
}

function trace(group) {
  const line = group.querySelector('path, polyline');
  const copy = line.cloneNode();
  copy.setAttribute('class', 'traced');
  for (const name of ['stroke', 'stroke-width', 'id']) copy.removeAttribute(name);
  return copy;
}
