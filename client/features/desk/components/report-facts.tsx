import { ASSAY_METHODS, isAssayMethodKey } from '#shared/assay/methods.ts';
import { isMassUnit, massText } from '#shared/mass.ts';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { DataList, type DataListRow } from '../../../components/ui/data-list.tsx';
import { formatDate, formatDecimal, THIN } from '../../../lib/format.ts';

type Report = CaseAnswer['report'];

const SAMPLING_WORDS: Record<Report['sampling'], string> = {
  laboratory: 'The laboratory took the sample',
  whole_piece: 'The laboratory examined the whole piece',
  customer: 'The customer took the sample',
  not_stated: 'The report does not say',
};

function methodName(key: string): string {
  return isAssayMethodKey(key) ? ASSAY_METHODS[key].name : key;
}

function LaboratoryFacts({ report }: { report: Report }) {
  const { laboratory } = report;
  if (laboratory === null) return <>{report.laboratoryName}, not on the register</>;
  return (
    <>
      {laboratory.name}, {laboratory.region}
      <div className="text-note text-ink-2">
        {laboratory.accreditationBody} <span className="fig">{laboratory.accreditationNumber}</span>, valid
        until {formatDate(laboratory.validUntil)}
        {!laboratory.isActive && ', no longer active'}. Scope: {laboratory.scope}. Reached by:{' '}
        {laboratory.contact}
      </div>
    </>
  );
}

function resultText(result: Report['results'][number]): string {
  const fineness = `${formatDecimal(result.finenessPermille)}${THIN}‰`;
  const spread =
    result.uncertaintyPermille === null
      ? ', no uncertainty stated'
      : ` ±${THIN}${formatDecimal(result.uncertaintyPermille)}${THIN}‰`;
  return `${fineness}${spread}, ${methodName(result.method)}`;
}

function massWords({ itemMass }: Report): string {
  if (itemMass === null) return 'not stated';
  const { value, unit } = itemMass;
  return isMassUnit(unit) ? massText({ value, unit }) : `${value} ${unit}`;
}

/** The report as the seller entered it, to be read against the document. */
export function ReportFacts({ report }: { report: Report }) {
  const day = (text: string | null) => (text === null ? 'not stated' : formatDate(text));
  const rows: DataListRow[] = [
    { term: 'Laboratory', data: <LaboratoryFacts report={report} /> },
    { term: 'Report number', data: <span className="fig">{report.number}</span> },
    { term: 'Issued', data: formatDate(report.issuedOn) },
    { term: 'Received', data: day(report.receivedOn) },
    { term: 'Tested', data: day(report.testedOn) },
    { term: 'Sampling', data: SAMPLING_WORDS[report.sampling] },
    { term: 'Item', data: report.itemDescription || 'not stated' },
    { term: 'Mass of the item', data: massWords(report) },
    { term: 'Mark of the item', data: report.itemMark ?? 'not stated' },
    { term: 'Authorised by', data: report.authorisedBy || 'not stated' },
    ...report.results.map((result) => ({
      term: result.element,
      key: `result-${result.element}`,
      data: resultText(result),
    })),
  ];
  return (
    <section aria-labelledby="report-heading">
      <h2 id="report-heading" className="mb-2">
        Entered from the report
      </h2>
      <DataList rows={rows} />
    </section>
  );
}
