import type { MassUnit } from '#shared/mass.ts';
import type { DealAnswer } from '#shared/schemas/deals.ts';
import { Mass } from '../../../components/figures/mass.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { MassDifference } from '../../../components/figures/mass-difference.tsx';
import { DataList } from '../../../components/ui/data-list.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { countryName } from '../../../lib/countries.ts';
import { parcelWord, scalesWord } from '../../../components/figures/deal-words.ts';

type Part<K extends 'parcel' | 'receipt' | 'delivery'> = NonNullable<DealAnswer[K]>;

function ParcelFacts({ parcel }: { parcel: Part<'parcel'> }) {
  const rows = [
    { term: 'Carrier', data: parcel.carrier },
    { term: 'Tracking', data: <span className="fig">{parcel.trackingNumber}</span> },
    { term: 'Insured for', data: <Money value={parcel.insured.amount} /> },
    { term: 'Now', data: parcelWord(parcel.status) },
  ];
  if (parcel.deliveredAt) rows.push({ term: 'Delivered', data: <Time at={parcel.deliveredAt} /> });
  if (parcel.isSigned !== null)
    rows.push({
      term: 'Signature',
      data: parcel.isSigned ? (parcel.signedBy ?? 'signed') : 'none',
    });
  return <DataList rows={rows} />;
}

function ReceivedMass({ receipt, lot }: { receipt: Part<'receipt'>; lot: DealAnswer['lot'] }) {
  return (
    <>
      <DataList
        rows={[
          {
            term: 'Stated',
            data: <Mass entry={{ value: lot.gross.value, unit: lot.gross.unit as MassUnit }} others />,
          },
          {
            term: 'Received',
            data: <Mass entry={{ value: receipt.mass.value, unit: receipt.mass.unit as MassUnit }} others />,
          },
          { term: 'Difference', data: <MassDifference grams={receipt.differenceGrams} /> },
        ]}
      />
      <p className={`mt-2 ${receipt.isWithinScales ? 'text-verdigris' : 'text-litharge'} font-medium`}>
        {scalesWord(receipt.isWithinScales)}
      </p>
      <p className="text-note text-ink-2">
        Recorded <Time at={receipt.at} />.
      </p>
      {receipt.photoUrl && receipt.photoThumb && (
        <a
          href={receipt.photoUrl}
          target="_blank"
          rel="noreferrer"
          className="mt-3 flex w-fit items-center gap-3"
        >
          <img
            src={receipt.photoThumb}
            alt=""
            className="size-24 rounded-box border border-rule bg-sheet object-cover"
          />
          <span className="link">The buyer’s photo of the weighing</span>
        </a>
      )}
    </>
  );
}

function Delivery({ delivery }: { delivery: Part<'delivery'> }) {
  const lines = [
    delivery.name,
    delivery.line1,
    delivery.line2,
    `${delivery.postcode} ${delivery.city}`,
    delivery.region,
    countryName(delivery.country),
  ].filter((line) => line.trim() !== '');
  return (
    <address className="not-italic">
      {lines.map((line) => (
        <span key={line} className="block">
          {line}
        </span>
      ))}
      <span className="fig block">{delivery.phone}</span>
    </address>
  );
}

/** Where the parcel goes, where it is, and what the buyer's scale said of it. */
export function DealParcel({ deal }: { deal: DealAnswer }) {
  const { parcel, receipt, delivery } = deal;
  return (
    <>
      {receipt && (
        <section aria-labelledby="deal-received">
          <h2 id="deal-received" className="mb-2 text-lead">
            Received mass
          </h2>
          <ReceivedMass receipt={receipt} lot={deal.lot} />
        </section>
      )}
      {parcel && (
        <section aria-labelledby="deal-parcel">
          <h2 id="deal-parcel" className="mb-2 text-lead">
            Parcel
          </h2>
          <ParcelFacts parcel={parcel} />
        </section>
      )}
      {delivery && (
        <section aria-labelledby="deal-delivery">
          <h2 id="deal-delivery" className="mb-2 text-lead">
            Delivery address
          </h2>
          <Delivery delivery={delivery} />
        </section>
      )}
    </>
  );
}
