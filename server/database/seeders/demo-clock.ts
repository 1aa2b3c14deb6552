import { pinDatabaseTime, withTransaction } from '#server/database/transaction.ts';
import { importQuote } from '#server/features/quotes/import-quote.ts';
import type { HistoricQuote } from '#server/integrations/quotes.ts';
import { press } from './demo-services.ts';

const DAY_MS = 86_400_000;

/** Tells the demo from its beginning: the database and the stand-ins are put to the moment at which something happened. */
export class DemoClock {
  readonly today: Date;
  readonly #history: readonly HistoricQuote[];
  #offsetSeconds = 0;

  constructor(today: Date, history: readonly HistoricQuote[]) {
    this.today = today;
    this.#history = history;
  }

  /** So many days ago, at an hour of UTC. */
  moment(daysAgo: number, hour: number, minute = 0): Date {
    const day = new Date(this.today.getTime() - daysAgo * DAY_MS);
    day.setUTCHours(hour, minute, 0, 0);
    return day;
  }

  dayOf(daysAgo: number): string {
    return this.moment(daysAgo, 12).toISOString().slice(0, 10);
  }

  async goTo(moment: Date): Promise<void> {
    const offset = Math.trunc((moment.getTime() - Date.now()) / 1000);
    const step = offset - this.#offsetSeconds;
    await press('payments', '/control/clock', { advanceSeconds: step });
    await press('carrier', '/control/clock', { advanceSeconds: step });
    this.#offsetSeconds = offset;
    pinDatabaseTime(moment);
    await this.#quoteAt(moment);
  }

  async backToNow(): Promise<void> {
    await press('payments', '/control/clock', { advanceSeconds: -this.#offsetSeconds });
    await press('carrier', '/control/clock', { advanceSeconds: -this.#offsetSeconds });
    this.#offsetSeconds = 0;
    pinDatabaseTime(null);
  }

  /** Each act finds a fresh quote with that day's value. */
  async #quoteAt(moment: Date): Promise<void> {
    const day = moment.toISOString().slice(0, 10);
    const at = new Date(moment.getTime() - 40_000);
    for (const { metal, mid } of this.#history.filter((quote) => quote.date === day)) {
      await withTransaction({}, (unit) => importQuote({ metal, mid, at, source: 'quote service' }, unit));
    }
  }
}
