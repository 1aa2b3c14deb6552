/** Text for a page; everything that came from outside goes through here. */
export function escapeHtml(value: string): string {
  return value
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

const style = `
:root { color-scheme: light dark; --line: light-dark(#8a8f86, #7b8078); --quiet: light-dark(#4d524a, #b6bbb2);
  --paper: light-dark(#f4f3ee, #1d1f1b); --ink: light-dark(#20231e, #eceee8); --strip: light-dark(#e5dfc4, #3b3722);
  --button: light-dark(#33502f, #b9d3a8); --on-button: light-dark(#ffffff, #14210f); --bad: light-dark(#9b1c1c, #ffb4a8); }
* { box-sizing: border-box; }
body { margin: 0; background: var(--paper); color: var(--ink); font: 1rem/1.5 ui-monospace, 'DejaVu Sans Mono', monospace; }
.notice { background: var(--strip); padding: .75rem 1rem; border-bottom: 2px dashed var(--line); }
main { max-width: 40rem; margin: 0 auto; padding: 1rem; }
main.wide { max-width: 70rem; }
h1 { font-size: 1.4rem; } h2 { font-size: 1.1rem; margin-top: 2rem; }
label { display: block; font-weight: bold; margin-top: 1rem; }
.hint { color: var(--quiet); margin: 0; }
input, select { font: inherit; color: inherit; background: transparent; border: 2px solid var(--line); padding: .5rem; width: 100%; min-height: 2.75rem; }
select option { color: black; }
.short { max-width: 9rem; }
[aria-invalid='true'] { border-color: var(--bad); }
button, .button { display: inline-block; font: inherit; min-height: 2.75rem; padding: .5rem 1rem; margin: 1rem .5rem 0 0; cursor: pointer; text-decoration: none;
  border: 2px solid var(--button); background: var(--button); color: var(--on-button); }
.button.plain, button.plain { background: transparent; color: var(--ink); border-color: var(--line); }
td button { margin: .15rem; min-height: 2rem; padding: .25rem .5rem; }
:focus-visible { outline: 3px solid var(--ink); outline-offset: 2px; }
.error { color: var(--bad); font-weight: bold; margin: 0; }
.problem { border: 2px solid var(--bad); padding: 0 1rem 1rem; margin: 1rem 0; }
.problem a { color: var(--bad); }
.scroll { overflow-x: auto; }
table { border-collapse: collapse; width: 100%; } caption { text-align: left; color: var(--quiet); }
th, td { text-align: left; padding: .35rem .5rem; border-bottom: 1px solid var(--line); vertical-align: top; }
.figure { text-align: right; white-space: nowrap; }
form.row { display: flex; flex-wrap: wrap; gap: .75rem; align-items: end; } form.row > div { flex: 1 1 10rem; }
`;

/** The frame of each page. `body` is markup, so its parts must have been escaped. */
export function page(title: string, body: string, more: { wide?: boolean } = {}): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="robots" content="noindex">
<title>${escapeHtml(title)} · Test payments</title>
<link rel="icon" href="data:,">
<style>${style}</style>
</head>
<body>
<header class="notice"><strong>Test payments</strong>: a local stand-in for a payment service. No real money moves; never type a real card or bank number.</header>
<main${more.wide ? ' class="wide"' : ''}>
${body}
</main>
</body>
</html>`;
}

export function dollars(minor: number): string {
  const sign = minor < 0 ? '−' : '';
  const digits = `${Math.abs(minor)}`.padStart(3, '0');
  const whole = digits.slice(0, -2).replace(/\B(?=(\d{3})+$)/g, ',');
  return `${sign}$${whole}.${digits.slice(-2)}`;
}

export interface FieldError {
  field: string;
  message: string;
}

/** One summary on top; each line leads to its field. */
export function errorSummary(errors: FieldError[]): string {
  if (errors.length === 0) return '';
  const lines = errors.map(
    (error) => `<li><a href="#${escapeHtml(error.field)}">${escapeHtml(error.message)}</a></li>`,
  );
  return `<div class="problem" tabindex="-1" id="problem" autofocus><div role="alert"><h2>There is a problem</h2><ul>${lines.join('')}</ul></div></div>`;
}

interface Field {
  name: string;
  label: string;
  hint: string;
  value: string;
  attributes: string;
  errors: FieldError[];
}

export function textField({ name, label, hint, value, attributes, errors }: Field): string {
  const error = errors.find((candidate) => candidate.field === name);
  const described = [hint === '' ? '' : `${name}-hint`, error ? `${name}-error` : '']
    .filter(Boolean)
    .join(' ');
  return `<label for="${name}">${escapeHtml(label)}</label>
${hint === '' ? '' : `<p class="hint" id="${name}-hint">${escapeHtml(hint)}</p>`}
${error ? `<p class="error" id="${name}-error">${escapeHtml(error.message)}</p>` : ''}
<input id="${name}" name="${name}" value="${escapeHtml(value)}" ${described === '' ? '' : `aria-describedby="${described}"`} ${error ? 'aria-invalid="true"' : ''} ${attributes}>`;
}
