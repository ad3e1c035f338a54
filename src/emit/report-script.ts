/** The report's one script: the copy buttons. Without it the page is complete; the sources can be opened and selected. */
import { createHash } from 'node:crypto';

export const REPORT_SCRIPT = `
'use strict';
document.documentElement.classList.add('scripted');
async function copy(text) {
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    const area = document.createElement('textarea');
    area.value = text;
    area.setAttribute('readonly', '');
    area.style.position = 'fixed';
    area.style.opacity = '0';
    document.body.append(area);
    area.select();
    const done = document.execCommand('copy');
    area.remove();
    return done;
  }
}
document.addEventListener('click', async (event) => {
  const button = event.target instanceof Element ? event.target.closest('button[data-copies]') : null;
  if (!button) return;
  const source = document.getElementById(button.dataset.copies);
  const done = await copy(source.textContent);
  if (!done) source.closest('details').open = true;
  button.textContent = done ? 'Copied' : 'Select it below';
  document.getElementById('said').textContent = button.textContent;
  setTimeout(() => { button.textContent = button.dataset.label; }, 1800);
});
`;

/** The expression for script-src that allows this script and no other. */
export const scriptHash = (script: string): string =>
  `'sha256-${createHash('sha256').update(script, 'utf8').digest('base64')}'`;
