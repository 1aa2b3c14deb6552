import type { DemoClock } from './demo-clock.ts';
import type { DemoLot } from './demo-lot.ts';
import { DEMO_LOTS } from './demo-lots.ts';
import type { PersonKey, StaffKey } from './demo-people.ts';
import { decideAtDesk, writeLot } from './demo-selling.ts';
import { press } from './demo-services.ts';
import type { DemoPerson } from './demo-stage.ts';
import { buy, pay, settlePayout, ship, weigh } from './demo-trading.ts';

export type Stage = {
  clock: DemoClock;
  people: Record<PersonKey | StaffKey, DemoPerson>;
  runDueWork: () => Promise<void>;
};

type Act = { daysAgo: number; hour: number; minute?: number; run: () => Promise<void> };

/** Codes by the keys of the story, filled as it is told. */
type Memory = { lots: Record<string, string>; deals: Record<string, string> };

function sellingActs({ clock, people }: Stage, memory: Memory): Act[] {
  return DEMO_LOTS.flatMap((lot: DemoLot, index): Act[] => {
    const written = lot.submitted ?? 2;
    const issuedOn = clock.dayOf(written + 3);
    const write: Act = {
      daysAgo: written,
      hour: 7,
      minute: index,
      run: async () => {
        memory.lots[lot.key] = await writeLot(lot, people[lot.seller], issuedOn);
      },
    };
    if (lot.submitted === null) return [write];
    const desk = index % 3 === 0 ? people.desk2 : people.desk;
    const decide: Act = {
      daysAgo: written,
      hour: 9,
      minute: index,
      run: () => decideAtDesk(lot, memory.lots[lot.key]!, desk, clock.dayOf(written)),
    };
    return [write, decide];
  });
}

type Ending =
  | 'agreed'
  | 'lapsed'
  | 'funded'
  | 'notshipped'
  | 'shipped'
  | 'delivered'
  | 'contested'
  | 'refunded'
  | 'accepted';
type Trade = {
  lot: string;
  buyer: 'bruna' | 'hale' | 'wren';
  bought: number;
  ending: Ending;
  weighed?: { value: string; unit: string };
};

const TRADES: readonly Trade[] = [
  { lot: 'paidout2', buyer: 'hale', bought: 29, ending: 'accepted', weighed: { value: '9.241', unit: 'g' } },
  { lot: 'notshipped', buyer: 'bruna', bought: 27, ending: 'notshipped' },
  { lot: 'paidout', buyer: 'bruna', bought: 25, ending: 'accepted', weighed: { value: '38.56', unit: 'g' } },
  { lot: 'refunded', buyer: 'hale', bought: 24, ending: 'refunded', weighed: { value: '17.90', unit: 'g' } },
  {
    lot: 'payoutfails',
    buyer: 'bruna',
    bought: 23,
    ending: 'accepted',
    weighed: { value: '13.774', unit: 'g' },
  },
  {
    lot: 'contested',
    buyer: 'hale',
    bought: 8,
    ending: 'contested',
    weighed: { value: '14.6', unit: 'ozt' },
  },
  { lot: 'delivered', buyer: 'bruna', bought: 6, ending: 'delivered' },
  { lot: 'shipped', buyer: 'wren', bought: 4, ending: 'shipped' },
  { lot: 'lapsed', buyer: 'hale', bought: 3, ending: 'lapsed' },
  { lot: 'funded', buyer: 'bruna', bought: 1, ending: 'funded' },
];

