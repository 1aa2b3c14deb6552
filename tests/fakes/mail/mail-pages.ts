import { button, escapeHtml, renderPage } from '../kit/page.ts';
import type { MailDoor } from './mail-door.ts';
import type { KeptMessage, MailStore } from './mail-store.ts';

const mailboxPath = (to: string | null) => (to ? `/?to=${encodeURIComponent(to)}` : '/');

function messageLine({ id, subject, receivedAt, envelopeTo, attachments }: KeptMessage): string {
  const files = attachments.length ? `, ${attachments.length} attached` : '';
  return `<li><a href="/messages/${id}">${escapeHtml(subject || '(no subject)')}</a><br>
to ${escapeHtml(envelopeTo.join(', '))}, <time>${receivedAt}</time>${files}</li>`;
}

export function renderMailbox(store: MailStore, door: MailDoor, to: string | null): string {
  const messages = store.list(to);
  const options = store
    .recipients()
    .map((each) => `<option${each === to ? ' selected' : ''}>${escapeHtml(each)}</option>`)
    .join('');
  const fault = door.fault;
  const faults = [
    button('/control/faults', 'All well', { kind: 'none' }),
    button('/control/faults', 'Refuse for now (450)', { kind: 'refuse', code: '450' }),
    button('/control/faults', 'Refuse for good (550)', { kind: 'refuse', code: '550' }),
    button('/control/faults', 'Delay 10 s', { kind: 'delay', seconds: '10' }),
    button('/control/faults', 'Server down', { kind: 'down' }),
  ];
  const details = 'code' in fault ? ` ${fault.code}` : '';
  return renderPage(
    to ? `Mail for ${to}` : 'All mail',
    `<form method="get" action="/"><label>Mailbox<select name="to"><option value="">everyone</option>${options}</select></label>
<button>Open mailbox</button></form>
<p>${messages.length} ${messages.length === 1 ? 'message' : 'messages'}, newest first.</p>
<ul>${messages.map(messageLine).join('\n')}</ul>
<section><h2>Mail server</h2><p>Now: ${fault.kind}${details}; SMTP port ${door.port}.</p>
<div>${faults.join('')}</div></section>`,
  );
}

/** Escapes first, so that only our own anchors are markup. */
function linked(text: string): string {
  return escapeHtml(text).replace(
    /https?:\/\/[^\s<>()]+[^\s<>().,;:!?]/g,
    (url) => `<a href="${url}">${url}</a>`,
  );
}

/** Scripts stay off inside the frame; its links open in a new page. */
function preview(html: string): string {
  const source = `<base target="_blank">${html}`;
  return `<section><h2>As HTML</h2><iframe title="The message as HTML" sandbox="allow-popups allow-popups-to-escape-sandbox" srcdoc="${escapeHtml(source)}"></iframe></section>`;
}

export function renderMessage(message: KeptMessage): string {
  const { id, subject, from, to, envelopeTo, receivedAt, text, html, attachments } = message;
  const files = attachments.map(
    ({ filename, contentType, size }, index) =>
      `<li><a href="/control/attachments/${id}/${index + 1}">${escapeHtml(filename)}</a> (${escapeHtml(contentType)}, ${size} bytes)</li>`,
  );
  const owner = envelopeTo[0] ?? null;
  return renderPage(
    subject || '(no subject)',
    `<p><a href="${escapeHtml(mailboxPath(owner))}">Mailbox of ${escapeHtml(owner ?? 'everyone')}</a></p>
<dl><dt>from</dt><dd>${escapeHtml(from)}</dd><dt>to</dt><dd>${escapeHtml(to)}</dd>
<dt>received</dt><dd><time>${receivedAt}</time></dd></dl>
${files.length ? `<section><h2>Attached</h2><ul>${files.join('')}</ul></section>` : ''}
<section><h2>As text</h2><pre>${linked(text)}</pre></section>
${html === null ? '' : preview(html)}`,
  );
}
