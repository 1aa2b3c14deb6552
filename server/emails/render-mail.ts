import type { MailContent, MailReader } from './define-mail.ts';

export type RenderedMail = { subject: string; text: string; html: string };

const FOOT =
  'Scruple holds the money until the buyer has the metal. This mail was sent because of what happened in your account; replies to it are not read.';

const ENTITIES: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => ENTITIES[sign] ?? sign);
}

/** A header is one line: what a member typed into a title must not begin another. */
function oneLine(text: string): string {
  return text.replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ').trim();
}

function renderText(content: MailContent, reader: MailReader, address: string | null): string {
  const width = Math.max(0, ...content.facts.map(({ label }) => label.length));
  const facts = content.facts.map(({ label, value }) => `  ${`${label}:`.padEnd(width + 2)}${value}`);
  const action = content.action === null || address === null ? [] : [`${content.action.label}:\n${address}`];
  return [
    `${content.heading}\n${'='.repeat(content.heading.length)}`,
    `Dear ${reader.displayName},`,
    ...content.paragraphs,
    ...(facts.length === 0 ? [] : [facts.join('\n')]),
    ...action,
    ...content.closing,
    `-- \n${FOOT}`,
  ].join('\n\n');
}

const FONT = "font-family:'DM Sans',-apple-system,'Segoe UI',Roboto,Helvetica,Arial,sans-serif";
const FIGURES = "font-family:'DM Mono',ui-monospace,Menlo,Consolas,monospace";

/** Dark colours where the reader's program asks for them; without the style block the mail is light, and whole. */
const STYLE = `
  :root { color-scheme: light dark; }
  @media (prefers-color-scheme: dark) {
    .page { background: #161b1d !important; }
    .card { background: #1d2426 !important; border-color: #343d3f !important; }
    .card, .card h1, .card td { color: #ece7dc !important; }
    .quiet { color: #a6aeac !important; }
    .rule { border-color: #343d3f !important; }
    .act { background: #6fc2b0 !important; color: #161b1d !important; }
  }`;

function paragraph(text: string): string {
  return `<p style="margin:0 0 14px;line-height:1.5">${escapeHtml(text)}</p>`;
}

function factRow({ label, value }: { label: string; value: string }): string {
  return `<tr><td class="quiet rule" style="padding:7px 12px 7px 0;overflow-wrap:normal;border-top:1px solid #d8d1c3;color:#566064;vertical-align:top">${escapeHtml(label)}</td><td class="rule" style="padding:7px 0;border-top:1px solid #d8d1c3;text-align:right;${FIGURES};font-size:14px">${escapeHtml(value)}</td></tr>`;
}

function renderHtml(content: MailContent, reader: MailReader, address: string | null): string {
  const facts =
    content.facts.length === 0
      ? ''
      : `<table role="presentation" width="100%" cellpadding="0" cellspacing="0" style="margin:4px 0 18px;border-collapse:collapse;font-size:15px">${content.facts.map(factRow).join('')}</table>`;
  const action =
    content.action === null || address === null
      ? ''
      : `<p style="margin:0 0 18px"><a class="act" href="${escapeHtml(address)}" style="display:inline-block;padding:12px 18px;background:#17685c;color:#fffdf8;text-decoration:none;border-radius:4px;font-weight:600">${escapeHtml(content.action.label)}</a></p>`;
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><meta name="color-scheme" content="light dark"><title>${escapeHtml(content.subject)}</title><style>${STYLE}</style></head>
<body class="page" style="margin:0;padding:16px 8px;background:#f6f3ec">
<div class="card" style="max-width:560px;margin:0 auto;padding:22px 20px;background:#fffdf8;border:1px solid #d8d1c3;border-radius:6px;color:#1c2427;${FONT};font-size:16px;overflow-wrap:anywhere">
<h1 style="margin:0 0 16px;font-size:21px;line-height:1.25">${escapeHtml(content.heading)}</h1>
${paragraph(`Dear ${reader.displayName},`)}${content.paragraphs.map(paragraph).join('')}${facts}${action}${content.closing.map(paragraph).join('')}
<p class="quiet rule" style="margin:20px 0 0;padding-top:12px;border-top:1px solid #d8d1c3;color:#566064;font-size:13px;line-height:1.45">${escapeHtml(FOOT)}</p>
</div></body></html>
`;
}

/** The same content as text and as HTML. Whatever a member typed is escaped; nothing is fetched from elsewhere. */
export function renderMail(content: MailContent, reader: MailReader, publicUrl: string): RenderedMail {
  const address = content.action === null ? null : new URL(content.action.path, publicUrl).href;
  return {
    subject: oneLine(content.subject),
    text: renderText(content, reader, address),
    html: renderHtml(content, reader, address),
  };
}
