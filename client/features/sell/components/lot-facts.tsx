import { ASSAY_METHODS, isAssayMethodKey } from '#shared/assay/methods.ts';
import { dec, fixed, plain } from '#shared/decimal.ts';
import { isMassUnit, MASS_UNIT_LABELS } from '#shared/mass.ts';
import { elementName, isMetal, isOtherElement } from '#shared/metals.ts';
import type { ContentAnswer, LotAnswer } from '#shared/schemas/lots.ts';
import { Fineness } from '../../../components/figures/fineness.tsx';
import { formName, GradeStamp, lotForms } from '../../../components/figures/lot-words.tsx';
import { Mass } from '../../../components/figures/mass.tsx';
import { Money } from '../../../components/figures/money.tsx';
import { DataList, type DataListRow } from '../../../components/ui/data-list.tsx';
import { Deadline } from '../../../components/ui/time.tsx';
import { AskedPrice } from '../../../components/figures/asked-price.tsx';
import { countryName } from '../../../lib/countries.ts';
import { formatDate, formatPercent, formatQuantity } from '../../../lib/format.ts';

function Content({ content }: { content: ContentAnswer }) {
  const { element, method } = content;
  const name = isMetal(element) || isOtherElement(element) ? elementName(element) : element;
  const permille = plain(dec(fixed(dec(content.finenessPermille), 3)));
  return (
    <li className="flex flex-wrap items-baseline gap-x-3">
      <span>{name}</span>
      <Fineness
        permille={permille}
        expanded={content.uncertaintyPermille}
        isAssumed={content.isUncertaintyAssumed}
      />
      <span className="text-note text-ink-2">
        {isAssayMethodKey(method) ? ASSAY_METHODS[method].name : method}
        {content.isPaidFor ? ', paid for' : ', also found'}
      </span>
    </li>
  );
}

function unitLabel(unit: string): string {
  return isMassUnit(unit) ? MASS_UNIT_LABELS[unit] : unit;
}

function certificateRows({ certificate }: LotAnswer): DataListRow[] {
  if (!certificate) return [];
  const { laboratoryName, number, issuedOn, deskNote, documentUrl } = certificate;
  return [
    {
      term: 'Certificate',
      data: (
        <>
          {laboratoryName}, <span className="fig">{number}</span>, {formatDate(issuedOn)}
          <span className="block text-note text-ink-2">{deskNote}</span>
          {documentUrl && (
            <a
              href={documentUrl}
              target="_blank"
              rel="noreferrer"
              className="link inline-block py-0.5 text-note"
            >
              Open the document
            </a>
          )}
        </>
      ),
    },
  ];
}

function rowsOf(lot: LotAnswer): DataListRow[] {
  const form = lotForms.find((known) => known === lot.form);
  const { gross, readability } = lot;
  const rows: DataListRow[] = [];
  if (form) rows.push({ term: 'Form', data: formName(form) });
  if (gross && isMassUnit(gross.unit)) {
    rows.push({ term: 'Gross mass', data: <Mass entry={{ value: gross.value, unit: gross.unit }} others /> });
  }
  if (readability) {
    const text = formatQuantity(readability.value, unitLabel(readability.unit));
    rows.push({ term: 'Readability', data: <span className="fig">{text}</span> });
  }
  rows.push({
    term: 'Assay',
    data: (
      <ul className="flex flex-col gap-1">
        {lot.contents.map((content) => (
          <Content key={content.element} content={content} />
        ))}
      </ul>
    ),
  });
  rows.push({ term: 'Evidence', data: <GradeStamp grade={lot.evidenceGrade} /> }, ...certificateRows(lot));
  if (lot.price || lot.linkedPercent) rows.push({ term: 'Price', data: <AskedPrice row={lot} /> });
  if (lot.floorPercent) rows.push({ term: 'Floor', data: `${formatPercent(lot.floorPercent)} of melt` });
  if (lot.shipping) rows.push({ term: 'Insured parcel', data: <Money value={lot.shipping.amount} /> });
  rows.push({ term: 'Ships to', data: lot.destinations.map(countryName).join(', ') });
  if (lot.closesAt) rows.push({ term: 'Closes', data: <Deadline at={lot.closesAt} /> });
  return rows;
}

/** What was handed in, to read. */
export function LotFacts({ lot }: { lot: LotAnswer }) {
  return (
    <section aria-label="What you handed in">
      <h2 className="mb-3">What you handed in</h2>
      {lot.photos.length > 0 && (
        <ul className="mb-4 flex flex-wrap gap-2">
          {lot.photos.map((photo, at) => (
            <li key={photo.id}>
              <img
                src={photo.thumb}
                alt={photo.caption || `Photo ${at + 1} of the lot`}
                className="sheet size-24 object-cover"
              />
            </li>
          ))}
        </ul>
      )}
      <DataList rows={rowsOf(lot)} />
      {lot.description && <p className="mt-4 max-w-prose whitespace-pre-line">{lot.description}</p>}
    </section>
  );
}
