import { button, escapeHtml, renderPage } from '../kit/page.ts';
import { orders, type Tracker, type Trackers } from './trackers.ts';

function trackerSection(tracker: Tracker): string {
  const number = tracker.trackingNumber;
  const events = tracker.events.map(({ at, code, description, place, signedBy }) => {
    const signature = signedBy ? `, signed by ${signedBy}` : '';
    return `<li>${at} ${code}: ${escapeHtml(`${description}, ${place}${signature}`)}</li>`;
  });
  const isRunning = ['registered', 'accepted', 'in_transit'].includes(tracker.status);
  const buttons = orders.map((order) =>
    button(`/control/trackers/${encodeURIComponent(number)}/${order}`, `${order} ${number}`),
  );
  return `<section><h2>${escapeHtml(`${tracker.carrier} ${number}`)}</h2>
<dl><dt>status</dt><dd>${tracker.status}</dd><dt>reference</dt><dd>${escapeHtml(tracker.reference)}</dd></dl>
<ol>${events.join('')}</ol>${isRunning ? `<div>${buttons.join('')}</div>` : ''}</section>`;
}

export function renderCarrierPage(trackers: Trackers): string {
  const list = trackers.newestFirst();
  const clock = [30, 120, 3600, 86400]
    .map((seconds) => button('/control/clock', `Clock +${seconds} s`, { advanceSeconds: String(seconds) }))
    .join('');
  const faults = ['none', 'down', 'slow', 'garbage']
    .map((kind) => button('/control/faults', `Fault ${kind}`, { kind }))
    .join('');
  return renderPage(
    'Parcel carrier',
    `<dl><dt>clock</dt><dd>${new Date(trackers.nowMs()).toISOString()}</dd>
<dt>fault</dt><dd>${trackers.state.fault}</dd></dl><div>${clock}</div><div>${faults}</div>
${list.length ? list.map(trackerSection).join('\n') : '<p>No parcel has been registered yet.</p>'}`,
  );
}
