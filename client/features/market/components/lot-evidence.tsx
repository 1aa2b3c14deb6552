import { ASSAY_METHODS, isAssayMethodKey } from '#shared/assay/methods.ts';
import { finenessText, isFinenessUnit } from '#shared/fineness.ts';
import { MASS_UNIT_LABELS, isMassUnit } from '#shared/mass.ts';
import { isMetal, type Metal } from '#shared/metals.ts';
import type { ContentAnswer, LotAnswer } from '#shared/schemas/lots.ts';
import { AssayTicket, type AssayTicketData } from '../../../components/figures/assay-ticket.tsx';
import { gradeMeaning } from '../../../components/figures/lot-words.tsx';
import { Quantity } from '../../../components/figures/quantity.tsx';
import { DataList, type DataListRow } from '../../../components/ui/data-list.tsx';
import { Time } from '../../../components/ui/time.tsx';
import { formatDecimal, THIN } from '../../../lib/format.ts';
import { shownPermille } from '../../../lib/shown-figures.ts';

type Certificate = NonNullable<LotAnswer['certificate']>;

const samplings: Record<Certificate['sampling'], string> = {
  laboratory: 'the laboratory sampled the piece itself',
  whole_piece: 'the laboratory examined the whole piece',
  customer: 'the customer sent a sample in',
  not_stated: 'the report does not say',
};

function methodName(method: string): string {
  if (!isAssayMethodKey(method)) return method;
  const { name, standard } = ASSAY_METHODS[method];
  return standard ? `${name}; ${standard}` : name;
}

function enteredAs({ fineness }: ContentAnswer): string | null {
  if (!isFinenessUnit(fineness.unit) || fineness.unit === 'permille') return null;
  return finenessText({ value: fineness.value, unit: fineness.unit });
}

const UNSEEN =
  'The seller’s word. No document was shown to the desk, and the metal was not tested by Scruple.';

function ticketOf(lot: LotAnswer, content: ContentAnswer & { element: Metal }): AssayTicketData {
  const { certificate } = lot;
  return {
    metal: content.element,
    permille: shownPermille(content.finenessPermille),
    enteredAs: enteredAs(content),
    expanded: shownPermille(content.uncertaintyPermille),
    isUncertaintyAssumed: content.isUncertaintyAssumed,
    method: methodName(content.method),
    grade: lot.evidenceGrade,
    laboratory: certificate?.laboratoryName || null,
    accreditation: certificate?.accreditation ?? null,
    certificateNumber: certificate?.number || null,
    issuedOn: certificate?.issuedOn || null,
    alsoFound: lot.contents
      .filter((other) => !other.isPaidFor)
      .map((other) => ({ element: other.element, permille: shownPermille(other.finenessPermille) })),
    deskNote: certificate?.deskNote ?? UNSEEN,
  };
}

/** What is known of the metal and who says so: a ticket for each metal paid for, and what the report itself says. */
export function LotEvidence({ lot }: { lot: LotAnswer }) {
  const paid = lot.contents.filter(
    (content): content is ContentAnswer & { element: Metal } => content.isPaidFor && isMetal(content.element),
  );
  return (
    <section aria-label="Assay and evidence" className="flex flex-col gap-3">
      {paid.map((content) => (
        <AssayTicket key={content.element} ticket={ticketOf(lot, content)} />
      ))}
      <p className="text-note text-ink-2">
        <span className="font-medium text-ink">{lot.evidenceGrade}</span>: {gradeMeaning(lot.evidenceGrade)}.
      </p>
      {lot.certificate && <ReportWords certificate={lot.certificate} />}
    </section>
  );
}

function reportRows(certificate: Certificate): DataListRow[] {
  const { itemMass, itemMark, results, decidedAt } = certificate;
  const rows: DataListRow[] = [{ term: 'Sampling', data: samplings[certificate.sampling] }];
  if (itemMass) {
    const unit = isMassUnit(itemMass.unit) ? MASS_UNIT_LABELS[itemMass.unit] : itemMass.unit;
    rows.push({ term: 'Mass on the report', data: <Quantity value={itemMass.value} unit={unit} /> });
  }
  if (itemMark) rows.push({ term: 'Mark on the report', data: itemMark });
  if (results.length > 0)
    rows.push({
      term: 'Results',
      data: (
        <ul className="font-mono text-[0.94em]">
          {results.map((result) => (
            <li key={result.element}>
              {result.element} {formatDecimal(shownPermille(result.finenessPermille))}
              {result.uncertaintyPermille && ` ± ${formatDecimal(shownPermille(result.uncertaintyPermille))}`}
              {THIN}‰
            </li>
          ))}
        </ul>
      ),
    });
  if (decidedAt) rows.push({ term: 'Desk decided', data: <Time at={decidedAt} /> });
  return rows;
}

function ReportWords({ certificate }: { certificate: Certificate }) {
  return (
    <details className="text-note">
      <summary className="inline-block min-h-6 py-0.5 font-medium underline underline-offset-4">
        What the report says
      </summary>
      <DataList rows={reportRows(certificate)} className="mt-2" />
      <p className="mt-2 text-ink-2">
        {certificate.documentUrl ? (
          <a href={certificate.documentUrl} target="_blank" rel="noreferrer" className="link">
            Open the report itself
          </a>
        ) : (
          'A report carries its customer’s name and address: the document itself is for the desk and, after funding, the buyer.'
        )}
      </p>
    </details>
  );
}
