import type { DraftCertificate } from '#shared/schemas/lots.ts';
import { useReader } from '../../../lib/reader-context.ts';
import { massBeside } from '../../../components/lot-form/figures-beside.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { Button } from '../../../components/ui/button.tsx';
import { CertificateFile } from './certificate-file.tsx';
import { ChoiceField } from '../../../components/lot-form/choice-field.tsx';
import { FormSection } from '../../../components/lot-form/form-section.tsx';
import { LaboratoryFields } from './laboratory-fields.tsx';
import { QuantityField } from '../../../components/lot-form/quantity-field.tsx';
import { ReportResults } from './report-results.tsx';
import { TextField } from '../../../components/lot-form/text-field.tsx';
import { massUnits } from '../../../components/lot-form/unit-options.ts';

const samplings = [
  { value: 'laboratory', label: 'The laboratory sampled the piece' },
  { value: 'whole_piece', label: 'The laboratory examined the whole piece' },
  { value: 'customer', label: 'A sample was sent in by the customer' },
  { value: 'not_stated', label: 'The report does not say' },
];

/** The document and what stands on it, typed apart from the lot, so that the desk can compare the two. */
export function CertificateSection() {
  const { draft, change } = useDraftForm();
  const report = draft.certificate;
  const put = (part: Partial<DraftCertificate>) =>
    change((before) => ({ ...before, certificate: { ...before.certificate, ...part } }));
  return (
    <FormSection
      id="section-certificate"
      title="Certificate"
      sub="The desk compares these fields with the document and with the lot. The document itself goes to the desk only and, once the deal is funded, to the buyer."
    >
      <CertificateFile />
      <LaboratoryFields report={report} onChange={put} />
      <div className="grid grid-cols-1 items-start gap-x-5 gap-y-6 sm:grid-cols-3">
        <TextField pointer="/certificate/issuedOn" label="Issued on" type="date" />
        <TextField pointer="/certificate/receivedOn" label="Piece received on" type="date" optional />
        <TextField pointer="/certificate/testedOn" label="Tested on" type="date" optional />
      </div>
      <ChoiceField
        pointer="/certificate/sampling"
        label="Who took the sample"
        blank="Choose what the report says"
        options={samplings}
        value={report.sampling}
        onChange={(sampling) => put({ sampling })}
        beside={
          (report.sampling === 'customer' || report.sampling === 'not_stated') &&
          'Such a report speaks of the sample, not of the piece: the lot can be examined, not certified.'
        }
      />
      <PieceFields report={report} onChange={put} />
      <TextField pointer="/certificate/authorisedBy" label="Authorised by" optional maxLength={120} />
      <ReportResults report={report} onChange={(results) => put({ results })} />
    </FormSection>
  );
}

type PieceFieldsProps = { report: DraftCertificate; onChange: (part: Partial<DraftCertificate>) => void };

/** How the report tells which piece it is about: by mass, by mark, or by both. */
function PieceFields({ report, onChange }: PieceFieldsProps) {
  const { draft } = useDraftForm();
  const { weightUnit } = useReader();
  return (
    <>
      <TextField
        pointer="/certificate/itemDescription"
        label="The piece, in the report’s words"
        optional
        maxLength={200}
      />
      <div className="grid grid-cols-1 items-start gap-x-5 gap-y-6 sm:grid-cols-2">
        <div>
          <QuantityField
            pointer="/certificate/itemMass"
            label="Mass on the report"
            hint="Mass or mark must be there: they tie the report to this piece."
            unitLabel="Unit of the mass on the report"
            units={massUnits}
            value={report.itemMass}
            beside={massBeside(report.itemMass, weightUnit)}
            onChange={(itemMass) => onChange({ itemMass })}
          />
          <Button
            look="quiet"
            className="-ml-2"
            disabled={draft.gross.value === ''}
            onClick={() => onChange({ itemMass: draft.gross })}
          >
            Same mass as the lot
          </Button>
        </div>
        <TextField
          pointer="/certificate/itemMark"
          label="Mark on the report"
          hint="Stamped, engraved or written on the seal."
          maxLength={120}
        />
      </div>
    </>
  );
}
