import PDFDocument from 'pdfkit';

export type Report = {
  laboratory: string;
  accreditation: string;
  number: string;
  customer: string;
  item: string;
  mass: string;
  mark: string;
  sampling: string;
  issuedOn: string;
  results: readonly { element: string; permille: string; uncertainty: string; method: string }[];
};

function line(document: PDFKit.PDFDocument, label: string, value: string): void {
  document.font('Helvetica').fontSize(9).fillColor('#566064').text(label, { continued: true });
  document.fillColor('#1C2427').text(`  ${value}`);
  document.moveDown(0.35);
}

/** A plain test report of an invented laboratory, with the fields that a report states (ISO/IEC 17025:2017, 7.8.2.1). */
export function drawReport(report: Report): Promise<Buffer> {
  const document = new PDFDocument({
    size: 'A4',
    margin: 64,
    info: { Title: `Test report ${report.number}` },
  });
  const chunks: Buffer[] = [];
  document.on('data', (chunk: Buffer) => chunks.push(chunk));
  const finished = new Promise<Buffer>((resolve) => document.on('end', () => resolve(Buffer.concat(chunks))));
  document.font('Helvetica-Bold').fontSize(17).fillColor('#1C2427').text(report.laboratory);
  document.font('Helvetica').fontSize(9).fillColor('#566064').text(report.accreditation).moveDown(1.6);
  document
    .font('Helvetica-Bold')
    .fontSize(13)
    .fillColor('#1C2427')
    .text(`Test report ${report.number}`)
    .moveDown(0.8);
  line(document, 'Customer', report.customer);
  line(document, 'Item', report.item);
  line(document, 'Mass as received', report.mass);
  line(document, 'Mark', report.mark);
  line(document, 'Sampling', report.sampling);
  line(document, 'Date of issue', report.issuedOn);
  document.moveDown(0.8);
  for (const { element, permille, uncertainty, method } of report.results) {
    const stated = uncertainty === '' ? '' : ` ± ${uncertainty} (k = 2)`;
    line(document, `${element}, parts per thousand by mass`, `${permille}${stated}, ${method}`);
  }
  document.moveDown(1.2);
  document.fontSize(8).fillColor('#566064');
  document.text(
    'Results relate only to the items tested. Invented document of a demonstration: no such laboratory exists.',
  );
  document.moveDown(0.6).text('Page 1 of 1. End of report.');
  document.end();
  return finished;
}
