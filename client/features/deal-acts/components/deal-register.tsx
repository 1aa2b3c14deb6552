import { useState } from 'react';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { RegisterOfDeal, type DueNext } from '../../../components/figures/register-of-deal.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { actText, openActs, type DealAct } from '../deal-acts.ts';
import { isNothing, whoWord } from '../../../components/figures/deal-words.ts';
import { REGISTER_ID } from '../hooks/use-deal-changed.ts';
import { OpenAct } from './act-panels.tsx';

const turns = {
  buyer: 'It is the buyer’s turn. ',
  seller: 'It is the seller’s turn. ',
  desk: 'It is the desk’s turn. ',
  carrier: '',
  provider: '',
} as const;

function dueNext(deal: DealAnswer, acts: DueNext['actions']): DueNext | null {
  const { due, side } = deal;
  if (due === null) return null;
  const isYours = due.who === side;
  return {
    what: due.at === null ? due.act : `${due.act} by`,
    at: due.at,
    text: `${isYours ? '' : turns[due.who]}${due.silence}`,
    isYours,
    actions: acts,
  };
}

/** The ruled page of the book with what is due next under it, and the acts that are open to the reader. */
export function DealRegister({ deal }: { deal: DealAnswer }) {
  const [chosen, setChosen] = useState<DealAct | null>(null);
  const acts = openActs(deal);
  const open = chosen !== null && deal.can[chosen] ? chosen : null;
  const buttons =
    acts.length > 0 && open === null
      ? acts.map((act, index) => (
          <Button
            key={act}
            look={index === 0 && act !== 'freeze' ? 'main' : 'second'}
            onClick={() => setChosen(act)}
          >
            {actText(act, deal)}
          </Button>
        ))
      : null;
  const due = dueNext(deal, buttons);
  const entries = deal.events.map((event, index) => ({
    id: `${index}:${event.at}`,
    at: event.at,
    act: event.text,
    who: whoWord(event.who, deal.side),
    held: isNothing(event.held.amount) ? null : event.held.amount,
  }));
  return (
    <section id={REGISTER_ID} tabIndex={-1} aria-label="Register of the deal" className="min-w-0">
      <RegisterOfDeal entries={entries} due={due} />
      {due === null && buttons && <div className="no-print mt-5 flex flex-wrap gap-3">{buttons}</div>}
      {open && <OpenAct act={open} deal={deal} onClose={() => setChosen(null)} />}
    </section>
  );
}
