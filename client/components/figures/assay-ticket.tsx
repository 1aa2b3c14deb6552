import { METAL_NAMES, type Metal } from '#shared/metals.ts';
import { formatDate, formatDecimal, THIN } from '../../lib/format.ts';
import { DataList, type DataListRow } from '../ui/data-list.tsx';
import { GradeStamp, type EvidenceGrade } from './lot-words.tsx';
import { MetalSwatch } from './metal-pattern.tsx';

export type AssayTicketData = {
  metal: Metal;
  permille: string;
  /** As typed when it was not typed in ‰: '14 karat'. */
  enteredAs?: string | null;
  expanded: string;
  isUncertaintyAssumed: boolean;
  method: string;
  grade: EvidenceGrade;
  laboratory: string | null;
  accreditation: string | null;
  certificateNumber: string | null;
  issuedOn: string | null;
  alsoFound: { element: string; permille: string }[];
  /** What was done about it and what was not, in whole sentences. */
  deskNote: string;
};

function rowsOf(ticket: AssayTicketData): DataListRow[] {
  const rows: DataListRow[] = [
    { term: 'Grade', data: <GradeStamp grade={ticket.grade} /> },
    { term: 'Method', data: ticket.method },
  ];
  if (ticket.laboratory) {
    const accredited = ticket.accreditation ? `, ${ticket.accreditation}` : '';
    rows.push({ term: 'Laboratory', data: ticket.laboratory + accredited });
  }
  if (ticket.certificateNumber)
    rows.push({ term: 'Certificate', data: <span className="fig">{ticket.certificateNumber}</span> });
  if (ticket.issuedOn) rows.push({ term: 'Issued', data: formatDate(ticket.issuedOn) });
  if (ticket.alsoFound.length > 0) {
    const found = ticket.alsoFound.map(
      ({ element, permille }) => `${element} ${formatDecimal(permille)}${THIN}‰`,
    );
    rows.push({
      term: 'Also found',
      data: <span className="font-mono text-[0.94em]">{found.join(', ')}</span>,
    });
  }
  return rows;
}

/** What is known of the metal, who says so, and what the desk did and did not do. */
export function AssayTicket({ ticket }: { ticket: AssayTicketData }) {
  return (
    <section
      aria-label={`Assay of the ${METAL_NAMES[ticket.metal].toLowerCase()}`}
      className="sheet keep-together sm:flex"
    >
      <div className="flex items-start justify-between gap-4 border-b border-dashed border-line p-4 sm:w-44 sm:shrink-0 sm:flex-col sm:border-b-0 sm:border-r">
        <div className="flex items-center gap-3 text-display font-semibold">
          <abbr title={METAL_NAMES[ticket.metal]} className="no-underline">
            {ticket.metal}
          </abbr>
          <MetalSwatch metal={ticket.metal} />
        </div>
        <div className="text-right sm:text-left">
          <div className="font-mono text-title">
            {formatDecimal(ticket.permille)}
            {THIN}
            <span className="unit">‰</span>
          </div>
          <div className="fig text-note text-ink-2">
            ±{THIN}
            {formatDecimal(ticket.expanded)}
            {THIN}‰, k = 2
          </div>
          {ticket.isUncertaintyAssumed && <div className="text-note text-ink-2">uncertainty assumed</div>}
          {ticket.enteredAs && <div className="text-note text-ink-2">entered as {ticket.enteredAs}</div>}
        </div>
      </div>
      <div className="min-w-0 grow p-4 text-note">
        <DataList rows={rowsOf(ticket)} />
        <p className="mt-3 border-t border-rule pt-3 text-ink-2">{ticket.deskNote}</p>
      </div>
    </section>
  );
}
