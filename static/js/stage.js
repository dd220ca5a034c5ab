// Zoom and pan. The paper is an ordinary box in a scrolling stage: zooming sets its width, panning scrolls.

const stage = document.getElementById('stage');
const paper = document.getElementById('paper');
const sheet = document.getElementById('sheet');
const { width: naturalWidth, height: naturalHeight } = sheet.viewBox.baseVal;
const least = 0.2, most = 6;

let zoom = 0;
let fitted = true;

/** Shows the whole paper. */
export function fit() {
  const style = getComputedStyle(stage);
  const width = stage.clientWidth - parseFloat(style.paddingLeft) - parseFloat(style.paddingRight);
  const height = stage.clientHeight - parseFloat(style.paddingTop) - parseFloat(style.paddingBottom);
  const narrow = width < 600;
  set(narrow ? Math.max(width / naturalWidth, 0.5) : Math.min(width / naturalWidth, height / naturalHeight));
  fitted = true;
}

/** Zooms by a factor and keeps what is at a place in the window where it is. */
export function zoomBy(factor, clientX, clientY) {
  const box = stage.getBoundingClientRect();
  const x = clientX ?? box.left + box.width / 2, y = clientY ?? box.top + box.height / 2;
  const before = paper.getBoundingClientRect();
  const u = (x - before.left) / before.width, v = (y - before.top) / before.height;
  set(zoom * factor);
  fitted = false;
  const after = paper.getBoundingClientRect();
  stage.scrollLeft += after.left + u * after.width - x;
  stage.scrollTop += after.top + v * after.height - y;
}

function set(value) {
  zoom = Math.min(most, Math.max(least, value));
  paper.style.width = Math.floor(naturalWidth * zoom) + 'px';
  paper.style.height = Math.floor(naturalHeight * zoom) + 'px';
  document.dispatchEvent(new CustomEvent('loopwright:zoom'));
}

/** A pan by dragging the paper. */
export function pan(event) {
  let [x, y] = [event.clientX, event.clientY];
  const gesture = { moved: false, move, end() {}, cancel() {} };
  return gesture;
  function move(event) {
    if (Math.abs(event.clientX - x) + Math.abs(event.clientY - y) > 3) gesture.moved = true;
    if (!gesture.moved) return;
    stage.scrollLeft -= event.clientX - x;
    stage.scrollTop -= event.clientY - y;
    [x, y] = [event.clientX, event.clientY];
  }
}

/** Scrolls so far that an element can be seen. */
export const reveal = element => element.scrollIntoView({ block: 'nearest', inline: 'nearest' });

stage.addEventListener('wheel', event => {
  if (!event.ctrlKey && !event.metaKey) return;
  event.preventDefault();
  zoomBy(Math.exp(-event.deltaY / 300), event.clientX, event.clientY);
}, { passive: false });

document.getElementById('zoom-in').addEventListener('click', () => zoomBy(1.25));
document.getElementById('zoom-out').addEventListener('click', () => zoomBy(0.8));
document.getElementById('zoom-fit').addEventListener('click', fit);
new ResizeObserver(() => { if (fitted) fit(); }).observe(stage);
fit();
