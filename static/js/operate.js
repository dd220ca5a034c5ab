// Operating a switch edits the shown case: the position of the part in it.
import { page } from './page.js';
import { partGroup } from './selection.js';
import { send } from './queue.js';

/** Puts a part into a position, by default the next of its positions. */
export function operate(ref, position) {
  const group = partGroup(ref);
  if (!group?.dataset.positions) return Promise.resolve();
  const positions = JSON.parse(group.dataset.positions);
  const next = position ?? positions[(positions.indexOf(group.dataset.position) + 1) % positions.length];
  return send([{ do: 'operate', case: page.shownCase, ref, position: next }]);
}
