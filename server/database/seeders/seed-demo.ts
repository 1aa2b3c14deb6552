import { randomInt } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import '#server/models/index.ts';
import { pollParcels } from '#jobs/poll-parcels.ts';
import { pollQuotes } from '#jobs/poll-quotes.ts';
import { providerTaskHandlers } from '#jobs/perform-provider-tasks.ts';
import { runProviderTasks } from '#jobs/run-provider-tasks.ts';
import { cancelUnshippedDeals } from '#jobs/cancel-unshipped-deals.ts';
import { lapseUnfundedDealsJob } from '#jobs/lapse-unfunded-deals.ts';
import { sequelize } from '#server/database/connection.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { quoteClient } from '#server/integrations/clients.ts';
import type { HistoricQuote } from '#server/integrations/quotes.ts';
import { logger } from '#server/logger.ts';
import { DemoClock } from './demo-clock.ts';
import { DEMO_PEOPLE, DEMO_LABORATORIES } from './demo-people.ts';
import { importQuotes } from './demo-quotes.ts';
import { press } from './demo-services.ts';
import { castOf, openPayouts, openStage } from './demo-stage.ts';
import { tellStory, type Stage } from './demo-story.ts';
import { drawAhead } from './demo-drawings.ts';

const HISTORY_DAYS = 60;

/** Sixty days of quotes, one a day, as the service itself remembers them. */
function importHistory(history: readonly HistoricQuote[], until: Date): Promise<void> {
  return importQuotes(history.filter(({ at }) => at < until));
}

/** Readable aloud, and another one in every data folder. */
function inventPassword(): string {
  const words = [
    'cupel',
    'anvil',
    'borax',
    'crucible',
    'ingot',
    'touchstone',
    'bellows',
    'flux',
    'mould',
    'tongs',
  ];
  const pick = () => words[randomInt(words.length)]!;
  return `${pick()}-${pick()}-${randomInt(1000, 10_000)}`;
}

/** What the jobs would have done by then. */
async function runDueWork(): Promise<void> {
  await runProviderTasks(providerTaskHandlers);
  await pollParcels({ log: logger });
  const now = await databaseNow();
  await cancelUnshippedDeals({ now });
  await lapseUnfundedDealsJob.run({ now, log: logger });
  await runProviderTasks(providerTaskHandlers);
}

export async function seedDemo(): Promise<void> {
  const file = process.env.DEMO_ACCOUNTS_FILE;
  const begun = new Date();
  drawAhead();
  const from = new Date(begun.getTime() - HISTORY_DAYS * 86_400_000);
  const history = await quoteClient().fetchHistory(from, begun);
  const clock = new DemoClock(begun, history);
  const stage = await openStage();
  // The other instance of the API lives in the present; it hears of all this when the story has reached it.
  await press('payments', '/control/webhooks', { mode: 'hold' });
  try {
    const begin = clock.moment(40, 8);
    await importHistory(history, begin);
    await clock.goTo(begin);
    const password = inventPassword();
    const { people, accounts } = await castOf(stage.origin, password);
    for (const laboratory of DEMO_LABORATORIES)
      await people.desk.visitor.post('/api/v1/laboratories', laboratory);
    for (const [key, { sells }] of Object.entries(DEMO_PEOPLE)) {
      if (sells) await openPayouts(people[key as keyof typeof DEMO_PEOPLE], key === 'wren');
    }
    const told: Stage = { clock, people, runDueWork };
    const today = await tellStory(told);
    await clock.backToNow();
    await importHistory(history, new Date());
    await pollQuotes();
    await today();
    if (file !== undefined)
      await writeFile(file, JSON.stringify({ password, accounts }, null, 2), { mode: 0o600 });
  } finally {
    await press('payments', '/control/webhooks', { mode: 'normal' });
    await press('payments', '/control/webhooks/flush');
    await stage.close();
    await sequelize.close();
  }
}
