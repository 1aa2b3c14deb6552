import { button, escapeHtml, renderPage } from '../kit/page.ts';
import { codeScenarios, serviceScenarios, type QuoteBook } from './book.ts';
import { quotedCodes, type QuotedCode } from './walk.ts';

function metalSection(book: QuoteBook, code: QuotedCode): string {
  const [entry] = book.entries([code]);
  const running = book.state.codes[code];
  const polls = running?.pollsLeft === null ? '' : `, ${running?.pollsLeft} polls left`;
  const buttons = ['normal', ...codeScenarios]
    .map((scenario) =>
      button('/control/scenario', `${code} ${scenario}`, { scenario, code, percent: '5', polls: '' }),
    )
    .join('');
  const pinned = book.state.pins[code];
  return `<section><h2>${code}</h2><dl>
<dt>mid</dt><dd>${escapeHtml(entry?.mid ?? '')}${pinned ? ' (held)' : ''}</dd>
<dt>bid, ask</dt><dd>${escapeHtml(entry?.bid ?? '')}, ${escapeHtml(entry?.ask ?? '')}</dd>
<dt>time</dt><dd>${escapeHtml(entry?.at ?? '')}</dd>
<dt>scenario</dt><dd>${running ? escapeHtml(running.name + polls) : 'normal'}</dd></dl>
<form method="post" action="/control/set"><input type="hidden" name="code" value="${code}">
<label>${code} value to hold (empty: walk on)<input name="mid" inputmode="decimal" value="${escapeHtml(pinned ?? '')}"></label>
<button>Hold ${code}</button></form>
<form method="post" action="/control/scenario"><input type="hidden" name="scenario" value="spike"><input type="hidden" name="code" value="${code}">
<label>${code} spike in percent<input name="percent" value="5" size="6"></label>
<label>${code} polls<input name="polls" value="3" size="4"></label><button>Spike ${code}</button></form>
<div>${buttons}</div></section>`;
}

export function renderQuotesPage(book: QuoteBook): string {
  const market = book.market();
  const service = book.state.service?.name ?? 'normal';
  const serviceButtons = ['normal', ...serviceScenarios]
    .map((scenario) => button('/control/scenario', `Service ${scenario}`, { scenario }))
    .join('');
  const clockButtons = [60, 600, 3600, 86400]
    .map((seconds) => button('/control/clock', `Clock +${seconds} s`, { advanceSeconds: String(seconds) }))
    .join('');
  return renderPage(
    'Spot quotes',
    `<dl><dt>clock</dt><dd>${new Date(book.nowMs()).toISOString()}</dd>
<dt>market</dt><dd>${market.open ? 'open' : 'closed'} until ${market.until}</dd>
<dt>service</dt><dd>${escapeHtml(service)}</dd></dl>
<p>US$ per troy ounce. An invented walk, one step a minute; open on every day unless closed here.</p>
<div>${serviceButtons}</div><div>${clockButtons}</div>
${quotedCodes.map((code) => metalSection(book, code)).join('\n')}`,
  );
}
