// Puts the page together.
import './patch.js';
import './gestures.js';
import './tray.js';
import './share.js';
import { page } from './page.js';
import { closeCard, openCard, refresh } from './card.js';
import { history } from './keys.js';
import { keepUp } from './live.js';
import { send } from './queue.js';
import { isSelected, mark, select } from './selection.js';
import { sheet } from './grid.js';

document.addEventListener('htmx:after:swap', mark);
document.addEventListener('loopwright:settled', () => { mark(); refresh(); });
document.addEventListener('loopwright:selection', closeCard);
document.addEventListener('loopwright:zoom', mark);

// Tab goes from part to part; a focused part is a selected part.
sheet.addEventListener('focusin', event => {
  const part = event.target.closest('[data-part]')?.dataset.part;
  if (!part || isSelected({ part }) || !event.target.matches(':focus-visible')) return;
  select({ parts: [part] });
  openCard();
});

document.getElementById('undo')?.addEventListener('click', () => history('undo'));
document.getElementById('redo')?.addEventListener('click', () => history('redo'));
document.getElementById('print').addEventListener('click', () => window.print());
document.addEventListener('change', event => {
  if (event.target.id === 'title') send([{ do: 'sheet', set: { title: event.target.value.trim() } }]);
});

// What lies in the margin about a part leads to it on the drawing.
document.addEventListener('click', event => {
  const row = event.target.closest('[data-reading]');
  if (!row) return;
  select({ parts: [row.dataset.reading] });
  openCard();
});

keepUp();
document.body.dataset.ready = '1';
