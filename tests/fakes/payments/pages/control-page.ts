import type { Fake } from '../fake.ts';
import { allOf, now, ownerOf } from '../fake.ts';
import { balanceOf } from '../balances.ts';
import { webhookModes } from '../state.ts';
import { dollars, escapeHtml, page } from './layout.ts';

const shownMax = 20;

function table(caption: string, heads: string[], rows: string[][]): string {
  if (rows.length === 0) return `<p>${escapeHtml(caption)}: none yet.</p>`;
  const head = heads.map((name) => `<th scope="col">${escapeHtml(name)}</th>`).join('');
  const body = rows.map((cells) => `<tr>${cells.map((cell) => `<td>${cell}</td>`).join('')}</tr>`).join('');
  return `<div class="scroll" tabindex="0" role="region" aria-label="${escapeHtml(caption)}"><table><caption>${escapeHtml(caption)}</caption><thead><tr>${head}</tr></thead><tbody>${body}</tbody></table></div>`;
}

function button(action: string, label: string, fields: Record<string, string> = {}): string {
  const hidden = Object.entries(fields)
    .map(([name, value]) => `<input type="hidden" name="${name}" value="${escapeHtml(value)}">`)
    .join('');
  return `<form method="post" action="${action}" style="display:inline">${hidden}<button class="plain" type="submit">${escapeHtml(label)}</button></form>`;
}

function payoutRows(fake: Fake): string[][] {
  return allOf(fake, 'payout')
    .slice(0, shownMax)
    .map((payout) => {
      const base = `/control/payouts/${payout.id}`;
      const isMoving = payout.status === 'pending' || payout.status === 'in_transit';
      const pay = isMoving ? button(`${base}/pay`, `Pay ${payout.id.slice(-4)}`) : '';
      const fail =
        isMoving || payout.status === 'paid' ? button(`${base}/fail`, `Fail ${payout.id.slice(-4)}`) : '';
      return [payout.id, ownerOf(fake, payout.id) ?? '', dollars(payout.amount), payout.status, pay + fail];
    });
}

function eventRows(fake: Fake): string[][] {
  return allOf(fake, 'event')
    .slice(0, shownMax)
    .map((event) => {
      const delivery = fake.state.deliveries[event.id];
      const told = delivery ? `${delivery.state} (${delivery.attempts} tries)` : 'no webhook';
      const again = button('/control/webhooks/redeliver', `Send ${event.id.slice(-4)} again`, {
        eventId: event.id,
      });
      return [event.id, event.type, told, delivery ? again : ''];
    });
}

function sessionRows(fake: Fake): string[][] {
  return allOf(fake, 'checkout.session')
    .slice(0, shownMax)
    .map((session) => [
      session.url
        ? `<a href="${escapeHtml(session.url)}">${session.id.slice(0, 20)}…</a>`
        : `${session.id.slice(0, 20)}…`,
      dollars(session.amount_total ?? 0),
      session.status ?? '',
      session.payment_status,
      escapeHtml(session.client_reference_id ?? ''),
    ]);
}

function balanceRows(fake: Fake): string[][] {
  const owners = ['platform', ...allOf(fake, 'account').map((account) => account.id)];
  return owners.map((owner) => {
    const { available, pending } = balanceOf(fake, owner);
    return [owner, dollars(available), dollars(pending)];
  });
}

function modeForm(fake: Fake): string {
  const { webhookMode, webhookDelayMs } = fake.state.settings;
  const options = webhookModes
    .map((mode) => `<option${mode === webhookMode ? ' selected' : ''}>${mode}</option>`)
    .join('');
  return `<form class="row" method="post" action="/control/webhooks">
<div><label for="mode">How events are delivered</label><select id="mode" name="mode">${options}</select></div>
<div><label for="delayMs">Delay in milliseconds</label><input id="delayMs" name="delayMs" inputmode="numeric" value="${webhookDelayMs}"></div>
<div><button type="submit">Set</button></div></form>`;
}

/** A page of buttons, so that a person can see every ending. */
export function controlPage(fake: Fake): string {
  const clock = new Date(now(fake) * 1000).toISOString();
  const movements = allOf(fake, 'transfer').slice(0, shownMax);
  const body = `<h1>Controls</h1>
<h2>Clock</h2>
<p>It is ${clock} here, ${fake.state.clockOffsetSeconds} s ahead of real time.</p>
${button('/control/clock', 'One hour on', { advanceSeconds: '3600' })}
${button('/control/clock', 'One day on', { advanceSeconds: '86400' })}
${button('/control/clock', 'Seven days on', { advanceSeconds: '604800' })}
<h2>Payouts</h2>
${table('Payouts, newest first', ['Payout', 'Account', 'Amount', 'Status', 'Do'], payoutRows(fake))}
<h2>Events</h2>
${modeForm(fake)}
${button('/control/webhooks/flush', 'Deliver all that is held, dropped or late')}
${table('Events, newest first', ['Event', 'Type', 'Delivery', 'Do'], eventRows(fake))}
<h2>Checkout sessions</h2>
${table('Sessions, newest first', ['Session', 'Amount', 'Status', 'Payment', 'Reference'], sessionRows(fake))}
<h2>Balances</h2>
${table('Balances', ['Owner', 'Available', 'Pending'], balanceRows(fake))}
${table(
  'Transfers, newest first',
  ['Transfer', 'To', 'Amount', 'Reversed'],
  movements.map((transfer) => [
    transfer.id,
    String(transfer.destination),
    dollars(transfer.amount),
    dollars(transfer.amount_reversed),
  ]),
)}
<p><a href="/control/dump">All objects</a> · <a href="/control/books">The books</a></p>`;
  return page('Controls', body, { wide: true });
}
