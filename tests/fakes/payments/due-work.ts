import { settleDue } from './balances.ts';
import type { Fake } from './fake.ts';
import { expireDue } from './resources/checkout-sessions.ts';
import { advancePayouts } from './resources/payout-progress.ts';

/** Everything that happens by the clock alone. */
export function runDue(fake: Fake): void {
  const settled = settleDue(fake);
  const expired = expireDue(fake);
  const moved = advancePayouts(fake);
  if (settled || expired || moved) fake.store.touch();
}