function tradingActs(stage: Stage, memory: Memory, trade: Trade, index: number): Act[] {
  const { people, runDueWork } = stage;
  const buyer = people[trade.buyer];
  const seller = people[DEMO_LOTS.find((lot) => lot.key === trade.lot)!.seller];
  const tracking = `VP 26 ${String(4100 + index * 37)} ${String(1000 + index * 113)}`;
  const day = trade.bought;
  const code = () => memory.deals[trade.lot]!;
  const at = (daysAgo: number, hour: number, run: () => Promise<void>): Act => ({
    daysAgo,
    hour,
    minute: index,
    run,
  });
  const purchase = at(day, 12, async () => {
    memory.deals[trade.lot] = await buy(memory.lots[trade.lot]!, buyer);
    if (trade.ending !== 'lapsed' && trade.ending !== 'agreed') await pay(code(), buyer);
  });
  if (trade.ending === 'lapsed') return [purchase, at(day, 13, runDueWork)];
  if (trade.ending === 'funded') return [purchase];
  if (trade.ending === 'notshipped')
    return [purchase, at(day - 8, 12, runDueWork), at(day - 8, 13, runDueWork)];
  const hold = trade.ending === 'shipped';
  const shipIt = at(day - 1, 11, async () => {
    await ship(code(), seller, tracking);
    await runDueWork();
    await press('carrier', `/control/trackers/${encodeURIComponent(tracking)}/hold`);
  });
  if (hold) return [purchase, shipIt];
  const deliver = at(day - 3, 10, async () => {
    await press('carrier', `/control/trackers/${encodeURIComponent(tracking)}/deliver`);
    await runDueWork();
  });
  if (trade.ending === 'delivered') return [purchase, shipIt, deliver];
  return [purchase, shipIt, deliver, ...endingActs(stage, trade, code, at)];
}

function endingActs(
  { people, runDueWork, clock }: Stage,
  trade: Trade,
  code: () => string,
  at: (daysAgo: number, hour: number, run: () => Promise<void>) => Act,
): Act[] {
  const buyer = people[trade.buyer];
  const day = trade.bought - 4;
  if (trade.ending === 'contested' || trade.ending === 'refunded') {
    const contest = at(day, 14, async () => {
      await weigh(code(), buyer, trade.weighed!);
      await buyer.visitor.post(`/api/v1/deals/${code()}/contest`, {
        reason: 'wrong_mass',
        note: 'The piece weighs less than the sheet says, on two balances. I have not touched it beyond weighing.',
      });
    });
    if (trade.ending === 'contested') return [contest];
    const rule = at(day - 1, 15, async () => {
      await people.desk.visitor.post(`/api/v1/desk/deals/${code()}/ruling`, {
        ruling: 'refund',
        reason:
          'The mass received differs by more than both scales allow, and the seal was broken on arrival.',
      });
      await runDueWork();
    });
    return [contest, rule];
  }
  const accept = at(day, 14, async () => {
    await weigh(code(), buyer, trade.weighed!);
    await buyer.visitor.post(`/api/v1/deals/${code()}/accept`);
    await runDueWork();
  });
  const payOut = at(day, 15, async () => {
    // The provider's payouts come through by its own clock, a little later than they were ordered.
    await clock.goTo(clock.moment(day, 16));
    await settlePayout(code());
  });
  return [accept, payOut];
}

function otherActs({ people }: Stage, memory: Memory): Act[] {
  const lotOf = (key: string) => memory.lots[key]!;
  return [
    {
      daysAgo: 11,
      hour: 17,
      run: async () => void (await people.tomas.visitor.post(`/api/v1/lots/${lotOf('paused')}/pause`)),
    },
    {
      daysAgo: 10,
      hour: 17,
      run: async () =>
        void (await people.nadira.visitor.post(`/api/v1/lots/${lotOf('withdrawn')}/withdraw`, {
          reason: 'It stays in the family after all.',
        })),
    },
    {
      daysAgo: 9,
      hour: 17,
      run: async () =>
        void (await people.desk.visitor.post(`/api/v1/desk/lots/${lotOf('pulled')}/pull`, {
          reason: 'The photos belong to another lot; list it again with photos of this grain.',
        })),
    },
  ];
}

/** Everything that happened, in the order of its days. Answers what is still to come today: a purchase that waits for its money. */
export async function tellStory(stage: Stage): Promise<() => Promise<void>> {
  const memory: Memory = { lots: {}, deals: {} };
  const acts = [
    ...sellingActs(stage, memory),
    ...TRADES.flatMap((trade, index) => tradingActs(stage, memory, trade, index)),
    ...otherActs(stage, memory),
  ];
  const when = (act: Act) => stage.clock.moment(act.daysAgo, act.hour, act.minute ?? 0).getTime();
  acts.sort((a, b) => when(a) - when(b));
  for (const act of acts) {
    const moment = stage.clock.moment(act.daysAgo, act.hour, act.minute ?? 0);
    // What the clock of the story has not reached today has not happened yet.
    if (moment.getTime() > Date.now()) continue;
    await stage.clock.goTo(moment);
    await act.run();
  }
  return async () => void (await buy(memory.lots.reserved!, stage.people.bruna));
}
