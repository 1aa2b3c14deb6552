import { pinDatabaseTime } from '#server/database/transaction.ts';
import type { HistoricQuote } from '#server/integrations/quotes.ts';
import { importQuotes } from './demo-quotes.ts';
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
    this.#offsetSeconds = offset;
    pinDatabaseTime(moment);
    await Promise.all([this.#turnServices(step), this.#quoteAt(moment)]);
  }

  async backToNow(): Promise<void> {
    await this.#turnServices(-this.#offsetSeconds);
    this.#offsetSeconds = 0;
    pinDatabaseTime(null);
  }

  async #turnServices(advanceSeconds: number): Promise<void> {
    const turn = (service: 'payments' | 'carrier') => press(service, '/control/clock', { advanceSeconds });
    await Promise.all([turn('payments'), turn('carrier')]);
  }

  /** Each act finds a fresh quote with that day's value. */
  async #quoteAt(moment: Date): Promise<void> {
    const day = moment.toISOString().slice(0, 10);
    const at = new Date(moment.getTime() - 40_000);
    const quotes = this.#history.filter((quote) => quote.date === day);
    await importQuotes(quotes.map(({ metal, mid }) => ({ metal, mid, at })));
  }
}
