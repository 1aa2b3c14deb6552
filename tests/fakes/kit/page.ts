const entities: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character] ?? character);
}

const style = `
:root { color-scheme: light dark; --line: light-dark(#9a9a9a, #6d6d6d); --note: light-dark(#fff6cf, #3a3413); }
* { box-sizing: border-box; } html { background: light-dark(#fff, #16181a); color: light-dark(#16181a, #eee); }
a { color: light-dark(#0b3d91, #a8c7ff); }
body { margin: 0 auto; padding: 1rem; max-width: 56rem; font: 16px/1.5 ui-monospace, monospace; overflow-wrap: anywhere; }
.stand-in { margin: 0 0 1rem; padding: .25rem .75rem; background: var(--note); border: 1px dashed var(--line); }
h1 { font-size: 1.25rem; } h2 { font-size: 1rem; margin-top: 1.5rem; }
section { border-top: 1px dashed var(--line); padding-bottom: .75rem; }
dl { display: grid; grid-template-columns: minmax(6rem, max-content) 1fr; gap: .25rem 1rem; margin: .5rem 0; }
dt { opacity: .8; } dd { margin: 0; }
form { display: inline-flex; flex-wrap: wrap; gap: .5rem; align-items: end; margin: .25rem .5rem .25rem 0; max-width: 100%; }
label { display: grid; grid-template-columns: minmax(0, max-content); max-width: 100%; } input, select, button { font: inherit; min-height: 2.25rem; max-width: 100%; }
button { padding: 0 .75rem; } iframe { width: 100%; height: 32rem; border: 1px solid var(--line); background: #fff; }
pre { white-space: pre-wrap; } li { margin-bottom: .5rem; }
`;

/** The plain look of a stand-in's own pages; it says on top that nothing here is the real service. */
export function renderPage(title: string, body: string): string {
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escapeHtml(title)} (local stand-in)</title><link rel="icon" href="data:,"><style>${style}</style></head>
<body><main><p class="stand-in">Local stand-in: for trying things out on this machine. Nothing here is real.</p>
<h1>${escapeHtml(title)}</h1>
${body}
</main></body></html>`;
}

/** One button that posts fixed values. */
export function button(action: string, text: string, values: Record<string, string> = {}): string {
  const fields = Object.entries(values)
    .map(([name, value]) => `<input type="hidden" name="${escapeHtml(name)}" value="${escapeHtml(value)}">`)
    .join('');
  return `<form method="post" action="${escapeHtml(action)}">${fields}<button>${escapeHtml(text)}</button></form>`;
}
