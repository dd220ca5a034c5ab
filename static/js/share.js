// The panel of shared addresses.
import { page } from './page.js';

const dialog = document.getElementById('share');

async function show(method = 'GET', body = undefined) {
  const response = await fetch(`/s/${page.key}/share`, { method, body }).catch(() => null);
  const text = await response?.text();
  if (response?.headers.get('Content-Type')?.startsWith('text/html')) dialog.innerHTML = text;
  for (const field of dialog.querySelectorAll('[data-copy]')) field.value = location.origin + field.value;
  if (!dialog.open) dialog.showModal();
}

document.getElementById('open-share')?.addEventListener('click', () => show());
dialog.addEventListener('submit', event => {
  if (!event.target.matches('[data-share]')) return;
  event.preventDefault();
  show('POST', new URLSearchParams(new FormData(event.target)));
});
dialog.addEventListener('click', event => {
  const withdraw = event.target.closest('[data-withdraw]');
  if (withdraw) show('POST', new URLSearchParams({ withdraw: withdraw.dataset.withdraw }));
  if (event.target.matches('[data-copy]')) event.target.select();
});
