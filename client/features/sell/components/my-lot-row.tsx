import { Link } from 'react-router-dom';
import type { MyLotsAnswer } from '#shared/schemas/lots.ts';
import { formName, lotForms } from '../../../components/figures/lot-words.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { Stamp } from '../../../components/ui/stamp.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { formatPercent } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { stateWords } from '../lot-state-words.ts';

export type MyLot = MyLotsAnswer['lots'][number];

function Thumb({ lot }: { lot: MyLot }) {
  const form = lotForms.find((known) => known === lot.form);
  if (lot.thumb) return <img src={lot.thumb} alt="" className="size-full object-cover" />;
  return <SpecimenDrawing form={form ?? 'button'} label={null} className="size-full p-1 text-ink-2" />;
}

/** One own lot: what it is, how it stands, what comes next. */
export function MyLotRow({ lot }: { lot: MyLot }) {
  const { name, next, group } = stateWords[lot.state];
  const form = lotForms.find((known) => known === lot.form);
  return (
    <li className="flex gap-4 border-t border-rule py-4">
      <div className="sheet size-16 shrink-0 overflow-hidden">
        <Thumb lot={lot} />
      </div>
      <div className="grid grid-cols-1 min-w-0 grow gap-x-6 gap-y-2 md:grid-cols-[minmax(0,1.1fr)_minmax(0,1.5fr)_9rem]">
        <div className="min-w-0">
          <Link to={paths.draft(lot.code)} className="font-semibold hover:underline">
            {lot.title.trim() === '' ? 'Untitled draft' : lot.title}
          </Link>
          <p className="text-note text-ink-2">
            <span className="fig">{lot.code}</span>
            {form && ` · ${formName(form)}`} · <Time at={lot.updatedAt} show="short" />
          </p>
        </div>
        <div className="min-w-0">
          <Stamp tone={lot.state === 'returned' ? 'attention' : group === 'running' ? 'good' : 'plain'}>
            {name}
          </Stamp>
          {lot.stateReason && <p className="mt-1 max-w-prose font-medium">“{lot.stateReason}”</p>}
          <p className="mt-1 max-w-prose text-note text-ink-2">{next}</p>
          {lot.dealCode && (
            <Link to={paths.deal(lot.dealCode)} className="link inline-block py-0.5 text-note">
              Go to deal {lot.dealCode}
            </Link>
          )}
        </div>
        <div className="md:text-right">
          {lot.price && <Money value={lot.price.amount} />}
          {lot.linkedPercent && <>linked {formatPercent(lot.linkedPercent)}</>}
        </div>
      </div>
    </li>
  );
}
