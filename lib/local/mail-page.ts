import type { ReadableMail } from './mail-message';

export interface StoredMail extends ReadableMail {
  id: string;
  receivedAt: string;
}

const style = `
:root { color-scheme: light dark; font: 16px/1.5 system-ui, sans-serif; }
body { max-width: 46rem; margin: 2rem auto; padding: 0 1rem; }
li, article { border-top: 1px solid #8888; padding: .75rem 0; list-style: none; }
ul { padding: 0; } pre { white-space: pre-wrap; overflow-wrap: anywhere; font: inherit; }
dl { display: grid; grid-template-columns: max-content 1fr; gap: .25rem 1rem; } dd { margin: 0; }
.quiet { opacity: .75; }
`;

export function escapeHtml(text: string): string {
  return text
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
    .replace(/'/g, '&#39;');
}

/** Text with its web addresses made clickable; nothing else of it becomes markup. */
export function linkText(text: string): string {
  return text
    .split(/(https?:\/\/[^\s<>"']+)/g)
    .map((piece, index) => {
      if (index % 2 === 0) return escapeHtml(piece);
      const address = piece.replace(/[.,;:!?)\]]+$/, '');
      const link = `<a href="${escapeHtml(address)}">${escapeHtml(address)}</a>`;
      return link + escapeHtml(piece.slice(address.length));
    })
    .join('');
}

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en"><meta charset="utf-8">
<meta name="viewport" content="width=device-width"><title>${escapeHtml(title)}</title>
<style>${style}</style><body>${body}</body></html>`;
}

export function listPage(mails: StoredMail[]): string {
  const items = mails.map(
    (mail) => `<li><a href="/messages/${mail.id}">${escapeHtml(mail.subject || 'No subject')}</a>
<div class="quiet">to ${escapeHtml(mail.to)}, ${escapeHtml(mail.receivedAt)}</div></li>`,
  );
  const list =
    items.length === 0 ? '<p>No message has been sent yet.</p>' : `<ul>${items.join('')}</ul>`;
  return page(
    'Local mailbox',
    `<h1>Local mailbox</h1><p class="quiet">Messages that this laboratory sent. None of them left this machine.</p>${list}`,
  );
}

export function messagePage(mail: StoredMail): string {
  const rows = [
    ['From', mail.from],
    ['To', mail.to],
    ['Received', mail.receivedAt],
  ].map(([name, value]) => `<dt>${name}</dt><dd>${escapeHtml(value)}</dd>`);
  return page(
    mail.subject,
    `<p><a href="/">All messages</a></p><article><h1>${escapeHtml(mail.subject || 'No subject')}</h1>
<dl>${rows.join('')}</dl><pre>${linkText(mail.text)}</pre></article>`,
  );
}
